import type { Calibration } from '../../../../../shared/contracts/calibrations.ts';
import { formatDateTime, formatTime } from '../../../../../shared/format/dates.ts';
import { STEP_LABELS } from '../../../../../shared/format/calibration-words.ts';
import { SectionTitle } from '../../../components/ui/page-head.tsx';

type Step = Calibration['steps'][number];

/** The order in which it was done, with the times it was done and heard of. */
export function StepLog({ run, timeZone }: { run: Calibration; timeZone: string }) {
  return (
    <section>
      <SectionTitle note="captured at the probe">Step by step</SectionTitle>
      <div className="run-table-frame">
        <table className="run-table">
          <tbody>
            {run.steps.map((step, i) => (
              <tr key={step.step}>
                <td>{i + 1}</td>
                <td>{STEP_LABELS[step.step]}</td>
                <td>
                  {step.capturedAt ? formatDateTime(step.capturedAt, { timeZone, seconds: true }) : '–'}
                </td>
                <td className="is-words">
                  {[step.by, recorded(step), lateWords(step, timeZone)].filter(Boolean).join(' · ')}
                </td>
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </section>
  );
}

function lateWords({ capturedAt, receivedAt }: Step, timeZone: string): string | null {
  if (!capturedAt || !receivedAt || Date.parse(receivedAt) - Date.parse(capturedAt) < 60_000) return null;
  return `received ${formatTime(receivedAt, { timeZone, seconds: true })}`;
}

/** What a step recorded beside its readings, in words. */
function recorded({ step, data }: Step): string | null {
  const facts = (data ?? {}) as Record<string, unknown>;
  const text = (name: string): string | null => {
    const value = facts[name];
    return typeof value === 'string' || typeof value === 'number' ? String(value) : null;
  };
  switch (step) {
    case 'identify':
      return `serial ${text('serial') ?? '–'}, ${facts.by === 'scan' ? 'scanned' : 'typed'}`;
    case 'pre-checks':
      return [
        'cautions read',
        facts.controlRoomTold ? 'control room told' : null,
        text('permitNumber') ? `permit ${text('permitNumber')}` : null,
      ]
        .filter(Boolean)
        .join(', ');
    case 'as-found-process':
      return `compared with ${String(facts.comparedWith ?? 'nothing').replace('-', ' ')}`;
    case 'clean':
      return `${text('agent') ?? '–'}, ${text('minutes') ?? '–'} min`;
    case 'decide':
      return [facts.decision === 'adjust' ? 'adjusted' : 'left as it is', text('reason')]
        .filter(Boolean)
        .join(': ');
    default:
      return text('note');
  }
}
