import { useRef, useState } from 'react';
import type { FormEvent } from 'react';
import type { Welcome } from '../../../../../shared/contracts/sessions.ts';
import { ROLE_LABELS } from '../../../../../shared/format/labels.ts';
import { PageStrip } from '../../../components/strip/tolerance-strip.tsx';
import { Button } from '../../../components/ui/button.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { TextInput } from '../../../components/ui/text-input.tsx';
import { useSubmission } from '../../../lib/use-submission.ts';
import { useSignIn } from '../api.ts';
import { Threshold } from './threshold.tsx';

type Demo = NonNullable<Welcome['demo']>;
interface Credentials {
  email: string;
  password: string;
}

export function SignIn({ demo }: { demo: Demo | null }) {
  const [credentials, setCredentials] = useState<Credentials>({ email: '', password: '' });
  return (
    <Threshold
      title="Sign in"
      below={
        <>
          <OneDrawing />
          {demo ? (
            <DemoSignIns
              demo={demo}
              onChoose={(email) => setCredentials({ email, password: demo.password })}
            />
          ) : null}
        </>
      }
    >
      <SignInForm credentials={credentials} onChange={setCredentials} />
    </Threshold>
  );
}

interface SignInFormProps {
  credentials: Credentials;
  onChange: (credentials: Credentials) => void;
}

function SignInForm({ credentials, onChange }: SignInFormProps) {
  const form = useRef<HTMLFormElement>(null);
  const signIn = useSignIn();
  const { isPending, refusal, issueFor, submit } = useSubmission(form);
  const send = (event: FormEvent) => {
    event.preventDefault();
    void submit(() => signIn.mutateAsync(credentials));
  };
  return (
    <form ref={form} onSubmit={send} noValidate>
      <h2 className="sr-only">Sign in</h2>
      <Field label="E-mail" error={issueFor('email')}>
        <TextInput
          type="email"
          autoComplete="username"
          autoCapitalize="none"
          spellCheck={false}
          autoFocus
          value={credentials.email}
          onChange={(event) => onChange({ ...credentials, email: event.target.value })}
        />
      </Field>
      <Field label="Password" error={issueFor('password')}>
        <TextInput
          type="password"
          autoComplete="current-password"
          value={credentials.password}
          onChange={(event) => onChange({ ...credentials, password: event.target.value })}
        />
      </Field>
      {refusal ? (
        <p className="field-error" role="alert">
          {refusal}
        </p>
      ) : null}
      <Button kind="primary" type="submit" isPending={isPending}>
        Sign in
      </Button>
    </form>
  );
}

/** The one drawing that is met everywhere, explained before it is needed. */
function OneDrawing() {
  return (
    <div className="threshold-learn">
      <PageStrip
        tolerance={3}
        guardBand={0.85}
        error={1.23}
        expandedUncertainty={0.85}
        earlier={[0.6, 0.1, -0.5]}
        forecast={1.7}
        what="Example"
      />
      <p>
        <b>One drawing to learn.</b> Between the posts is within tolerance. In the hatching it is too close to
        be sure. The whisker is U. Earlier results sink and fade. The open caret is where it should be today.
      </p>
    </div>
  );
}

function DemoSignIns({ demo, onChoose }: { demo: Demo; onChoose: (email: string) => void }) {
  return (
    <section className="threshold-demo" aria-label="Demo sign-ins">
      <p>Demo data is loaded. Choose one to fill in the form.</p>
      <ul>
        {demo.signIns.map((one) => (
          <li key={one.email}>
            <button type="button" onClick={() => onChoose(one.email)}>
              <span>{ROLE_LABELS[one.role]}</span>
              <small>{one.can}</small>
            </button>
          </li>
        ))}
      </ul>
    </section>
  );
}
