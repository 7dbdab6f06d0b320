/** Reviewing the interval between calibrations. Every number of policy is a parameter: none is a law of nature. */
import { ewma } from './control-charts.ts';
import {
  InconsistentInputError,
  requireCount,
  requireFinite,
  requireNonNegative,
  requirePositive,
  requireWithin,
} from './errors.ts';
import { requireProbability } from './quantiles.ts';

/** Limits on any proposed interval, days; 0 < minDays <= maxDays. */
interface IntervalBounds {
  minDays: number;
  maxDays: number;
}

/** Factors a review may multiply an interval by: extendFactor 1 or more, reduceFactor above 0 to 1. */
interface IntervalFactors {
  extendFactor: number;
  reduceFactor: number;
}

function withinBounds(days: number, { minDays, maxDays }: IntervalBounds): number {
  requirePositive('shortest interval', minDays, 'd');
  requirePositive('longest interval', maxDays, 'd');
  if (minDays > maxDays) {
    throw new InconsistentInputError({
      quantity: 'interval limits',
      reason: `the shortest, ${minDays} d, is longer than the longest, ${maxDays} d`,
      advice: 'Exchange them.',
    });
  }
  return Math.min(maxDays, Math.max(minDays, days));
}

function requireFactors({ extendFactor, reduceFactor }: IntervalFactors): void {
  requireFinite('extending factor', extendFactor, '');
  requireWithin('extending factor', extendFactor, '', 1, Infinity);
  requirePositive('reducing factor', reduceFactor, '');
  requireWithin('reducing factor', reduceFactor, '', 0, 1);
}

/**
 * Staircase: the next interval from the last as-found error alone.
 * |e| <= f T: interval times extendFactor; |e| > T: interval times reduceFactor; between: unchanged; then held within the limits.
 * @param options.intervalDays the interval that has just ended, above 0.
 * @param options.error e, as found after cleaning, unit of the tolerance. options.tolerance T, above 0.
 * @param options.withinFraction f, above 0 to 1 (0.8 is common practice). Factors: see IntervalFactors; limits: see IntervalBounds.
 * @returns days, not rounded.
 * @throws OutOfDomainError outside those ranges; InconsistentInputError when minDays > maxDays.
 * Accuracy: exact. Source: ilac-g24 method 1; factors are policy.
 * @example staircase({ intervalDays: 90, error: 1, tolerance: 3, withinFraction: 0.8, extendFactor: 1.2, reduceFactor: 0.6, minDays: 14, maxDays: 365 }) // ≈ 108
 */
export function staircase(
  options: {
    intervalDays: number;
    error: number;
    tolerance: number;
    withinFraction: number;
  } & IntervalFactors &
    IntervalBounds,
): number {
  const { intervalDays, error, tolerance, withinFraction, extendFactor, reduceFactor } = options;
  requirePositive('interval', intervalDays, 'd');
  requireFinite('as-found error', error, '');
  requirePositive('tolerance', tolerance, '');
  requirePositive('fraction of the tolerance', withinFraction, '');
  requireWithin('fraction of the tolerance', withinFraction, '', 0, 1);
  requireFactors(options);
  const size = Math.abs(error);
  const factor = size > tolerance ? reduceFactor : size <= withinFraction * tolerance ? extendFactor : 1;
  return withinBounds(intervalDays * factor, options);
}

export interface ControlChartReview {
  intervalDays: number;
  /** signal: the newest average is outside its limits; quiet: none of the newest is beyond half of them; unsettled: neither. */
  reading: 'signal' | 'quiet' | 'unsettled';
}

/**
 * Control chart: the next interval from the run of as-found results.
 * The newest point of an EWMA outside its exact limits: times reduceFactor; the newest `quietPoints` all within half their limits:
 * times extendFactor; otherwise unchanged; then held within the limits.
 * @param options.intervalDays the interval that has just ended, above 0.
 * @param options.values as-found errors (or ln of cell constants), oldest first; target, sigma, lambda, limitWidth as in ewma.
 * @param options.quietPoints how many quiet points in a row earn a longer interval, 1 or more.
 * @returns days, not rounded, and what the chart said.
 * @throws OutOfDomainError outside those ranges; InconsistentInputError when minDays > maxDays.
 * Accuracy: that of ewma. Source: ilac-g24 method 2; factors are policy.
 * @example controlChartReview({ intervalDays: 90, values: [0.1, -0.2, 0.1], target: 0, sigma: 0.4, lambda: 0.3, limitWidth: 3, quietPoints: 3, extendFactor: 1.2, reduceFactor: 0.6, minDays: 14, maxDays: 365 }).intervalDays // ≈ 108
 */
