/**
 * Quantiles and probabilities of the normal, Student t and chi-square distributions.
 * The normal and t functions are those of a maintained numerical library, wrapped so that a value outside the domain is
 * refused instead of coming back as NaN.
 */
import normalCdf from '@stdlib/stats-base-dists-normal-cdf';
import normalInverse from '@stdlib/stats-base-dists-normal-quantile';
import tCdf from '@stdlib/stats-base-dists-t-cdf';
import tInverse from '@stdlib/stats-base-dists-t-quantile';
import {
  OutOfDomainError,
  requireCount,
  requireFinite,
  requireNonNegative,
  requireWithin,
} from './errors.ts';

/** Above this the t distribution equals the normal to the last digit of a double, and the library's t inverse underflows. */
const DEGREES_OF_FREEDOM_TAKEN_AS_INFINITE = 1e12;

/**
 * Refuses a probability that is not strictly between 0 and 1: its quantile would be infinite.
 * @example requireProbability('coverage probability', 0.95) // ≈ 0.95
 */
export function requireProbability(quantity: string, probability: number): number {
  if (probability > 0 && probability < 1) return probability;
  throw new OutOfDomainError({
    quantity,
    value: probability,
    unit: '',
    lower: 0,
    upper: 1,
    advice: 'Zero and one themselves are refused too; 95 % is written 0.95.',
  });
}

/**
 * Refuses fewer than one degree of freedom; Infinity is welcome.
 * @example requireDegreesOfFreedom('degrees of freedom', 4) // ≈ 4
 */
export function requireDegreesOfFreedom(quantity: string, degreesOfFreedom: number): number {
  if (degreesOfFreedom >= 1) return degreesOfFreedom;
  throw new OutOfDomainError({ quantity, value: degreesOfFreedom, unit: '', lower: 1, upper: null });
}

/** Below this the library's inverse, which starts from 2p - 1, loses digits: 4e-9 at p = 1e-9. */
const TAIL_THAT_NEEDS_REFINING = 0.01;

/** Quantiles nearer to 0 or 1 than this are refused: no risk is known that well. */
const SMALLEST_TAIL = 1e-12;

function requireQuantileProbability(probability: number): number {
  requireProbability('probability', probability);
  return requireWithin('probability', probability, '', SMALLEST_TAIL, 1 - SMALLEST_TAIL);
}

/** z for p up to one half, with two Newton steps z - (Phi(z) - p)/phi(z) in the tail. */
function lowerNormalQuantile(probability: number): number {
  let z = normalInverse(probability, 0, 1);
  if (probability >= TAIL_THAT_NEEDS_REFINING) return z;
  for (let step = 0; step < 2; step += 1) {
    const density = Math.exp((-z * z) / 2) / Math.sqrt(2 * Math.PI);
    z -= (normalCdf(z, 0, 1) - probability) / density;
  }
  return z;
}

/**
 * The value z that a standard normal variable stays below with a given probability.
 * Phi(z) = p.
 * @param probability p, 1e-12 to 1 - 1e-12.
 * @returns z, dimensionless.
 * @throws OutOfDomainError outside that range.
 * Accuracy: 1e-14 relative to a second library's values for p from 1e-12 to 1 - 1e-9. Source: nist-handbook 1.3.6.6.1.
 * @example normalQuantile(0.975) // ≈ 1.959963984540054
 */
export function normalQuantile(probability: number): number {
  requireQuantileProbability(probability);
  // 1 - p is exact for p of one half or more, so the tail that the library cannot resolve is refined on its small side.
  return probability > 0.5 ? -lowerNormalQuantile(1 - probability) : lowerNormalQuantile(probability);
}

/**
 * The probability that a standard normal variable stays below z.
 * Phi(z) = integral from minus infinity to z of exp(-x^2/2)/sqrt(2 pi).
 * @param z dimensionless, any number including plus and minus infinity.
 * @returns probability, 0 to 1.
 * @throws OutOfDomainError when z is not a number.
 * Accuracy: 1e-15. Source: nist-handbook 1.3.6.6.1.
 * @example normalProbabilityBelow(1.96) // ≈ 0.9750021048517795
 */
export function normalProbabilityBelow(z: number): number {
  if (z === Infinity) return 1;
  if (z === -Infinity) return 0;
  requireFinite('standard normal deviate', z, '');
  return normalCdf(z, 0, 1);
}

