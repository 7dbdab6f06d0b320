import { formatNumber, formatSigned } from '../../../../../shared/format/numbers.ts';
import { classNames } from '../../../components/ui/button.tsx';
import type { SettleLimits, Settling } from './stability.ts';

export interface SettlePanelProps {
  settling: Settling;
  limits: SettleLimits;
  /** Seconds until "not stable" is the result. */
  leftS: number;
  isMuted: boolean;
  onMute: (isMuted: boolean) => void;
}

/** Stable or not yet, in words, with what decides it: range and slope of both quantities against their limits. */
export function SettlePanel({ settling, limits, leftS, isMuted, onMute }: SettlePanelProps) {
  const { conductivity, temperature, exceeded, state } = settling;
  const percent = (value: number | undefined) => formatNumber(value, { decimals: 2, unit: '%' });
  const mark = (quantity: (typeof exceeded)[number]) =>
    exceeded.includes(quantity) ? 'is-exceeded' : undefined;
  return (
    <>
      <p className="bench-settle">
        <b aria-live="polite">{state === 'stable' ? 'Stable' : 'Not stable yet'}</b>
        <span>{restWords(settling, limits, leftS)}</span>
        <button
          type="button"
          className="bench-sound"
          aria-pressed={!isMuted}
          onClick={() => onMute(!isMuted)}
        >
          {isMuted ? 'sound off' : 'sound on'}
        </button>
      </p>
      <dl className="bench-settle-figures">
        <dt>κ</dt>
        <dd className={classNames(mark('conductivity-range'))}>
          range {percent(conductivity?.rangePercent)} of {percent(limits.stabilityRangePercent)}
        </dd>
        <dd className={classNames(mark('conductivity-slope'))}>
          {conductivity ? formatSigned(conductivity.slopePercentPerMin, 2) : '–'} of ±
          {formatNumber(limits.stabilitySlopePercentPerMin, { decimals: 2, unit: '%/min' })}
        </dd>
        <dt>T</dt>
        <dd className={classNames(mark('temperature-range'))}>
          range {formatNumber(temperature?.range, { decimals: 2 })}
          {Number.isFinite(limits.temperatureRangeC)
            ? ` of ${formatNumber(limits.temperatureRangeC, { decimals: 2, unit: '°C' })}`
            : ' °C'}
        </dd>
        <dd>{temperature ? formatSigned(temperature.slopePerMin, 2) : '–'} °C/min</dd>
      </dl>
    </>
  );
}

function restWords(settling: Settling, limits: SettleLimits, leftS: number): string {
  if (settling.state === 'stable') return '';
  if (leftS <= 0) return 'time-out reached';
  const left = `time-out in ${Math.floor(leftS / 60)}:${String(Math.floor(leftS % 60)).padStart(2, '0')}`;
  const missingS = Math.ceil(limits.stabilityWindowS - settling.filledS);
  return settling.state === 'gathering' && missingS > 0 ? `${missingS} s more · ${left}` : left;
}
