import { useState } from 'react';
import { formatNumber, formatSigned } from '../../../../../shared/format/numbers.ts';
import { changeWords } from '../../../../../shared/format/calibration-words.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { FormRefusal } from '../../../components/ui/form-refusal.tsx';
import { TextInput } from '../../../components/ui/text-input.tsx';
import { useSubmission } from '../../../lib/use-submission.ts';
import { useCalibrationDeed } from '../api.ts';
import { BudgetBars } from '../record/budget-bars.tsx';
import { ThreeStates } from '../record/three-states.tsx';
import { useBench } from './bench-context.ts';
import { BenchFoot } from './bench-foot.tsx';
import { RefusedDeeds } from './refused-deeds.tsx';

/** Everything the record will say, before it is signed. */
export function ReviewScreen() {
  const { view, finish } = useBench();
  const run = view.calibration;
  const { fouling, driftSinceAsLeft, secondPointAgrees, temperatureErrorC, zeroUsCm } = run.judgement;
  const last = run.judgement.asLeft ?? run.judgement.cleaned ?? run.judgement.asFound;
  const [note, setNote] = useState('');
  return (
    <>
      <h2 className="bench-question">Look it over</h2>
      <ThreeStates run={run} isStacked />
      <dl className="verdict-figures">
        {fouling ? <Row term="Fouling" value={changeWords(fouling)} /> : null}
        {driftSinceAsLeft ? (
          <Row term="Drift since last as left" value={changeWords(driftSinceAsLeft)} />
        ) : null}
        {secondPointAgrees === null ? null : (
          <Row term="Second point" value={secondPointAgrees ? 'agrees' : 'does not agree'} />
        )}
        {temperatureErrorC === null ? null : (
          <Row term="Temperature sensor" value={formatSigned(temperatureErrorC, 2, '°C')} />
        )}
        {zeroUsCm === null ? null : (
          <Row term="Zero in air" value={formatNumber(zeroUsCm, { significantDigits: 2, unit: 'µS/cm' })} />
        )}
      </dl>
      {last ? <BudgetBars verdict={last} /> : null}
      <div className="bench-fields">
        <Field label="Note for the reviewer" isOptional>
          <TextInput value={note} maxLength={400} onChange={(event) => setNote(event.target.value)} />
        </Field>
      </div>
      <RefusedDeeds />
      <BenchFoot>
        <Button kind="primary" onClick={() => finish({ step: 'review', note: note.trim() || null })}>
          It is right: go on to sign
        </Button>
      </BenchFoot>
    </>
  );
}

/** The password again, and the words that the signature means. */
export function SignScreen() {
  const { view, userId, isOnline } = useBench();
  const run = view.calibration;
  const sign = useCalibrationDeed(run.id, 'sign', userId);
  const [password, setPassword] = useState('');
  const { isPending, refusal, issueFor, submit } = useSubmission();
  const isUnsent = view.waiting > 0;
  const press = () => submit(() => sign.mutateAsync({ password, capturedAt: new Date().toISOString() }));
  return (
    <form
      className="flex flex-1 flex-col"
      onSubmit={(event) => {
        event.preventDefault();
        if (password && !isUnsent) void press();
      }}
    >
      <h2 className="bench-question">Sign</h2>
      <p className="bench-say">
        “I performed this work as recorded.” Your name, the time, this sentence and the hash of the record are
        kept with it. After that nothing in it changes.
      </p>
      <div className="bench-fields">
        <Field label="Your password, again" error={issueFor('password')}>
          <TextInput
            type="password"
            autoComplete="current-password"
            value={password}
            onChange={(event) => setPassword(event.target.value)}
          />
        </Field>
        <FormRefusal>{refusal}</FormRefusal>
      </div>
      {isUnsent || !isOnline ? (
        <p className="bench-note">
          A signature needs the network: the server must have everything first. The run waits for you here.
        </p>
      ) : null}
      <RefusedDeeds />
      <BenchFoot>
        <Button kind="primary" type="submit" isPending={isPending} disabled={!password || isUnsent}>
          Sign this calibration
        </Button>
      </BenchFoot>
    </form>
  );
}

function Row({ term, value }: { term: string; value: string }) {
  return (
    <>
      <dt>{term}</dt>
      <dd>{value}</dd>
    </>
  );
}