export function controlChartReview(
  options: {
    intervalDays: number;
    values: readonly number[];
    target: number;
    sigma: number;
    lambda: number;
    limitWidth: number;
    quietPoints: number;
  } & IntervalFactors &
    IntervalBounds,
): ControlChartReview {
  const { intervalDays, quietPoints, extendFactor, reduceFactor } = options;
  requirePositive('interval', intervalDays, 'd');
  requireCount('quiet points', quietPoints, 1);
  requireFactors(options);
  const chart = ewma(options);
  const last = chart.values.length - 1;
  if (chart.signals.includes(last)) {
    return { intervalDays: withinBounds(intervalDays * reduceFactor, options), reading: 'signal' };
  }
  const isQuiet = (index: number): boolean =>
    Math.abs((chart.values[index] as number) - options.target) <=
    ((chart.upper[index] as number) - options.target) / 2;
  const newest = chart.values.map((_, index) => index).slice(-quietPoints);
  const quiet = newest.length >= quietPoints && newest.every(isQuiet);
  return {
    intervalDays: withinBounds(intervalDays * (quiet ? extendFactor : 1), options),
    reading: quiet ? 'quiet' : 'unsettled',
  };
}

/**
 * In-use time: the calendar days that remain of an interval stated in hours of use.
 * days = (H - h)/r, r = hours used/days observed; a probe hardly used runs to the longest interval.
 * @param options.intervalHours H, above 0. options.hoursUsed h since the last calibration, 0 or more.
 * @param options.daysObserved days over which those hours were counted, above 0.
 * @param options.maxDays longest wait, above 0.
 * @returns days from now, 0 to maxDays, not rounded; 0 when the hours are used up.
 * @throws OutOfDomainError outside those ranges.
 * Accuracy: as good as the assumption that use goes on as before. Source: ilac-g24 method 3.
 * @example inUseTimeReview({ intervalHours: 1000, hoursUsed: 400, daysObserved: 50, maxDays: 365 }) // ≈ 75
 */
export function inUseTimeReview(options: {
  intervalHours: number;
  hoursUsed: number;
  daysObserved: number;
  maxDays: number;
}): number {
  const { intervalHours, hoursUsed, daysObserved, maxDays } = options;
  requirePositive('interval in hours of use', intervalHours, 'h');
  requireNonNegative('hours used', hoursUsed, 'h');
  requirePositive('days observed', daysObserved, 'd');
  requirePositive('longest interval', maxDays, 'd');
  if (hoursUsed >= intervalHours) return 0;
  if (hoursUsed === 0) return maxDays;
  return Math.min(maxDays, ((intervalHours - hoursUsed) * daysObserved) / hoursUsed);
}

/** Mean of a Poisson variable that would give this many events or fewer with a stated chance. */
function poissonMeanAt(events: number, chance: number): number {
  const chanceOfSoFew = (mean: number): number => {
    let sum = 0;
    let logTerm = -mean;
    for (let n = 0; n <= events; n += 1) {
      sum += Math.exp(logTerm);
      logTerm += Math.log(mean / (n + 1));
    }
    return sum;
  };
  let [low, high] = [0, events + 1];
  while (chanceOfSoFew(high) > chance) high *= 2;
  // 60 halvings use up the digits of a double.
  for (let halving = 0; halving < 60; halving += 1) {
    const middle = (low + high) / 2;
    if (middle > 0 && chanceOfSoFew(middle) < chance) high = middle;
    else low = middle;
  }
  return high;
}

export interface GroupReliability {
  /** Found out of tolerance per probe-year. */
  ratePerYear: number;
  /** Interval at whose end the target share is still in tolerance; Infinity when nothing was ever found out. */
  intervalYears: number;
  /** Rate that the record cannot rule out, and the interval it allows: always finite, and what a cautious review uses. */
  upperRatePerYear: number;
  cautiousIntervalYears: number;
}

