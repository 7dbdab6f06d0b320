import { formatDateTime } from '../../../../shared/format/dates.ts';
import { formatNumber } from '../../../../shared/format/numbers.ts';

/** One reading or one bucket of readings. */
export interface SeriesDatum {
  /** ms since 1970; the start of a bucket. */
  t: number;
  /** The reading, or the mean of the bucket; null is a gap. */
  mean: number | null;
  /** Extremes of the bucket. */
  min?: number | null;
  max?: number | null;
  /** Expanded uncertainty of the value; drawn as a band. */
  expandedUncertainty?: number | null;
}

/** Limits are always drawn: a chart without them says nothing about the process. */
export interface SeriesLimit {
  value: number;
  /** "high limit" */
  label: string;
}

/** The datum nearest in time; data are in order of time. */
export function nearestDatum(points: readonly SeriesDatum[], t: number): SeriesDatum | null {
  let low = 0;
  let high = points.length - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if ((points[middle]?.t ?? 0) <= t) low = middle;
    else high = middle;
  }
  const [a, b] = [points[low], points[high]];
  if (!a || !b) return null;
  return t - a.t <= b.t - t ? a : b;
}

/** The live points that are newer than the fetched ones, so that none is drawn twice. */
export function newerThan(
  points: readonly SeriesDatum[],
  live: readonly SeriesDatum[],
): readonly SeriesDatum[] {
  const last = points.at(-1)?.t ?? -Infinity;
  const first = live.findIndex((point) => point.t > last);
  return first === -1 ? [] : live.slice(first);
}

/** Lowest and highest of everything drawn, bands and limits included; null when nothing is. */
export function valueExtent(
  points: readonly SeriesDatum[],
  limits: readonly SeriesLimit[],
): { low: number; high: number } | null {
  let low = Infinity;
  let high = -Infinity;
  for (const { mean, min, max, expandedUncertainty } of points) {
    if (mean === null) continue;
    const U = expandedUncertainty ?? 0;
    low = Math.min(low, min ?? mean, mean - U);
    high = Math.max(high, max ?? mean, mean + U);
  }
  if (low > high) return null;
  const span = high - low || Math.abs(high) * 0.02 || 1;
  // A limit far from the readings would press them into a line; it is then named in words instead.
  for (const { value } of limits) {
    if (value > high && value - high < 2 * span) high = value;
    if (value < low && low - value < 2 * span) low = value;
  }
  const air = (high - low || span) * 0.08;
  return { low: low - air, high: high + air };
}

export interface SeriesWordsOptions {
  label: string;
  unit: string;
  decimals: number;
  points: readonly SeriesDatum[];
  from: number;
  to: number;
  timeZone: string;
  limits: readonly SeriesLimit[];
}

/** The chart in a sentence, for its text alternative. */
export function seriesWords(options: SeriesWordsOptions): string {
  const { label, unit, decimals, points, from, to, timeZone, limits } = options;
  const span = `${formatDateTime(from, { timeZone })} to ${formatDateTime(to, { timeZone })}`;
  const known = points.filter((point) => point.mean !== null);
  const last = known.at(-1)?.mean;
  if (last == null) return `${label}, ${span}: no readings.`;
  const figure = (value: number) => formatNumber(value, { decimals, unit });
  const lowest = known.reduce((low, point) => Math.min(low, point.min ?? point.mean ?? low), Infinity);
  const highest = known.reduce((high, point) => Math.max(high, point.max ?? point.mean ?? high), -Infinity);
  const bounds = limits.map((limit) => ` ${limit.label} ${figure(limit.value)}.`).join('');
  return `${label}, ${span}: between ${figure(lowest)} and ${figure(highest)}, last ${figure(last)}.${bounds}`;
}