/**
 * The value t that a Student t variable stays below with a given probability.
 * @param probability 1e-12 to 1 - 1e-12.
 * @param degreesOfFreedom nu, 1 or more, whole or fractional; Infinity gives the normal quantile.
 * @returns t, dimensionless.
 * @throws OutOfDomainError outside those ranges.
 * Accuracy: 1e-13 relative to a second library's values. Source: gum-2008 table G.2.
 * @example tQuantile(0.975, 4) // ≈ 2.7764451051977987
 */
export function tQuantile(probability: number, degreesOfFreedom: number): number {
  requireQuantileProbability(probability);
  requireDegreesOfFreedom('degrees of freedom', degreesOfFreedom);
  if (degreesOfFreedom > DEGREES_OF_FREEDOM_TAKEN_AS_INFINITE) return normalQuantile(probability);
  return tInverse(probability, degreesOfFreedom);
}

/**
 * The probability that a Student t variable stays below t.
 * @param t dimensionless.
 * @param degreesOfFreedom nu, 1 or more; Infinity gives the normal probability.
 * @returns probability, 0 to 1.
 * @throws OutOfDomainError outside those ranges.
 * Accuracy: 1e-13. Source: gum-2008 annex G.3.
 * @example tProbabilityBelow(2.776, 4) // ≈ 0.97498861
 */
export function tProbabilityBelow(t: number, degreesOfFreedom: number): number {
  requireFinite('Student t', t, '');
  requireDegreesOfFreedom('degrees of freedom', degreesOfFreedom);
  if (degreesOfFreedom > DEGREES_OF_FREEDOM_TAKEN_AS_INFINITE) return normalProbabilityBelow(t);
  return tCdf(t, degreesOfFreedom);
}

/**
 * The coverage factor k of a two-sided interval with a given coverage probability.
 * k = t of (1 + p)/2 with nu degrees of freedom.
 * @param coverageProbability p, 0 to 1, ends excluded.
 * @param degreesOfFreedom nu, 1 or more; Infinity for the normal distribution.
 * @returns k, dimensionless.
 * @throws OutOfDomainError outside those ranges.
 * Accuracy: 1e-13. Source: gum-2008 table G.2.
 * @example coverageFactorFor(0.9545, 10) // ≈ 2.2837
 */
export function coverageFactorFor(coverageProbability: number, degreesOfFreedom: number): number {
  requireProbability('coverage probability', coverageProbability);
  return tQuantile((1 + coverageProbability) / 2, degreesOfFreedom);
}

/**
 * The probability that a chi-square variable exceeds a value: how surprising a misfit as large as this one is.
 * Q(x|1) = 2 Phi(-sqrt x), Q(x|2) = exp(-x/2), Q(x|nu+2) = Q(x|nu) + (x/2)^(nu/2) exp(-x/2)/Gamma(nu/2+1).
 * @param chiSquare x, 0 or more.
 * @param degreesOfFreedom nu, a whole number from 1 to 10 000.
 * @returns probability, 0 to 1.
 * @throws OutOfDomainError outside those ranges.
 * Accuracy: 1e-12. Source: abramowitz-stegun 26.4.4, 26.4.5, 26.4.8.
 * @example chiSquareProbabilityAbove(5, 3) // ≈ 0.1717971442967335
 */
export function chiSquareProbabilityAbove(chiSquare: number, degreesOfFreedom: number): number {
  requireNonNegative('chi-square', chiSquare, '');
  requireCount('degrees of freedom', degreesOfFreedom, 1);
  requireWithin('degrees of freedom', degreesOfFreedom, '', 1, 10_000);
  if (chiSquare === 0) return 1;
  const half = chiSquare / 2;
  const isOdd = degreesOfFreedom % 2 === 1;
  let probability = isOdd ? 2 * normalCdf(-Math.sqrt(chiSquare), 0, 1) : Math.exp(-half);
  // Terms are carried as logarithms: (x/2)^(nu/2) alone overflows for a large misfit.
  let logTerm = isOdd ? Math.log(2 * Math.sqrt(half / Math.PI)) - half : Math.log(half) - half;
  for (let nu = isOdd ? 1 : 2; nu < degreesOfFreedom; nu += 2) {
    probability += Math.exp(logTerm);
    logTerm += Math.log(half / (nu / 2 + 1));
  }
  return Math.min(1, probability);
}