/**
 * Reliability of a group of like probes, with a constant rate of going out of tolerance.
 * R(t) = exp(-rate t); rate = failures/exposure; interval = -ln(R_target)/rate. The upper rate is the exact one-sided Poisson bound:
 * the mean m with P(N <= failures | m) = 1 - confidence, over the exposure; with no failure it is -ln(1 - confidence)/exposure.
 * @param options.failures times found out of tolerance, a whole number from 0 to 100 000.
 * @param options.exposureYears probe-years observed, above 0. options.target R_target, 0 to 1, ends excluded.
 * @param options.confidence of the upper rate, 0 to 1, ends excluded; 0.9 unless given.
 * @returns rates per year and intervals in years.
 * @throws OutOfDomainError outside those ranges.
 * Accuracy: 1e-12 relative. Source: ilac-g24 method 5; nist-handbook 8.1.6.1 (constant rate).
 * @example groupReliability({ failures: 4, exposureYears: 40, target: 0.95 }).intervalYears // ≈ 0.51293
 */
export function groupReliability(options: {
  failures: number;
  exposureYears: number;
  target: number;
  confidence?: number;
}): GroupReliability {
  const { failures, exposureYears, target, confidence = 0.9 } = options;
  requireCount('failures', failures, 0);
  requireWithin('failures', failures, '', 0, 100_000);
  requirePositive('exposure', exposureYears, 'probe-years');
  requireProbability('reliability target', target);
  requireProbability('confidence', confidence);
  const ratePerYear = failures / exposureYears;
  const upperRatePerYear = poissonMeanAt(failures, 1 - confidence) / exposureYears;
  return {
    ratePerYear,
    intervalYears: -Math.log(target) / ratePerYear,
    upperRatePerYear,
    cautiousIntervalYears: -Math.log(target) / upperRatePerYear,
  };
}

/**
 * The interval to plan with: the shortest of what applies, changed by no more than a stated factor from the last one.
 * days = min(policy, predicted, every ceiling, last x growFactor). The shortest interval lifts the result, except above a ceiling:
 * a bottle's life or a regulation is not stretched because visits are unwelcome.
 * @param options.lastDays last interval, above 0. options.predictedDays from forecastDue. options.ceilings further limits in days
 *   (lot life, regulation), each above 0.
 * @param options.growFactor largest step up, 1 or more (1.5 is common practice). Limits: see IntervalBounds.
 * @returns days, not rounded, and which bound decided.
 * @throws OutOfDomainError outside those ranges; InconsistentInputError when minDays > maxDays.
 * Accuracy: exact. Source: ilac-g24; factors are policy.
 * @example plannedInterval({ lastDays: 90, predictedDays: 300, growFactor: 1.5, minDays: 14, maxDays: 365 }).intervalDays // ≈ 135
 */
export function plannedInterval(
  options: {
    lastDays: number;
    predictedDays: number;
    ceilings?: readonly number[];
    growFactor: number;
  } & IntervalBounds,
): { intervalDays: number; decidedBy: 'forecast' | 'step' | 'ceiling' | 'policy' | 'floor' } {
  const { lastDays, predictedDays, ceilings = [], growFactor, minDays, maxDays } = options;
  requirePositive('last interval', lastDays, 'd');
  requireNonNegative('predicted days', predictedDays, 'd');
  requireFinite('largest step up', growFactor, '');
  requireWithin('largest step up', growFactor, '', 1, Infinity);
  ceilings.forEach((ceiling, index) => requirePositive(`ceiling ${index + 1}`, ceiling, 'd'));
  withinBounds(lastDays, options);
  const candidates = [
    { intervalDays: predictedDays, decidedBy: 'forecast' as const },
    { intervalDays: lastDays * growFactor, decidedBy: 'step' as const },
    { intervalDays: maxDays, decidedBy: 'policy' as const },
    ...ceilings.map((ceiling) => ({ intervalDays: ceiling, decidedBy: 'ceiling' as const })),
  ];
  const shortest = candidates.reduce((best, next) => (next.intervalDays < best.intervalDays ? next : best));
  if (shortest.intervalDays >= minDays || shortest.decidedBy === 'ceiling') return shortest;
  const lowestCeiling = Math.min(...ceilings);
  if (lowestCeiling < minDays) return { intervalDays: lowestCeiling, decidedBy: 'ceiling' };
  return { intervalDays: minDays, decidedBy: 'floor' };
}
