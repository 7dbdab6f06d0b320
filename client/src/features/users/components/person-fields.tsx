import { Field } from '../../../components/ui/field.tsx';
import { TextInput } from '../../../components/ui/text-input.tsx';
import type { Issues } from '../../../lib/use-submission.ts';

export interface PersonDraft {
  name: string;
  email: string;
}

export interface PersonFieldsProps {
  draft: PersonDraft;
  onChange: (draft: PersonDraft) => void;
  issueFor: (path: string) => string | undefined;
}

export function PersonFields({ draft, onChange, issueFor }: PersonFieldsProps) {
  return (
    <>
      <Field label="Name" hint="As it stands on records." error={issueFor('name')}>
        <TextInput
          value={draft.name}
          maxLength={120}
          autoComplete="off"
          onChange={(event) => onChange({ ...draft, name: event.target.value })}
        />
      </Field>
      <Field label="E-mail" hint="Signs in with it and gets mail there." error={issueFor('email')}>
        <TextInput
          type="email"
          value={draft.email}
          maxLength={200}
          autoComplete="off"
          onChange={(event) => onChange({ ...draft, email: event.target.value })}
        />
      </Field>
    </>
  );
}

/** What is plainly missing, said before the server is asked. */
export function personIssues(draft: PersonDraft): Issues {
  return {
    ...(draft.name.trim() ? {} : { name: 'Write the name.' }),
    ...(draft.email.includes('@') ? {} : { email: 'Write the whole e-mail address.' }),
  };
}
