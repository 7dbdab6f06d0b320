import { useRef, useState } from 'react';
import type { FormEvent } from 'react';
import { Button, ButtonLink } from '../../../components/ui/button.tsx';
import { useSubmission } from '../../../lib/use-submission.ts';
import { paths } from '../../../paths.ts';
import { useSetPasswordByLink } from '../api.ts';
import { NewPasswordFields, NO_PASSWORD, repeatIssue } from './new-password-fields.tsx';

/** Sets a password by the one-time link of an invitation. */
export function SetPasswordForm({ token }: { token: string | null }) {
  const form = useRef<HTMLFormElement>(null);
  const [value, setValue] = useState(NO_PASSWORD);
  const [isRepeatWrong, setIsRepeatWrong] = useState(false);
  const [isDone, setIsDone] = useState(false);
  const setPassword = useSetPasswordByLink();
  const { isPending, refusal, issueFor, submit } = useSubmission(form);
  if (!token)
    return (
      <Outcome
        title="This link is not whole"
        sentence="Open it from the mail again, or ask an administrator for a new one."
      />
    );
  if (isDone)
    return <Outcome title="Your password is set" sentence="Sign in with it now. The link works only once." />;
  const send = async (event: FormEvent) => {
    event.preventDefault();
    setIsRepeatWrong(repeatIssue(value) !== undefined);
    if (repeatIssue(value)) return;
    const body = { token, newPassword: value.newPassword };
    setIsDone(await submit(() => setPassword.mutateAsync(body)));
  };
  return (
    <form ref={form} onSubmit={(event) => void send(event)} noValidate>
      <h2 className="threshold-title">Set your password</h2>
      <NewPasswordFields
        value={value}
        onChange={setValue}
        issue={issueFor('newPassword')}
        repeatIssue={isRepeatWrong ? repeatIssue(value) : undefined}
      />
      {(refusal ?? issueFor('token')) ? (
        <p className="field-error" role="alert">
          {refusal ?? 'This link is not whole. Open it from the mail again.'}
        </p>
      ) : null}
      <Button kind="primary" type="submit" isPending={isPending}>
        Set password
      </Button>
    </form>
  );
}

function Outcome({ title, sentence }: { title: string; sentence: string }) {
  return (
    <>
      <h2 className="threshold-title">{title}</h2>
      <p className="threshold-sentence">{sentence}</p>
      <ButtonLink kind="primary" to={paths.signIn.to()}>
        To sign-in
      </ButtonLink>
    </>
  );
}
