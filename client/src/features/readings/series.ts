import type { LivePoint } from '../../../../shared/contracts/realtime.ts';
import type { Series, SeriesPoint } from '../../../../shared/contracts/readings.ts';
import type { RangeChoice } from '../../components/charts/range-buttons.tsx';
import type { SeriesDatum } from '../../components/charts/series-model.ts';
import type { Period } from './api.ts';

export const RANGES: readonly RangeChoice[] = [
  { label: '1 h', seconds: 3600 },
  { label: '6 h', seconds: 21_600 },
  { label: '24 h', seconds: 86_400 },
  { label: '7 d', seconds: 604_800 },
  { label: '30 d', seconds: 2_592_000 },
  { label: '1 year', seconds: 31_557_600 },
  { label: '2 years', seconds: 63_115_200 },
];
export const FIRST_SPAN_MS = 21_600_000;

/** What is on screen: a span that follows the present, or one that stands still. */
export type View = { kind: 'following'; spanMs: number } | ({ kind: 'fixed' } & Period);

/** A chosen period that ends within this part of its span of the present follows it from then on. */
const NEAR = 0.02;
/** Following, the period is fetched anew after this part of its span; live points fill the time between. */
const STEPS = 60;
const SHORTEST_STEP_MS = 60_000;

export function viewOf({ from, to }: Period, now: number): View {
  const spanMs = to - from;
  if (now - to < NEAR * spanMs) return { kind: 'following', spanMs };
  return { kind: 'fixed', from, to };
}

/** The period to draw now. */
export function periodShown(view: View, now: number): Period {
  return view.kind === 'fixed' ? { from: view.from, to: view.to } : { from: now - view.spanMs, to: now };
}

/** The period to fetch: it moves in steps, so that one answer serves many redraws. */
export function periodFetched(view: View, now: number): Period {
  if (view.kind === 'fixed') return { from: Math.round(view.from), to: Math.round(view.to) };
  const step = Math.max(SHORTEST_STEP_MS, view.spanMs / STEPS);
  const to = Math.ceil(now / step) * step;
  return { from: Math.round(to - view.spanMs - step), to: Math.round(to) };
}

/** The spans over which the present U is a fair band; beyond, the extremes of each bucket say more. */
const BAND_OF_U_MS = 2 * 86_400_000;

export const showsBandOfU = ({ from, to }: Period): boolean => to - from <= BAND_OF_U_MS;

export interface Drawing {
  /** µS/cm in one unit drawn: 1 or 1000. */
  factor: number;
  /** U relative to the value, where it is known and drawn. */
  relativeUncertainty: number | null;
}

/** The answer as the chart takes it; where readings are missing the line is broken. */
export function dataOf(series: Series, drawing: Drawing): SeriesDatum[] {
  const data = series.points.map((point) => datumOf(point, drawing));
  return data.flatMap((datum, i) =>
    isGap(data, i, series.bucketSeconds)
      ? [{ t: (data[i - 1]?.t ?? datum.t) + 1, mean: null }, datum]
      : [datum],
  );
}

/** So many times the steps around it, and so many buckets, is no slow device but silence. */
const GAP_STEPS = 5;
const GAP_BUCKETS = 3;

/** Whether nothing was heard before a datum. A device may report every second or every ten minutes: its own steps tell. */
function isGap(data: readonly SeriesDatum[], i: number, bucketSeconds: number | null): boolean {
  const step = (at: number) => {
    const [from, to] = [data[at - 1], data[at]];
    return from && to ? to.t - from.t : 0;
  };
  const around = Math.max(step(i - 1), step(i + 1));
  return around > 0 && step(i) > GAP_STEPS * around && step(i) > GAP_BUCKETS * 1000 * (bucketSeconds ?? 0);
}

function datumOf(point: SeriesPoint, { factor, relativeUncertainty }: Drawing): SeriesDatum {
  const value = point.valueUsCm;
  const mean = value === null ? null : value / factor;
  const t = Date.parse(point.at);
  if (relativeUncertainty !== null) {
    return { t, mean, expandedUncertainty: mean === null ? null : Math.abs(mean) * relativeUncertainty };
  }
  // The extremes are raw; they are taken to the reference temperature in the ratio of their mean.
  const ratio = value !== null && point.conductivityUsCm ? value / point.conductivityUsCm / factor : null;
  const scaled = (extreme: number | null) => (extreme === null || ratio === null ? null : extreme * ratio);
  return { t, mean, min: scaled(point.minUsCm), max: scaled(point.maxUsCm) };
}

/** Live points as the chart takes them. */
export function liveDataOf(
  points: readonly LivePoint[],
  { factor, relativeUncertainty }: Drawing,
): SeriesDatum[] {
  return points.map((point) => {
    const mean = point.valueUsCm === null ? null : point.valueUsCm / factor;
    const U = mean === null || relativeUncertainty === null ? null : Math.abs(mean) * relativeUncertainty;
    return { t: Date.parse(point.at), mean, expandedUncertainty: U };
  });
}

/** How the period is named over the chart: `six hours`, or nothing for a chosen one. */
export function spanName(view: View): string {
  const names: Readonly<Record<number, string>> = {
    3600: 'one hour',
    21_600: 'six hours',
    86_400: '24 hours',
    604_800: 'seven days',
    2_592_000: '30 days',
    31_557_600: 'one year',
    63_115_200: 'two years',
  };
  if (view.kind === 'fixed') return 'the period chosen';
  return names[Math.round(view.spanMs / 1000)] ?? 'up to now';
}
