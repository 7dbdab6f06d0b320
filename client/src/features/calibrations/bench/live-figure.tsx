import type { LivePoint } from '../../../../../shared/contracts/realtime.ts';
import type { ConductivityUnit } from '../../../../../shared/format/numbers.ts';
import { formatNumber } from '../../../../../shared/format/numbers.ts';
import { classNames } from '../../../components/ui/button.tsx';
import { benchConductivity } from './bench-figures.ts';

export interface LiveFigureProps {
  /** The newest reading; null while the stream is silent. */
  reading: LivePoint | null;
  unit: ConductivityUnit;
  /** What the probe is in: `bottle KC-26-031/07`. */
  place: string;
  /** Why nothing is shown. */
  silence: string | null;
}

/** The raw reading, legible at arm's length, with the temperature that belongs to it. */
export function LiveFigure({ reading, unit, place, silence }: LiveFigureProps) {
  const value = benchConductivity(reading?.conductivityUsCm ?? null, unit);
  return (
    <>
      <p className={classNames('bench-raw', silence !== null && 'is-gone')}>
        <b className={value.length > 7 ? 'is-long' : undefined}>{silence === null ? value : '–'}</b>
        <span>{unit}</span>
      </p>
      <p className="bench-sub">
        <span>{silence ?? `raw · ${place}`}</span>
        <b>{silence === null ? formatNumber(reading?.temperatureC, { decimals: 2 }) : '–'} °C</b>
      </p>
    </>
  );
}
