import type { ReactNode } from 'react';
import { useState } from 'react';
import { formatTime } from '../../../../../shared/format/dates.ts';
import type { ConductivityUnit } from '../../../../../shared/format/numbers.ts';
import { formatNumber, NO_VALUE } from '../../../../../shared/format/numbers.ts';
import { labelOf } from '../../../../../shared/format/labels.ts';
import {
  benchConductivity,
  benchUnit,
  EXCLUSION_LABELS,
} from '../../../../../shared/format/calibration-words.ts';
import { classNames } from '../../../components/ui/button.tsx';
import type { RunCapture } from '../offline/run-state.ts';
import { useBench } from './bench-context.ts';
import { ExcludeDialog } from './exclude-dialog.tsx';

export interface ReplicatesProps {
  captures: readonly RunCapture[];
  /** Rows to show in all: the replicates the procedure asks for. */
  needed: number;
  unit: ConductivityUnit;
  /** False where the step is over: nothing can be excluded any more. */
  isOpen?: boolean;
}

const WHEREABOUTS = { server: 'saved', phone: 'not yet sent', refused: 'not accepted' } as const;

/** Every captured reading, in order, with where it lies. Excluded ones stay, struck through. */
export function Replicates({ captures, needed, unit, isOpen = true }: ReplicatesProps) {
  const [excluding, setExcluding] = useState<RunCapture | null>(null);
  const counting = captures.filter((one) => one.excluded === null && one.whereabouts !== 'refused').length;
  const missing = Math.max(0, needed - counting);
  const last = captures.reduce(
    (highest, one) => (one.refusal ? highest : Math.max(highest, one.position)),
    0,
  );
  return (
    <>
      <table className="replicates">
        <caption className="sr-only">Captured readings, at least two fresh portions of the solution</caption>
        <tbody>
          {captures.map((capture) => (
            <ReplicateRow
              key={capture.key}
              capture={capture}
              unit={unit}
              status={
                isOpen && capture.excluded === null && capture.whereabouts !== 'refused' ? (
                  <button
                    type="button"
                    className="replicate-exclude"
                    aria-label={`Replicate ${capture.position}, ${WHEREABOUTS[capture.whereabouts]}; exclude…`}
                    onClick={() => setExcluding(capture)}
                  >
                    {WHEREABOUTS[capture.whereabouts]}
                  </button>
                ) : (
                  WHEREABOUTS[capture.whereabouts]
                )
              }
            />
          ))}
          {isOpen
            ? Array.from({ length: missing }, (_, i) => (
                <tr key={i} className="is-empty">
                  <th scope="row">{last + i + 1}</th>
                  <td>{i === 0 ? 'next' : ''}</td>
                  <td />
                  <td />
                </tr>
              ))
            : null}
        </tbody>
      </table>
      {excluding ? <ExcludeDialog capture={excluding} onClose={() => setExcluding(null)} /> : null}
    </>
  );
}

interface ReplicateRowProps {
  capture: RunCapture;
  unit: ConductivityUnit;
  status: ReactNode;
}

function ReplicateRow({ capture, unit, status }: ReplicateRowProps) {
  const { timeZone } = useBench();
  const { excluded, refusal } = capture;
  const value = benchConductivity(capture.conductivityUsCm, unit);
  const temperature = formatNumber(capture.temperatureC, { decimals: 2 });
  const isVoid = excluded !== null || refusal !== null;
  const notes = notesOf(capture, timeZone);
  return (
    <>
      <tr
        className={classNames(
          excluded && 'is-excluded',
          refusal && 'is-refused',
          notes.length > 0 && 'has-note',
        )}
      >
        <th scope="row">{refusal ? NO_VALUE : capture.position}</th>
        <td>
          {isVoid ? <s>{value}</s> : value} <u>{unit}</u>
        </td>
        <td>
          {isVoid ? <s>{temperature}</s> : temperature} <u>°C</u>
        </td>
        <td>{status}</td>
      </tr>
      {notes.length > 0 ? (
        <tr className={classNames('replicate-note', refusal && 'is-refused')}>
          <td />
          <td colSpan={3}>{notes.join(', ')}</td>
        </tr>
      ) : null}
    </>
  );
}

/** What else is to be said of a reading, under it. */
function notesOf(capture: RunCapture, timeZone: string): string[] {
  const { excluded, refusal, referenceTemperatureC: thermometer, referenceConductivityUsCm: meter } = capture;
  const isUnsettled = !capture.isStable && capture.step !== 'as-found-process';
  return [
    excluded &&
      `excluded: ${labelOf(EXCLUSION_LABELS, excluded.code)}${excluded.note ? `, ${excluded.note}` : ''}`,
    refusal && `captured at ${formatTime(capture.capturedAt, { timeZone })}, see below`,
    isUnsettled && 'not stable within the time-out',
    capture.source === 'typed' && 'typed',
    thermometer !== null && `thermometer ${formatNumber(thermometer, { decimals: 2, unit: '°C' })}`,
    meter !== null && `portable meter ${benchConductivity(meter, benchUnit([meter]))} ${benchUnit([meter])}`,
  ].filter((note): note is string => typeof note === 'string');
}
