import { useState } from 'react';
import { SITE_RULES_FIRST } from '../../../../../shared/format/cautions.ts';
import { formatTime } from '../../../../../shared/format/dates.ts';
import { Button } from '../../../components/ui/button.tsx';
import { HazardCautions } from '../../../components/ui/caution.tsx';
import { Checkbox } from '../../../components/ui/checkbox.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { NumberInput } from '../../../components/ui/number-input.tsx';
import { RadioGroup } from '../../../components/ui/radio-group.tsx';
import { TextInput } from '../../../components/ui/text-input.tsx';
import { useNow } from '../../../components/ui/time.tsx';
import { useBench } from './bench-context.ts';
import { BenchFoot } from './bench-foot.tsx';
import { RefusedDeeds } from './refused-deeds.tsx';
import { VerdictPanel } from './verdict-panel.tsx';

/** Cautions in full, the permit, and that the control room knows. */
export function PreChecksScreen() {
  const { view, finish } = useBench();
  const { hazardTags, controlNote } = view.calibration;
  const [permit, setPermit] = useState('');
  const [isTold, setIsTold] = useState(false);
  return (
    <>
      <HazardCautions tags={hazardTags} />
      {controlNote ? (
        <p className="bench-say">
          <b>This signal controls something.</b> {controlNote}
        </p>
      ) : null}
      <div className="bench-fields">
        <Checkbox label="The control room has been told" isChecked={isTold} onChange={setIsTold} />
        <Field label="Permit number" hint="As text; it never replaces the permit." isOptional>
          <TextInput value={permit} maxLength={60} onChange={(event) => setPermit(event.target.value)} />
        </Field>
      </div>
      <RefusedDeeds />
      <BenchFoot>
        <Button
          kind="primary"
          onClick={() =>
            finish({
              step: 'pre-checks',
              permitNumber: permit.trim() || null,
              cautionsRead: true,
              controlRoomTold: isTold,
            })
          }
        >
          I have read the cautions
        </Button>
      </BenchFoot>
    </>
  );
}

const HOLD_CHOICES_MIN = ['60', '90', '120', '240'] as const;

/** Sets the measuring context: everybody watching sees who works here and until when. */
export function HoldScreen() {
  const { view, timeZone, finish } = useBench();
  const now = useNow();
  const [minutes, setMinutes] = useState<string>('90');
  const untilMs = now + Number(minutes) * 60_000;
  const words: Record<string, string> = {
    60: 'one hour',
    90: 'an hour and a half',
    120: 'two hours',
    240: 'four hours',
  };
  return (
    <>
      <h2 className="bench-question">Hold {view.calibration.pointName} until when?</h2>
      <p className="bench-note">
        From now on the live board says that you calibrate here, and nobody takes the reading for the process.
      </p>
      <div className="bench-fields">
        <RadioGroup
          legend="Back in use by about"
          options={HOLD_CHOICES_MIN.map((value) => ({
            value,
            label: `${formatTime(now + Number(value) * 60_000, { timeZone })}, in ${words[value] ?? ''}`,
          }))}
          value={minutes}
          onChange={setMinutes}
        />
      </div>
      <RefusedDeeds />
      <BenchFoot>
        <Button
          kind="primary"
          onClick={() => finish({ step: 'hold', untilAt: new Date(untilMs).toISOString() })}
        >
          Hold it until {formatTime(untilMs, { timeZone })}
        </Button>
      </BenchFoot>
    </>
  );
}

const AGENTS = ['water and soft brush', 'mild detergent', 'dilute acid for scale', 'solvent'] as const;
const OTHER = 'other';

/** Least aggressive first; what was used and for how long. */
export function CleanScreen() {
  const { view, finish } = useBench();
  const [agent, setAgent] = useState<string>(AGENTS[0]);
  const [other, setOther] = useState('');
  const [minutes, setMinutes] = useState<number | null>(5);
  const isOther = agent === OTHER;
  const isReady = minutes !== null && minutes >= 0 && minutes <= 600 && (!isOther || other.trim().length > 0);
  return (
    <>
      {view.steps.some((one) => one.step === 'as-found') ? (
        <VerdictPanel verdict={view.calibration.judgement.asFound} what="as found" />
      ) : null}
      <h2 className="bench-question">Clean the cell</h2>
      <p className="bench-note">
        Least aggressive first. Rinse until free, then twice with the solution itself, and discard it.
      </p>
      <div className="bench-fields">
        <RadioGroup
          legend="Cleaned with"
          options={[
            ...AGENTS.map((value) => ({ value, label: value })),
            { value: OTHER, label: 'something else' },
          ]}
          value={agent}
          onChange={setAgent}
        />
        {isOther ? (
          <Field label="What it was, and how strong">
            <TextInput value={other} maxLength={120} onChange={(event) => setOther(event.target.value)} />
          </Field>
        ) : null}
        <Field label="For how long">
          <NumberInput value={minutes} unit="minutes" onChange={setMinutes} />
        </Field>
      </div>
      <RefusedDeeds />
      <BenchFoot>
        <Button
          kind="primary"
          disabled={!isReady}
          onClick={() =>
            finish({
              step: 'clean',
              agent: isOther ? other.trim() : agent,
              minutes: minutes ?? 0,
              note: null,
            })
          }
        >
          It is clean and rinsed
        </Button>
      </BenchFoot>
    </>
  );
}

/** Back into the process, hold released. */
export function ReinstallScreen() {
  const { view, finish } = useBench();
  const { judgement } = view.calibration;
  const [note, setNote] = useState('');
  const measured = view.steps.some((one) => one.step === 'as-left');
  return (
    <>
      {measured ? <VerdictPanel verdict={judgement.asLeft} what="as left" /> : null}
      <h2 className="bench-question">Put the probe back</h2>
      <p className="bench-note">
        New seal, tight, no bubble at the cell. The hold on {view.calibration.pointName} ends with this step:
        give the reading time to settle and compare it with what it showed before.
      </p>
      <div className="bench-fields">
        <Field label="Anything the next person should know" isOptional>
          <TextInput value={note} maxLength={400} onChange={(event) => setNote(event.target.value)} />
        </Field>
      </div>
      <p className="bench-note">{SITE_RULES_FIRST}</p>
      <RefusedDeeds />
      <BenchFoot>
        <Button kind="primary" onClick={() => finish({ step: 'reinstall', note: note.trim() || null })}>
          It is back in place
        </Button>
      </BenchFoot>
    </>
  );
}
