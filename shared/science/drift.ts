/**
 * How fast a probe drifts. A drift step runs from what was left at one visit to what was found, cleaned, at the next; an as-left value
 * never stands alone as a point, because adjusting would then hide the drift or turn it round.
 */
import {
  InconsistentInputError,
  requireFinite,
  requireNonNegative,
  requirePositive,
  requireWithin,
} from './errors.ts';
import { probabilityOutside } from './decision.ts';
import { chiSquareProbabilityAbove, normalQuantile } from './quantiles.ts';

export interface DriftSegment {
  /** From as-left to the next as-found, above 0. */
  days: number;
  /** Error left at the earlier visit, in one unit throughout (% of the reference value, or µS/cm). */
  asLeftError: number;
  /** Error found at the later visit after cleaning and before any adjustment, same unit. */
  asFoundError: number;
  /** Standard uncertainties of the two, same unit. */
  uAsLeft: number;
  uAsFound: number;
  /** Of the two errors, -1 to 1: the same lot and thermometer at both visits make it positive; 0 unless given. */
  correlation?: number;
}

export interface DriftStep {
  ratePerDay: number;
  standardUncertainty: number;
}

export interface DriftRate extends DriftStep {
  /** Weighted sum of squares of the steps about their mean. */
  chiSquare: number;
  /** Number of steps less 1. */
  degreesOfFreedom: number;
  /** |rate| is more than 2 standard uncertainties. */
  isSignificant: boolean;
  /** What the standard uncertainty was multiplied by, 1 or more. */
  birgeRatio: number;
  /** Chance of steps at least this discordant if the stated uncertainties are right, 0 to 1; 1 for a single step. */
  consistencyProbability: number;
  steps: DriftStep[];
}

/** A rate is called significant beyond this many standard uncertainties (about 95 %). */
const SIGNIFICANT_RATIO = 2;

/**
 * Whether a rate differs from 0 by more than its uncertainty explains: |b| > 2 u(b).
 * @returns true beyond two standard uncertainties. Source: bench-practice (about 95 %).
 * @example isBeyondNoise({ ratePerDay: 0.005, standardUncertainty: 0.002 }) // true
 */
export const isBeyondNoise = ({ ratePerDay, standardUncertainty }: DriftStep): boolean =>
  Math.abs(ratePerDay) > SIGNIFICANT_RATIO * standardUncertainty;

/**
 * The drift rate over one step, from as-left to the next as-found.
 * b = (e_found - e_left)/d; u(b)^2 = (u_found^2 + u_left^2 - 2 r u_found u_left)/d^2.
 * @param segment days above 0; errors finite; uncertainties 0 or more, not both 0; correlation -1 to 1.
 * @returns rate and standard uncertainty, unit of the errors per day.
 * @throws OutOfDomainError outside those ranges; InconsistentInputError when nothing of the uncertainty is left.
 * Accuracy: 1e-14 relative. Source: gum-2008 eq. 13.
 * @example driftStep({ days: 90, asLeftError: 0.1, asFoundError: 0.55, uAsLeft: 0.4, uAsFound: 0.4, correlation: 0.5 }).ratePerDay // ≈ 0.005
 */
export function driftStep(segment: DriftSegment): DriftStep {
  const { days, asLeftError, asFoundError, uAsLeft, uAsFound, correlation = 0 } = segment;
  requirePositive('days between as-left and as-found', days, 'd');
  requireFinite('as-left error', asLeftError, '');
  requireFinite('as-found error', asFoundError, '');
  requireNonNegative('uncertainty of the as-left error', uAsLeft, '');
  requireNonNegative('uncertainty of the as-found error', uAsFound, '');
  requireWithin('correlation', correlation, '', -1, 1);
  // Written as a square plus a product so that r near 1 cannot round to a negative variance.
  const variance = (uAsFound - uAsLeft) ** 2 + 2 * (1 - correlation) * uAsFound * uAsLeft;
  if (!(variance > 0)) {
    throw new InconsistentInputError({
      quantity: 'drift step',
      reason: 'its uncertainty comes out as 0, so it would outweigh every other step',
      advice: 'State the uncertainties of both errors, and a correlation below 1.',
    });
  }
  return { ratePerDay: (asFoundError - asLeftError) / days, standardUncertainty: Math.sqrt(variance) / days };
}

