import type { ReactNode } from 'react';
import { useState } from 'react';
import type { ExclusionCode } from '../../../../../shared/contracts/vocabulary.ts';
import { formatTime } from '../../../../../shared/format/dates.ts';
import type { ConductivityUnit } from '../../../../../shared/format/numbers.ts';
import { formatNumber } from '../../../../../shared/format/numbers.ts';
import { labelOf } from '../../../../../shared/format/labels.ts';
import { classNames } from '../../../components/ui/button.tsx';
import type { RunCapture } from '../offline/run-state.ts';
import { EXCLUSION_LABELS } from '../words.ts';
import { benchConductivity } from './bench-figures.ts';
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
                    aria-label={`Replicate ${capture.position}, ${WHEREABOUTS[capture.whereabouts]}: exclude it`}
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
                  <th scope="row">{captures.length + i + 1}</th>
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
  return (
    <tr className={classNames(excluded && 'is-excluded', refusal && 'is-refused')}>
      <th scope="row">{capture.position}</th>
      <td>
        {isVoid ? <s>{value}</s> : value} <u>{unit}</u>
        {excluded ? (
          <small>
            excluded: {labelOf(EXCLUSION_LABELS as Record<string, string>, excluded.code as ExclusionCode)}
            {excluded.note ? `, ${excluded.note}` : ''}
          </small>
        ) : null}
        {refusal ? <small>at {formatTime(capture.capturedAt, { timeZone })}, see below</small> : null}
        {!isVoid && !capture.isStable ? <small>not stable within the time-out</small> : null}
        {!isVoid && capture.source === 'typed' ? <small>typed</small> : null}
      </td>
      <td>
        {isVoid ? <s>{temperature}</s> : temperature} <u>°C</u>
        {capture.referenceTemperatureC !== null ? (
          <small>thermometer {formatNumber(capture.referenceTemperatureC, { decimals: 2 })} °C</small>
        ) : null}
        {capture.referenceConductivityUsCm !== null ? (
          <small>meter {benchConductivity(capture.referenceConductivityUsCm, unit)}</small>
        ) : null}
      </td>
      <td>{status}</td>
    </tr>
  );
}
