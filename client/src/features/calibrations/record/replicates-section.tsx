import type { Calibration, Capture } from '../../../../../shared/contracts/calibrations.ts';
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
  return steps.map(({ step }) => (
    <StepReplicates
      key={step}
      name={`Readings, ${STEP_LABELS[step]}`}
      captures={run.captures.filter((capture) => capture.step === step)}
      timeZone={timeZone}
    />
  ));
}

interface StepReplicatesProps {
  name: string;
  captures: readonly Capture[];
  timeZone: string;
}

function StepReplicates({ name, captures, timeZone }: StepReplicatesProps) {
  const unit = benchUnit(captures.map((one) => one.conductivityUsCm));
  const offsets = captures.map((one) => one.clockOffsetMs).filter((one) => one !== null);
  const isOffline = captures.some(
    (one) => Date.parse(one.receivedAt) - Date.parse(one.capturedAt) > OFFLINE_MS,
  );
  const excluded = captures.filter((one) => one.excluded !== null).length;
  return (
    <section>
      <SectionTitle note={`${unit}, raw`}>{name}</SectionTitle>
      <div className="run-table-frame">
        <table className="run-table">
          <tbody>
            {captures.map((capture) => (
              <ReplicateLine key={capture.id} {...{ capture, unit, timeZone }} />
            ))}
          </tbody>
        </table>
      </div>
      <p className="run-note">
        {excluded === 0 ? 'None excluded.' : ''} {isOffline ? 'Captured without network, sent later.' : ''}{' '}
        {offsets.length > 0
          ? `The phone’s clock stood ${formatSigned(offsets[0]! / 1000, 1, 's')} against the server.`
          : ''}
      </p>
    </section>
  );
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