/**
 * Mean weighted by 1/u², its uncertainty from the stated ones alone, and the misfit about it. At least one step, each u above 0.
 * @returns mean and its standard uncertainty in the unit of the rates, chi-square of the misfit. Source: bevington eq. 4.17.
 * @example combineSteps([{ ratePerDay: 1, standardUncertainty: 1 }, { ratePerDay: 4, standardUncertainty: 2 }]).mean // ≈ 1.6
 */
export function combineSteps(steps: readonly DriftStep[]): {
  mean: number;
  internal: number;
  chiSquare: number;
} {
  let weight = 0;
  let weighted = 0;
  // Relative to the first step, so that weights neither over- nor underflow in any unit.
  const unit = (steps[0] as DriftStep).standardUncertainty;
  for (const step of steps) {
    const w = (unit / step.standardUncertainty) ** 2;
    weight += w;
    weighted += w * step.ratePerDay;
  }
  const mean = weighted / weight;
  let chiSquare = 0;
  for (const step of steps) chiSquare += ((step.ratePerDay - mean) / step.standardUncertainty) ** 2;
  return { mean, internal: unit / Math.sqrt(weight), chiSquare };
}

/**
 * The drift rate of a probe from its steps, weighted by their uncertainties.
 * b = sum(w b_i)/sum(w), w = 1/u_i^2; u(b) = (sum w)^(-1/2) max(1, sqrt(chiSquare/(n - 1))): steps that scatter more than their
 * uncertainties allow enlarge u(b); steps that happen to agree better never shrink it.
 * @param options.segments at least one, all after the last repair, new cell or move (see DriftSegment for units and ranges).
 * @returns rate and standard uncertainty, unit of the errors per day, with the consistency of the steps.
 * @throws OutOfDomainError outside those ranges; InconsistentInputError for an empty list.
 * Accuracy: 1e-13 relative. Steps are taken as independent of each other. Source: bevington eq. 4.17, birge-1932.
 * @example driftRate({ segments: [{ days: 90, asLeftError: 0, asFoundError: 0.36, uAsLeft: 0.3, uAsFound: 0.3 }, { days: 90, asLeftError: 0, asFoundError: 0.54, uAsLeft: 0.3, uAsFound: 0.3 }] }).ratePerDay // ≈ 0.005
 */
export function driftRate(options: { segments: readonly DriftSegment[] }): DriftRate {
  if (options.segments.length === 0) {
    throw new InconsistentInputError({
      quantity: 'drift rate',
      reason: 'no step from an as-left to a later as-found is given',
      advice: 'Wait for the next visit, or use the rate of similar probes.',
    });
  }
  const steps = options.segments.map(driftStep);
  const { mean, internal, chiSquare } = combineSteps(steps);
  const degreesOfFreedom = steps.length - 1;
  const birgeRatio = degreesOfFreedom > 0 ? Math.max(1, Math.sqrt(chiSquare / degreesOfFreedom)) : 1;
  const rate = { ratePerDay: mean, standardUncertainty: internal * birgeRatio };
  return {
    ...rate,
    chiSquare,
    degreesOfFreedom,
    isSignificant: isBeyondNoise(rate),
    birgeRatio,
    consistencyProbability: degreesOfFreedom > 0 ? chiSquareProbabilityAbove(chiSquare, degreesOfFreedom) : 1,
    steps,
  };
}

/** How the error of a probe is expected to move from an as-left value on. One unit of error throughout. */
export interface ErrorForecast {
  asLeftError: number;
  /** 0 or more. */
  uAsLeft: number;
  /** Unit of error per day. */
  ratePerDay: number;
  /** 0 or more. */
  uRate: number;
  /** Above 0. */
  tolerance: number;
  /** Variance that a random walk adds per day (unit of error squared per day), 0 or more; 0 unless given. */
  randomWalkPerDay?: number;
}

/**
 * Returns the forecast when each of its numbers is in its range, refuses it otherwise.
 * @example requireForecast({ asLeftError: 0.1, uAsLeft: 0.4, ratePerDay: 0.005, uRate: 0.003, tolerance: 3 }).tolerance // ≈ 3
 */
export function requireForecast(forecast: ErrorForecast): ErrorForecast {
  requireFinite('as-left error', forecast.asLeftError, '');
  requireNonNegative('uncertainty of the as-left error', forecast.uAsLeft, '');
  requireFinite('drift rate per day', forecast.ratePerDay, '');
  requireNonNegative('uncertainty of the drift rate', forecast.uRate, '');
  requirePositive('tolerance', forecast.tolerance, '');
  requireNonNegative('random walk per day', forecast.randomWalkPerDay ?? 0, '');
  return forecast;
}

