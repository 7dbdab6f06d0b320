/** Deciding whether an error lies within its tolerance, with a guard band and the probability of being wrong. */
import { InconsistentInputError, requireFinite, requireNonNegative, requirePositive } from './errors.ts';
import { normalProbabilityBelow } from './quantiles.ts';

export const DECISION_RULES = ['simple', 'guarded-u', 'guarded-0.83u'] as const;
export type DecisionRule = (typeof DECISION_RULES)[number];

export const DECISION_OUTCOMES = [
  'within-clear',
  'within-unsure',
  'outside-unsure',
  'outside-clear',
] as const;
export type DecisionOutcome = (typeof DECISION_OUTCOMES)[number];

export interface Decision {
  outcome: DecisionOutcome;
  /** Probability that the true error lies beyond the tolerance on either side, 0 to 1. */
  probabilityOutside: number;
  /** Tolerance minus guard band, unit of the tolerance. Below 0 no result can be clearly within. */
  acceptanceLimit: number;
}

/** Guard band as a multiple of U: none [ilac-g8 4.2.1], U [ilac-g8 4.2.2], and 0.83 U for a one-sided 5 % at k = 2 (1.645/2). */
const GUARD_BAND_PER_U: Record<DecisionRule, number> = { simple: 0, 'guarded-u': 1, 'guarded-0.83u': 0.83 };

/** A limit met exactly counts as met; without this much slack a change of unit could move such a result across. */
const ROUNDING_SLACK = 1e-12;

function guardBand(rule: DecisionRule, expandedUncertainty: number): number {
  const multiple = GUARD_BAND_PER_U[rule];
  if (multiple === undefined) {
    throw new InconsistentInputError({
      quantity: 'decision rule',
      reason: `${String(rule)} is not a rule`,
      advice: `Use ${DECISION_RULES.join(', ')}.`,
    });
  }
  return multiple * expandedUncertainty;
}

/**
 * The probability that the true value lies beyond a symmetric tolerance, on either side.
 * P = Phi((e - T)/u) + Phi((-T - e)/u); with u = 0 it is 0 up to and including the tolerance, and 1 beyond.
 * @param options.error e, and options.tolerance T (above 0), options.standardUncertainty u (0 or more), all in one unit.
 * @returns probability, 0 to 1.
 * @throws OutOfDomainError outside those ranges.
 * Accuracy: 1e-15 absolute; small probabilities keep their relative accuracy because tails are added, never taken from 1.
 * Source: jcgm-106 7.4.
 * @example probabilityOutside({ error: 2.4, standardUncertainty: 0.385, tolerance: 3 }) // ≈ 0.05956
 */
export function probabilityOutside(options: {
  error: number;
  standardUncertainty: number;
  tolerance: number;
}): number {
  const { error, standardUncertainty, tolerance } = options;
  requireFinite('error', error, '');
  requireNonNegative('standard uncertainty', standardUncertainty, '');
  requirePositive('tolerance', tolerance, '');
  if (standardUncertainty === 0) return Math.abs(error) <= tolerance * (1 + ROUNDING_SLACK) ? 0 : 1;
  const above = normalProbabilityBelow((error - tolerance) / standardUncertainty);
  const below = normalProbabilityBelow((-tolerance - error) / standardUncertainty);
  return Math.min(1, above + below);
}

/**
 * Decides whether an error is within a symmetric tolerance, under a stated decision rule.
 * Guard band w = 0 (simple), U (guarded-u) or 0.83 U (guarded-0.83u); acceptance limit A = T - w.
 * |e| <= A within-clear; <= T within-unsure; <= T + w outside-unsure; beyond that outside-clear. Under the simple rule there is no
 * unsure zone: the risk is in probabilityOutside, up to one half at the limit, and must be shown beside the outcome.
 * @param options.error e of indication; error, U and tolerance in one unit (µS/cm, or % of the reference value at the check
 *   temperature, never of the reading).
 * @param options.expandedUncertainty U, 0 or more.
 * @param options.coverageFactor k of that U, above 0; u = U/k.
 * @param options.tolerance T, above 0.
 * @param options.rule simple | guarded-u | guarded-0.83u.
 * @returns outcome, two-sided probability outside, acceptance limit in the same unit.
 * @throws OutOfDomainError outside those ranges, InconsistentInputError for an unknown rule.
 * Accuracy: limits compare to 1e-12 of the tolerance. Source: jcgm-106 8.3, ilac-g8 4.2.
 * @example decide({ error: 17, expandedUncertainty: 10, coverageFactor: 2, tolerance: 20, rule: 'guarded-u' }).probabilityOutside // ≈ 0.27425
 */
