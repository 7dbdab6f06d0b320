import { formatNumber, MINUS, NO_VALUE } from '../../../../../shared/format/numbers.ts';
import type { SettleLimits, Settling } from './stability.ts';

export interface SettlePanelProps {
  settling: Settling;
  limits: SettleLimits;
  /** Seconds until "not stable" is the result; null where one may capture at any time. */
  leftS: number | null;
}

/** Stable or not yet, in words, with what decides it: range and slope of both quantities against their limits. */
export function SettlePanel({ settling, limits, leftS }: SettlePanelProps) {
  const { conductivity, temperature, exceeded, state } = settling;
  const mark = (quantity: (typeof exceeded)[number]) =>
    exceeded.includes(quantity) ? 'is-exceeded' : undefined;
  return (
    <>
      <p className="bench-settle">
        <b aria-live="polite">{state === 'stable' ? 'Stable' : 'Not stable yet'}</b>
        <span>{restWords(settling, limits, leftS)}</span>
      </p>
      <dl className="bench-settle-figures">
        <dt>κ</dt>
        <dd className={mark('conductivity-range')}>
          range {bounded(conductivity?.rangePercent)} of{' '}
          {formatNumber(limits.stabilityRangePercent, { decimals: 2, unit: '%' })}
        </dd>
        <dd className={mark('conductivity-slope')}>
          slope {bounded(conductivity?.slopePercentPerMin)} of{' '}
          {formatNumber(limits.stabilitySlopePercentPerMin, { decimals: 2, unit: '%/min' })}
        </dd>
        <dt>T</dt>
        <dd className={mark('temperature-range')}>
          range {bounded(temperature?.range)}
          {Number.isFinite(limits.temperatureRangeC)
            ? ` of ${formatNumber(limits.temperatureRangeC, { decimals: 2, unit: '°C' })}`
            : ' °C'}
        </dd>
        <dd>slope {bounded(temperature?.slopePerMin)} °C/min</dd>
      </dl>
    </>
  );
}

/** Beyond this a figure that should be near zero needs no decimals to be read. */
const FAR = 10;

function bounded(value: number | undefined): string {
  if (value === undefined) return NO_VALUE;
  if (Math.abs(value) >= FAR) return `${value < 0 ? '<' + MINUS : '>'}${FAR}`;
  return formatNumber(value, { decimals: 2 });
}

function restWords(settling: Settling, limits: SettleLimits, leftS: number | null): string {
  if (settling.state === 'stable') return '';
  const missingS = Math.ceil(limits.stabilityWindowS - settling.filledS);
  const more = settling.state === 'gathering' && missingS > 0 ? `${missingS} s more` : null;
  if (leftS === null) return more ?? '';
  if (leftS <= 0) return 'time-out reached';
  const seconds = String(Math.floor(leftS % 60)).padStart(2, '0');
  return [more, `time-out ${Math.floor(leftS / 60)}:${seconds}`].filter(Boolean).join(' · ');
}
