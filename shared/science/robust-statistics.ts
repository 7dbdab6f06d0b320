/** Middle and spread that a few wild values cannot move. */
import { InconsistentInputError, requireFinite, requireNonNegative } from './errors.ts';

/** Standard deviation of a normal distribution per median absolute deviation: 1/Phi^-1(3/4) [nist-handbook 1.3.5.6]. */
const SD_PER_MAD = 1.482602218505602;

function middleOf(values: readonly number[]): number {
  const sorted = Float64Array.from(values).sort();
  const upper = sorted.length >> 1;
  const high = sorted[upper] as number;
  return sorted.length % 2 === 1 ? high : ((sorted[upper - 1] as number) + high) / 2;
}

function requireSample(values: readonly number[]): void {
  if (values.length === 0) {
    throw new InconsistentInputError({
      quantity: 'sample',
      reason: 'it is empty',
      advice: 'Give at least one value.',
    });
  }
  for (const value of values) requireFinite('value of the sample', value, '');
}

/**
 * The middle value: half of the values lie at or below it.
 * @param values at least one, finite, any one unit, any order.
 * @returns median, same unit; the mean of the two middle ones for an even count.
 * @throws OutOfDomainError for a value that is not finite; InconsistentInputError for an empty list.
 * Accuracy: exact. Source: nist-handbook 1.3.5.1.
 * @example median([3, 1, 2, 10]) // ≈ 2.5
 */
export function median(values: readonly number[]): number {
  requireSample(values);
  return middleOf(values);
}

/**
 * The noise of a slowly changing series: robust standard deviation of its second differences, per value.
 * s = 1.4826 median|x_(i+1) - 2 x_i + x_(i-1)|/sqrt 6; a steady slope drops out, and a few spikes hardly count. Taken about 0, not about
 * their median: a signal that jumps to and fro has two sizes of difference, and lies close to one of them.
 * @param values at least three, finite, evenly spaced in time, any one unit.
 * @returns s, same unit, 0 or more.
 * @throws OutOfDomainError for a value that is not finite; InconsistentInputError for fewer than three.
 * Accuracy: for white noise, about 1.5/sqrt(n) relative scatter. Source: nist-handbook 1.3.5.6 (median absolute deviation).
 * @example noiseSd([0, 1, 0, 1, 0, 1, 0]) // ≈ 1.21054
 */
export function noiseSd(values: readonly number[]): number {
  requireSample(values);
  const bends = values
    .slice(2)
    .map((value, index) => Math.abs(value - 2 * (values[index + 1] as number) + (values[index] as number)));
  // A second difference of white noise has the variance 1 + 4 + 1.
  return (SD_PER_MAD * median(bends)) / Math.sqrt(6);
}

/**
 * The arithmetic mean.
 * @param values at least one, finite, any one unit.
 * @returns mean, same unit.
 * @throws OutOfDomainError for a value that is not finite; InconsistentInputError for an empty list.
 * Accuracy: 1e-15 times the count. Source: nist-handbook 1.3.5.1.
 * @example meanOf([1, 2, 6]) // ≈ 3
 */
export function meanOf(values: readonly number[]): number {
  requireSample(values);
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}

function varianceAbout(values: readonly number[], mean: number): number {
  return values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (values.length - 1);
}

/**
 * Welch's t between two samples of unequal spread.
 * t = (m2 - m1)/sqrt((s1^2 + v)/n1 + (s2^2 + v)/n2), v an added variance such as that of rounding to a resolution step.
 * @param before at least two finite values, any one unit. @param after likewise.
 * @param addedVariance v, 0 or more, unit squared; 0 unless given.
 * @returns difference of the means (same unit) and t; when neither sample has any spread, t is the largest number with its sign.
 * @throws OutOfDomainError outside those ranges; InconsistentInputError for a sample of fewer than two.
 * Accuracy: 1e-13. Source: nist-handbook 1.3.5.3.
 * @example welchT([1, 2, 1, 2], [9, 8, 9, 8]).t // ≈ 17.1464
 */
export function welchT(
  before: readonly number[],
  after: readonly number[],
  addedVariance = 0,
): { difference: number; t: number } {
  if (before.length < 2 || after.length < 2) {
    throw new InconsistentInputError({
      quantity: 'samples to compare',
      reason: `they have ${before.length} and ${after.length} values, and a spread needs two`,
      advice: 'Give more values.',
    });
  }
  requireNonNegative('added variance', addedVariance, '');
  const [meanBefore, meanAfter] = [meanOf(before), meanOf(after)];
  const variance =
    (varianceAbout(before, meanBefore) + addedVariance) / before.length +
    (varianceAbout(after, meanAfter) + addedVariance) / after.length;
  const difference = meanAfter - meanBefore;
  if (difference === 0) return { difference, t: 0 };
  return {
    difference,
    t: variance > 0 ? difference / Math.sqrt(variance) : Math.sign(difference) * Number.MAX_VALUE,
  };
}
