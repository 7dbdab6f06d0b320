import { Button } from '../../../components/ui/button.tsx';
import { formatTime } from '../../../../../shared/format/dates.ts';
import { STEP_LABELS, benchConductivity, benchUnit } from '../../../../../shared/format/calibration-words.ts';
import type { Deed, QueuedDeed } from '../offline/deeds.ts';
import { confirmedCapture } from '../offline/deeds.ts';
import { phoneQueue } from '../offline/phone-queue.ts';
import { useBench } from './bench-context.ts';

/** What the server did not accept stays here until the person has dealt with it; nothing is dropped silently. */
export function RefusedDeeds() {
  const { view, timeZone } = useBench();
  if (view.refused.length === 0) return null;
  return (
    <section className="bench-refused" role="alert">
      <h2>Not accepted</h2>
      <ul>
        {view.refused.map((entry) => (
          <li key={entry.order}>
            <b>
              {deedWords(entry.deed)}, {formatTime(entry.deed.body.capturedAt, { timeZone, seconds: true })}:
            </b>{' '}
            {entry.refusal?.reason}
            <RefusedActions entry={entry} />
          </li>
        ))}
      </ul>
      <Button kind="quiet" onClick={() => phoneQueue.sendAgain(view.calibration.id)}>
        Send them again, in their order
      </Button>
    </section>
  );
}

function RefusedActions({ entry }: { entry: QueuedDeed }) {
  const { add } = useBench();
  const { deed, order } = entry;
  const isAskedAgain =
    deed.kind === 'capture' && entry.refusal?.code === 'calibrations.order-of-magnitude' ? deed : null;
  const confirm = async (capture: Extract<Deed, { kind: 'capture' }>) => {
    await add(confirmedCapture(capture));
    await phoneQueue.setAside(order);
  };
  return (
    <div className="flex gap-6">
      {isAskedAgain ? (
        <Button kind="quiet" onClick={() => confirm(isAskedAgain)}>
          The value is right, keep it
        </Button>
      ) : null}
      <Button kind="quiet" onClick={() => phoneQueue.setAside(order)}>
        {isAskedAgain ? 'It was a slip, take it off' : 'Seen, take it off this phone'}
      </Button>
    </div>
  );
}

function deedWords(deed: Deed): string {
  if (deed.kind === 'step') return `Step “${STEP_LABELS[deed.body.data.step]}”`;
  if (deed.kind === 'exclude') return 'Exclusion of a reading';
  const { conductivityUsCm, step } = deed.body;
  const unit = benchUnit([conductivityUsCm]);
  return `Reading ${benchConductivity(conductivityUsCm, unit)} ${unit} (${STEP_LABELS[step]})`;
}
