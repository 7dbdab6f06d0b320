import { useQuery } from '@tanstack/react-query';
import { Field } from '../../../components/ui/field.tsx';
import { Select } from '../../../components/ui/select.tsx';
import { TextInput } from '../../../components/ui/text-input.tsx';
import { colleagues } from '../api.ts';

export interface OverrideDraft {
  byUserId: string;
  password: string;
  reason: string;
}

export const NO_OVERRIDE: OverrideDraft = { byUserId: '', password: '', reason: '' };

export interface OverrideFieldsProps {
  draft: OverrideDraft;
  onChange: (draft: OverrideDraft) => void;
  issueFor: (path: string) => string | undefined;
}

/** A lot that is expired, in quarantine or recalled: somebody else answers for it, here and now. */
export function OverrideFields({ draft, onChange, issueFor }: OverrideFieldsProps) {
  const people = useQuery(colleagues()).data?.items ?? [];
  return (
    <fieldset className="grid gap-4">
      <legend className="field-label">
        This lot is not usable: a manager of the site must answer for it
      </legend>
      <Field label="Who answers for it" error={issueFor('override.byUserId')}>
        <Select
          placeholder="choose a person"
          value={draft.byUserId}
          options={people.map((person) => ({ value: String(person.id), label: person.name }))}
          onChange={(event) => onChange({ ...draft, byUserId: event.target.value })}
        />
      </Field>
      <Field label="That person’s password" error={issueFor('override.password')}>
        <TextInput
          type="password"
          autoComplete="off"
          value={draft.password}
          onChange={(event) => onChange({ ...draft, password: event.target.value })}
        />
      </Field>
      <Field label="Why it is used all the same" error={issueFor('override.reason')}>
        <TextInput
          value={draft.reason}
          maxLength={1000}
          onChange={(event) => onChange({ ...draft, reason: event.target.value })}
        />
      </Field>
    </fieldset>
  );
}
