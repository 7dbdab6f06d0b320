import { useRef, useState } from 'react';
import type { FormEvent } from 'react';
import { Button } from '../../../components/ui/button.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { TextInput } from '../../../components/ui/text-input.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { useSubmission } from '../../../lib/use-submission.ts';
import { useChangePassword } from '../api.ts';
import { NewPasswordFields, NO_PASSWORD, repeatIssue } from './new-password-fields.tsx';

/** The current password is asked again: an unattended screen must not be enough to take an account over. */
export function ChangePasswordForm() {
  const form = useRef<HTMLFormElement>(null);
  const [current, setCurrent] = useState('');
  const [value, setValue] = useState(NO_PASSWORD);
  const [isRepeatWrong, setIsRepeatWrong] = useState(false);
  const change = useChangePassword();
  const say = useToast();
  const { isPending, refusal, issueFor, submit } = useSubmission(form);
  const send = async (event: FormEvent) => {
    event.preventDefault();
    setIsRepeatWrong(repeatIssue(value) !== undefined);
    if (repeatIssue(value)) return;
    const body = { currentPassword: current, newPassword: value.newPassword };
    if (!(await submit(() => change.mutateAsync(body)))) return;
    setCurrent('');
    setValue(NO_PASSWORD);
    say('Your password is changed. You are signed out everywhere else.');
  };
  return (
    <form ref={form} className="form" onSubmit={(event) => void send(event)} noValidate>
      <Field label="Current password" error={issueFor('currentPassword')}>
        <TextInput
          type="password"
          autoComplete="current-password"
          value={current}
          onChange={(event) => setCurrent(event.target.value)}
        />
      </Field>
      <NewPasswordFields
        value={value}
        onChange={setValue}
        issue={issueFor('newPassword')}
        repeatIssue={isRepeatWrong ? repeatIssue(value) : undefined}
      />
      {refusal ? (
        <p className="field-error" role="alert">
          {refusal}
        </p>
      ) : null}
      <div className="form-actions">
        <Button kind="primary" type="submit" isPending={isPending}>
          Change password
        </Button>
      </div>
    </form>
  );
}