/**
 * The probability that a probe is still within its tolerance a number of days after it was left.
 * P = Phi((T - m)/s) - Phi((-T - m)/s), m = e + b t, s^2 = u(e)^2 + t^2 u(b)^2 + q t.
 * @param options see ErrorForecast; options.days t, 0 or more.
 * @returns probability, 0 to 1, two-sided.
 * @throws OutOfDomainError outside those ranges.
 * Accuracy: 1e-14 for the model; the model assumes a steady rate. Source: jcgm-106 7.4, gum-2008 eq. 10.
 * @example probabilityInTolerance({ asLeftError: 0.1, uAsLeft: 0.385, ratePerDay: 0.0057, uRate: 0.003, tolerance: 3, days: 365 }) // ≈ 0.76
 */
export function probabilityInTolerance(options: ErrorForecast & { days: number }): number {
  const { asLeftError, uAsLeft, ratePerDay, uRate, tolerance, days, randomWalkPerDay = 0 } = options;
  requireForecast(options);
  requireNonNegative('days since as-left', days, 'd');
  const standardUncertainty = Math.sqrt(uAsLeft ** 2 + (days * uRate) ** 2 + randomWalkPerDay * days);
  return 1 - probabilityOutside({ error: asLeftError + ratePerDay * days, standardUncertainty, tolerance });
}

/** First t at which e + b t + z sqrt(a + q t + c t^2) reaches T, for e below T; Infinity when it never does. */
function firstCrossing(room: number, rate: number, z: number, a: number, q: number, c: number): number {
  if (z * z * a >= room * room) return 0;
  if (z === 0) return rate > 0 ? room / rate : Infinity;
  const [a2, a1, a0] = [z * z * c - rate * rate, z * z * q + 2 * rate * room, z * z * a - room * room];
  // The discriminant with its cancelling terms removed on paper: near z = 0 the two roots all but coincide.
  const inner = z * z * (q * q - 4 * a * c) + 4 * (q * rate * room + c * room * room + rate * rate * a);
  if (inner < 0) return Infinity;
  const half = -(a1 + (a1 < 0 ? -1 : 1) * z * Math.sqrt(inner)) / 2;
  const roots = [a2 === 0 ? NaN : half / a2, half === 0 ? NaN : a0 / half].filter((root) => root > 0);
  return roots.length === 0 ? Infinity : Math.min(...roots);
}

/**
 * Days until the error, with its one-sided bound at a stated probability, first reaches the tolerance.
 * Smallest t with |e + b t| + z sqrt(u(e)^2 + t^2 u(b)^2 + q t) = T, z = normal quantile of the probability; solved as a quadratic
 * on each side of the tolerance.
 * @param options see ErrorForecast; options.probability 0.5 (the line alone) to 0.99; options.maxDays above 0: what comes back when
 *   the tolerance is not reached before.
 * @returns days from the as-left, 0 to maxDays; 0 when the bound is already at or beyond the tolerance.
 * @throws OutOfDomainError outside those ranges.
 * Accuracy: 1e-9 relative for the model; the model assumes a steady rate. Source: gum-2008 eq. 10, ilac-g24.
 * @example forecastDue({ asLeftError: 0, uAsLeft: 0, ratePerDay: 0.01, uRate: 0, tolerance: 3, probability: 0.5, maxDays: 730 }) // ≈ 300
 */
export function forecastDue(options: ErrorForecast & { probability: number; maxDays: number }): number {
  const { asLeftError, uAsLeft, ratePerDay, uRate, tolerance, probability, maxDays } = options;
  const { randomWalkPerDay = 0 } = options;
  requireForecast(options);
  requireWithin('probability', probability, '', 0.5, 0.99, 'Half is the line alone; 95 % is written 0.95.');
  requirePositive('longest interval', maxDays, 'd');
  if (Math.abs(asLeftError) >= tolerance) return 0;
  const z = probability === 0.5 ? 0 : normalQuantile(probability);
  const variance = [z, uAsLeft ** 2, randomWalkPerDay, uRate ** 2] as const;
  const upwards = firstCrossing(tolerance - asLeftError, ratePerDay, ...variance);
  const downwards = firstCrossing(tolerance + asLeftError, -ratePerDay, ...variance);
  return Math.min(maxDays, upwards, downwards);
}