export function decide(options: {
  error: number;
  expandedUncertainty: number;
  coverageFactor: number;
  tolerance: number;
  rule: DecisionRule;
}): Decision {
  const { error, expandedUncertainty, coverageFactor, tolerance, rule } = options;
  requireNonNegative('expanded uncertainty', expandedUncertainty, '');
  requirePositive('coverage factor', coverageFactor, '');
  const standardUncertainty = expandedUncertainty / coverageFactor;
  const probability = probabilityOutside({ error, standardUncertainty, tolerance });
  const band = guardBand(rule, expandedUncertainty);
  const acceptanceLimit = tolerance - band;
  const size = Math.abs(error) - ROUNDING_SLACK * tolerance;
  const outcome: DecisionOutcome =
    size <= acceptanceLimit
      ? 'within-clear'
      : size <= tolerance
        ? 'within-unsure'
        : size <= tolerance + band
          ? 'outside-unsure'
          : 'outside-clear';
  return { outcome, probabilityOutside: probability, acceptanceLimit };
}

/**
 * Whether a planned comparison can decide a tolerance at all, before anyone travels.
 * It can when the acceptance limit T - w is above 0; the ratio T/U says with how much room.
 * @param options.expandedUncertainty U of the planned method, above 0, in the unit of the tolerance.
 * @param options.tolerance T, above 0.
 * @param options.rule the decision rule that will be used.
 * @returns canDecideWithin (some result can be clearly within), acceptanceLimit (unit of T), toleranceToUncertainty T/U,
 *   probabilityOutsideAtLimit: the risk of a result that sits exactly on the acceptance limit, for U stated with `coverageFactor`
 *   (2 unless given).
 * @throws OutOfDomainError outside those ranges.
 * Accuracy: 1e-15. Source: jcgm-106 8.3.
 * @example assessMethod({ expandedUncertainty: 0.77, tolerance: 3, rule: 'guarded-u' }).acceptanceLimit // ≈ 2.23
 */
export function assessMethod(options: {
  expandedUncertainty: number;
  tolerance: number;
  rule: DecisionRule;
  coverageFactor?: number;
}): {
  canDecideWithin: boolean;
  acceptanceLimit: number;
  toleranceToUncertainty: number;
  probabilityOutsideAtLimit: number;
} {
  const { expandedUncertainty, tolerance, rule, coverageFactor = 2 } = options;
  requirePositive('expanded uncertainty', expandedUncertainty, '');
  requirePositive('coverage factor', coverageFactor, '');
  requirePositive('tolerance', tolerance, '');
  const acceptanceLimit = tolerance - guardBand(rule, expandedUncertainty);
  return {
    canDecideWithin: acceptanceLimit > 0,
    acceptanceLimit,
    toleranceToUncertainty: tolerance / expandedUncertainty,
    probabilityOutsideAtLimit: probabilityOutside({
      error: Math.max(0, acceptanceLimit),
      standardUncertainty: expandedUncertainty / coverageFactor,
      tolerance,
    }),
  };
}

/**
 * The probability that a live reading's true value lies above a process limit.
 * P = 1 - Phi((L - x)/u) = Phi((x - L)/u).
 * @param options.value x, options.limit L, options.standardUncertainty u (0 or more), all in one unit.
 * @returns probability, 0 to 1; with u = 0 it is 0 up to and including the limit, and 1 above.
 * @throws OutOfDomainError outside those ranges.
 * Accuracy: 1e-15. Source: jcgm-106 7.3.
 * @example probabilityAboveLimit({ value: 95, standardUncertainty: 4, limit: 100 }) // ≈ 0.10565
 */
export function probabilityAboveLimit(options: {
  value: number;
  standardUncertainty: number;
  limit: number;
}): number {
  const { value, standardUncertainty, limit } = options;
  requireFinite('value', value, '');
  requireFinite('limit', limit, '');
  requireNonNegative('standard uncertainty', standardUncertainty, '');
  if (standardUncertainty === 0) return value > limit ? 1 : 0;
  return normalProbabilityBelow((value - limit) / standardUncertainty);
}
