import { useRef, useState } from 'react';
import type { FormEvent } from 'react';
import { useNavigate } from 'react-router-dom';
import { Button } from '../../../components/ui/button.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { TextInput } from '../../../components/ui/text-input.tsx';
import { useSubmission } from '../../../lib/use-submission.ts';
import { paths } from '../../../paths.ts';
import { useCreateFirstAdministrator, useSignIn } from '../api.ts';

/** Creates the first administrator and signs that person in. */
export function FirstAdministratorForm() {
  const form = useRef<HTMLFormElement>(null);
  const [person, setPerson] = useState({ name: '', email: '', password: '' });
  const create = useCreateFirstAdministrator();
  const signIn = useSignIn();
  const navigate = useNavigate();
  const { isPending, refusal, issueFor, submit } = useSubmission(form);
  const send = async (event: FormEvent) => {
    event.preventDefault();
    const isDone = await submit(async () => {
      await create.mutateAsync(person);
      await signIn.mutateAsync({ email: person.email, password: person.password });
    });
    if (isDone) await navigate(paths.sites.to());
  };
  const set = (name: keyof typeof person) => (event: { target: { value: string } }) =>
    setPerson({ ...person, [name]: event.target.value });
  return (
    <form ref={form} onSubmit={(event) => void send(event)} noValidate>
      <h2 className="threshold-title">Nobody is here yet</h2>
      <p className="threshold-sentence">
        You become the administrator: you add sites and people, and approve no results.
      </p>
      <Field label="Your name" error={issueFor('name')}>
        <TextInput autoComplete="name" autoFocus value={person.name} onChange={set('name')} />
      </Field>
      <Field label="E-mail" error={issueFor('email')}>
        <TextInput type="email" autoComplete="username" value={person.email} onChange={set('email')} />
      </Field>
      <Field label="Password" hint="At least 12 characters." error={issueFor('password')}>
        <TextInput
          type="password"
          autoComplete="new-password"
          value={person.password}
          onChange={set('password')}
        />
      </Field>
      {refusal ? (
        <p className="field-error" role="alert">
          {refusal}
        </p>
      ) : null}
      <Button kind="primary" type="submit" isPending={isPending}>
        Become administrator
      </Button>
    </form>
  );
}
