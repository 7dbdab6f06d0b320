import { Field } from '../../../components/ui/field.tsx';
import { TextInput } from '../../../components/ui/text-input.tsx';

export interface NewPassword {
  newPassword: string;
  repeated: string;
}

export const NO_PASSWORD: NewPassword = { newPassword: '', repeated: '' };

/** Typed twice, because nobody sees what is typed. */
export function repeatIssue({ newPassword, repeated }: NewPassword): string | undefined {
  return newPassword === repeated ? undefined : 'The two do not match. Type the new password again.';
}

export interface NewPasswordFieldsProps {
  value: NewPassword;
  onChange: (value: NewPassword) => void;
  issue: string | undefined;
  repeatIssue: string | undefined;
}

export function NewPasswordFields({ value, onChange, issue, repeatIssue: repeat }: NewPasswordFieldsProps) {
  return (
    <>
      <Field label="New password" hint="At least 12 characters; a sentence is good." error={issue}>
        <TextInput
          type="password"
          autoComplete="new-password"
          value={value.newPassword}
          onChange={(event) => onChange({ ...value, newPassword: event.target.value })}
        />
      </Field>
      <Field label="New password again" error={repeat}>
        <TextInput
          type="password"
          autoComplete="new-password"
          value={value.repeated}
          onChange={(event) => onChange({ ...value, repeated: event.target.value })}
        />
      </Field>
    </>
  );
}
