import type { LivePoint } from '../../../../../shared/contracts/realtime.ts';
import type { ConductivityUnit } from '../../../../../shared/format/numbers.ts';
import { formatNumber, GROUP_SEPARATOR, NO_VALUE } from '../../../../../shared/format/numbers.ts';
import { benchConductivity } from '../../../../../shared/format/calibration-words.ts';
import { classNames } from '../../../components/ui/button.tsx';

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
        <b className={value.length > 7 ? 'is-long' : undefined}>
          {silence === null ? <Grouped text={value} /> : NO_VALUE}
        </b>
        <span>{unit}</span>
      </p>
      <p className="bench-sub">
        <span>{silence ?? `raw · ${place}`}</span>
        <b>{silence === null ? formatNumber(reading?.temperatureC, { decimals: 2 }) : '–'} °C</b>
      </p>
    </>
  );
}

/** In mono a thin space is as wide as a digit; at this size it would tear the figure apart. */
function Grouped({ text }: { text: string }) {
  const [first, ...others] = text.split(GROUP_SEPARATOR);
  return (
    <>
      {first}
      {others.map((group, i) => (
        <span key={i} className="bench-group">
          {group}
        </span>
      ))}
    </>
  );
}
