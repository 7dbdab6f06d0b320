/** Control charts: small lasting shifts that no single point shows. */
import {
  InconsistentInputError,
  requireFinite,
  requireNonNegative,
  requirePositive,
  requireWithin,
} from './errors.ts';

export interface EwmaChart {
  /** Exponentially weighted mean after each value, unit of the values. */
  values: number[];
  /** Limits that belong to each point, same unit. */
  lower: number[];
  upper: number[];
  /** Indices, from 0, of points outside their limits. */
  signals: number[];
}

export interface CusumChart {
  /** Upward and downward sums after each value, 0 or more, unit of the values. */
  high: number[];
  low: number[];
  /** Indices, from 0, of points where a sum exceeds the decision interval. */
  signals: number[];
}

function requireSeries(values: readonly number[]): void {
  if (values.length === 0) {
    throw new InconsistentInputError({
      quantity: 'control chart',
      reason: 'it has no values',
      advice: 'Give at least one.',
    });
  }
  values.forEach((value, index) => requireFinite(`value ${index + 1} of the control chart`, value, ''));
}

/**
 * Exponentially weighted moving average with the exact limits of each point.
 * z_i = lambda x_i + (1 - lambda) z_(i-1), z_0 = target; limits target +- L sigma sqrt(lambda/(2 - lambda) (1 - (1 - lambda)^(2i))).
 * The limits widen from the first point on: with the limits of a long run an early shift goes unseen.
 * @param options.values at least one, any one unit. options.target, same unit.
 * @param options.lambda weight of the newest value, above 0 to 1 (0.2 to 0.3 is usual).
 * @param options.sigma standard deviation of one value, above 0, same unit. options.limitWidth L, above 0 (3 is usual).
 * @returns the average, its limits and the indices (from 0) that lie outside.
 * @throws OutOfDomainError outside those ranges; InconsistentInputError for an empty list.
 * Accuracy: 1e-14 relative. Source: nist-ewma.
 * @example ewma({ values: [52, 47], lambda: 0.3, target: 50, sigma: 2.0539, limitWidth: 3 }).upper[0] // ≈ 51.84851
 */
export function ewma(options: {
  values: readonly number[];
  lambda: number;
  target: number;
  sigma: number;
  limitWidth: number;
}): EwmaChart {
  const { values, lambda, target, sigma, limitWidth } = options;
  requireSeries(values);
  requirePositive('weight of the newest value', lambda, '');
  requireWithin('weight of the newest value', lambda, '', 0, 1);
  requireFinite('target', target, '');
  requirePositive('standard deviation of a value', sigma, '');
  requirePositive('width of the limits', limitWidth, '');
  const chart: EwmaChart = { values: [], lower: [], upper: [], signals: [] };
  let average = target;
  values.forEach((value, index) => {
    average += lambda * (value - average);
    const settled = 1 - (1 - lambda) ** (2 * (index + 1));
    const halfWidth = limitWidth * sigma * Math.sqrt((lambda / (2 - lambda)) * settled);
    chart.values.push(average);
    chart.lower.push(target - halfWidth);
    chart.upper.push(target + halfWidth);
    if (Math.abs(average - target) > halfWidth) chart.signals.push(index);
  });
  return chart;
}

/**
 * Two-sided cumulative sum chart.
 * S_high = max(0, S_high + x - target - k); S_low = max(0, S_low + target - k - x); a signal is a sum above h.
 * @param options.values at least one, any one unit. options.target, same unit.
 * @param options.allowance k, 0 or more, same unit: half the shift that matters.
 * @param options.decisionInterval h, above 0, same unit.
 * @returns both sums and the indices (from 0) where one exceeds h.
 * @throws OutOfDomainError outside those ranges; InconsistentInputError for an empty list.
 * Accuracy: 1e-13 of the largest value. Source: nist-cusum.
 * @example cusum({ values: [11, 12], target: 10, allowance: 0.5, decisionInterval: 1.8 }).high[1] // ≈ 2
 */
export function cusum(options: {
  values: readonly number[];
  target: number;
  allowance: number;
  decisionInterval: number;
}): CusumChart {
  const { values, target, allowance, decisionInterval } = options;
  requireSeries(values);
  requireFinite('target', target, '');
  requireNonNegative('allowance', allowance, '');
  requirePositive('decision interval', decisionInterval, '');
  const chart: CusumChart = { high: [], low: [], signals: [] };
  let [high, low] = [0, 0];
  values.forEach((value, index) => {
    high = Math.max(0, high + (value - target) - allowance);
    low = Math.max(0, low + (target - value) - allowance);
    chart.high.push(high);
    chart.low.push(low);
    if (high > decisionInterval || low > decisionInterval) chart.signals.push(index);
  });
  return chart;
}
