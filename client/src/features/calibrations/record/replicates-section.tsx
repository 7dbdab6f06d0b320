import type { Calibration, Capture, Verdict } from '../../../../../shared/contracts/calibrations.ts';
import type { RunStep } from '../../../../../shared/contracts/vocabulary.ts';
import { formatTime } from '../../../../../shared/format/dates.ts';
import { capitalise } from '../../../../../shared/format/labels.ts';
import { formatNumber, formatSigned } from '../../../../../shared/format/numbers.ts';
import {
  EXCLUSION_LABELS,
  SOURCE_LABELS,
  STEP_LABELS,
  benchConductivity,
  benchUnit,
} from '../../../../../shared/format/calibration-words.ts';
import { SectionTitle } from '../../../components/ui/page-head.tsx';

/** A capture that reached the server later than this was made without network. */
const OFFLINE_MS = 60_000;

/** Every captured reading of the run, by step; excluded ones struck through with their reason. */
export function ReplicatesSection({ run, timeZone }: { run: Calibration; timeZone: string }) {
  const steps = run.steps.filter(({ step }) => run.captures.some((capture) => capture.step === step));
  if (steps.length === 0) return null;
  return (
    <section>
      <SectionTitle note="raw, as captured">Readings</SectionTitle>
      <div className="run-table-frame">
        <table className="run-table run-readings">
          {steps.map(({ step }) => {
            const captures = run.captures.filter((capture) => capture.step === step);
            const unit = benchUnit(captures.map((one) => one.conductivityUsCm));
            return (
              <tbody key={step}>
                <tr>
                  <th scope="rowgroup" colSpan={5}>
                    {capitalise(STEP_LABELS[step])}, {unit}
                    {scatterWords(run, step)}
                  </th>
                </tr>
                {captures.map((capture) => (
                  <ReplicateLine key={capture.id} {...{ capture, unit, timeZone }} />
                ))}
              </tbody>
            );
          })}
        </table>
      </div>
      <p className="run-note">{circumstances(run.captures)}</p>
    </section>
  );
}

/** How far the replicates of a state lie apart. */
function scatterWords({ judgement }: Calibration, step: RunStep): string {
  const verdicts: Partial<Record<RunStep, Verdict | null>> = {
    'as-found': judgement.asFound,
    'as-found-cleaned': judgement.cleaned,
    'second-point': judgement.secondPoint,
    'as-left': judgement.asLeft,
  };
  const verdict = verdicts[step];
  return verdict ? `, s = ${formatNumber(verdict.repeatabilityPercent, { decimals: 2, unit: '%' })}` : '';
}

/** What was left out, what came late, and how far the phone could be trusted for the time. */
function circumstances(captures: readonly Capture[]): string {
  const offsets = captures.map((one) => one.clockOffsetMs).filter((one) => one !== null);
  const widest = offsets.reduce((most, one) => (Math.abs(one) > Math.abs(most) ? one : most), 0);
  const isLate = (one: Capture) => Date.parse(one.receivedAt) - Date.parse(one.capturedAt) > OFFLINE_MS;
  return [
    captures.some((one) => one.excluded) ? null : 'None excluded.',
    captures.some(isLate) ? 'Captured without network, sent later.' : null,
    offsets.length > 0
      ? `The phone’s clock stood at most ${formatSigned(widest / 1000, 1, 's')} against the server.`
      : null,
  ]
    .filter(Boolean)
    .join(' ');
}

interface ReplicateLineProps {
  capture: Capture;
  unit: ReturnType<typeof benchUnit>;
  timeZone: string;
}

function ReplicateLine({ capture, unit, timeZone }: ReplicateLineProps) {
  const { excluded } = capture;
  const value = benchConductivity(capture.conductivityUsCm, unit);
  const temperature = formatNumber(capture.temperatureC, { decimals: 2, unit: '°C' });
  return (
    <tr>
      <td>{capture.position}</td>
      <td>{excluded ? <s>{value}</s> : value}</td>
      <td>{excluded ? <s>{temperature}</s> : temperature}</td>
      <td>{formatTime(capture.capturedAt, { timeZone, seconds: true })}</td>
      <td className="is-words">
        {[
          SOURCE_LABELS[capture.source],
          capture.isStable || capture.step === 'as-found-process' ? null : 'not stable within the time-out',
          capture.referenceTemperatureC === null
            ? null
            : `thermometer ${formatNumber(capture.referenceTemperatureC, { decimals: 2, unit: '°C' })}`,
          capture.referenceConductivityUsCm === null
            ? null
            : `portable meter ${benchConductivity(capture.referenceConductivityUsCm, unit)}`,
          excluded
            ? `excluded by ${excluded.by}: ${EXCLUSION_LABELS[excluded.code]}${excluded.note ? `, ${excluded.note}` : ''}`
            : null,
        ]
          .filter(Boolean)
          .map((words, i) => (i === 0 ? capitalise(words!) : words))
          .join(', ')}
      </td>
    </tr>
  );
}
