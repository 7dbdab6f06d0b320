import type { Criteria } from '../../../../../shared/contracts/procedures.ts';
import type { LivePoint } from '../../../../../shared/contracts/realtime.ts';

/** What a window of readings is held to, from the procedure. */
export type SettleLimits = Pick<
  Criteria,
  'stabilityWindowS' | 'stabilityRangePercent' | 'stabilitySlopePercentPerMin' | 'temperatureRangeC'
> & {
  /**
   * Percentages are of the mean, but never of less than this: dry in air the mean is near zero and any noise would be
   * hundreds of per cent of it.
   */
  leastBaseUsCm?: number;
};

export type SettleState = 'gathering' | 'unsettled' | 'stable';
export type SettleQuantity = 'conductivity-range' | 'conductivity-slope' | 'temperature-range';

/** One quantity over the window: how far apart its readings lie, and where it is heading. */
export interface WindowFigures {
  mean: number;
  /** Midway between lowest and highest: the channel of the trace is drawn around it. */
  middle: number;
  range: number;
  slopePerMin: number;
}

export interface Settling {
  state: SettleState;
  /** Seconds of the window filled so far. */
  filledS: number;
  conductivity: (WindowFigures & { rangePercent: number; slopePercentPerMin: number }) | null;
  temperature: WindowFigures | null;
  /** What still moves too much. */
  exceeded: readonly SettleQuantity[];
}

interface SettlePoint {
  atMs: number;
  conductivityUsCm: number;
  temperatureC: number;
}

/** Fewer readings say nothing about a trend, however long they took. */
const LEAST_READINGS = 5;
/** A window counts as full from this share: readings do not fall exactly on its edge. */
const FULL_SHARE = 0.95;

/**
 * Judges the readings of the last window, which ends with the newest reading by the device's own clock. A gap of half
 * a window begins a new one: nobody knows what happened in between.
 */
export function judgeSettling(points: readonly LivePoint[], limits: SettleLimits, sinceMs = 0): Settling {
  const window = newestWindow(points, limits.stabilityWindowS, sinceMs);
  const first = window[0];
  const last = window.at(-1);
  const filledS = first && last ? (last.atMs - first.atMs) / 1000 : 0;
  if (!first || !last || window.length < 2) {
    return { state: 'gathering', filledS: 0, conductivity: null, temperature: null, exceeded: [] };
  }
  const inSolution = figuresOf(window, (point) => point.conductivityUsCm);
  const base = Math.max(Math.abs(inSolution.mean), limits.leastBaseUsCm ?? 0) || 1;
  const conductivity = {
    ...inSolution,
    rangePercent: (100 * inSolution.range) / base,
    slopePercentPerMin: (100 * inSolution.slopePerMin) / base,
  };
  const temperature = figuresOf(window, (point) => point.temperatureC);
  const exceeded = (
    [
      ['conductivity-range', conductivity.rangePercent > limits.stabilityRangePercent],
      ['conductivity-slope', Math.abs(conductivity.slopePercentPerMin) > limits.stabilitySlopePercentPerMin],
      ['temperature-range', temperature.range > limits.temperatureRangeC],
    ] as const
  )
    .filter(([, isExceeded]) => isExceeded)
    .map(([quantity]) => quantity);
  const isFull = filledS >= FULL_SHARE * limits.stabilityWindowS && window.length >= LEAST_READINGS;
  const state = exceeded.length > 0 ? 'unsettled' : isFull ? 'stable' : 'gathering';
  return { state, filledS, conductivity, temperature, exceeded };
}

/** The readings that the window holds, oldest first: usable ones, without a gap. */
function newestWindow(points: readonly LivePoint[], windowS: number, sinceMs: number): SettlePoint[] {
  const window: SettlePoint[] = [];
  let endMs: number | null = null;
  let afterMs = Infinity;
  for (let i = points.length - 1; i >= 0; i -= 1) {
    const point = points[i]!;
    const atMs = Date.parse(point.at);
    endMs ??= atMs;
    if (atMs < sinceMs || endMs - atMs > windowS * 1000) break;
    if (afterMs !== Infinity && afterMs - atMs > windowS * 500) break;
    afterMs = atMs;
    // A sensor that has failed is not settling, it says nothing.
    if (point.conductivityUsCm === null || point.temperatureC === null || point.quality === 'bad') break;
    window.push({ atMs, conductivityUsCm: point.conductivityUsCm, temperatureC: point.temperatureC });
  }
  return window.reverse();
}

/** Mean, range and least-squares slope of one quantity. */
function figuresOf(window: readonly SettlePoint[], read: (point: SettlePoint) => number): WindowFigures {
  const values = window.map(read);
  const minutes = window.map((point) => (point.atMs - window[0]!.atMs) / 60_000);
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  const meanMinute = minutes.reduce((sum, minute) => sum + minute, 0) / minutes.length;
  let upper = 0;
  let lower = 0;
  minutes.forEach((minute, i) => {
    upper += (minute - meanMinute) * (values[i]! - mean);
    lower += (minute - meanMinute) ** 2;
  });
  const low = Math.min(...values);
  const high = Math.max(...values);
  return {
    mean,
    middle: (low + high) / 2,
    range: high - low,
    slopePerMin: lower > 0 ? upper / lower : 0,
  };
}

/** Seconds until "not stable" is itself the result; 0 when that time has come. */
export function timeoutLeftS(waitingSinceMs: number, nowMs: number, stabilityTimeoutS: number): number {
  return Math.max(0, stabilityTimeoutS - Math.max(0, nowMs - waitingSinceMs) / 1000);
}

/** Silence after which a stream is taken for gone: several of its own intervals, never less than ten seconds. */
export function silenceLimitMs(points: readonly LivePoint[]): number {
  const recent = points.slice(-6).map((point) => Date.parse(point.at));
  const gaps = recent.slice(1).map((at, i) => at - recent[i]!);
  const longest = gaps.length > 0 ? Math.max(...gaps) : 0;
  return Math.max(10_000, Math.min(120_000, 3 * longest + 2000));
}
