/** Combining uncertainty components into a budget, as the Guide to the expression of uncertainty in measurement asks. */
import { InconsistentInputError, requireFinite, requireNonNegative, requirePositive } from './errors.ts';
import { coverageFactorFor, requireDegreesOfFreedom, requireProbability } from './quantiles.ts';

export type UncertaintyDistribution = 'normal' | 'rectangular' | 'triangular';

export interface UncertaintyComponent {
  name: string;
  /** As stated: standard uncertainty for normal (or U, with its k as `divisor`), half-width for the other two. Unit of the input. */
  value: number;
  distribution: UncertaintyDistribution;
  /** What `value` is divided by; 1, √3 and √6 for normal, rectangular and triangular unless given. */
  divisor?: number;
  /** Change of the result per change of this input, unit of the result per unit of the input; 1 unless given. */
  sensitivity?: number;
  /** 1 or more; Infinity unless given. */
  degreesOfFreedom?: number;
}

export interface BudgetRow {
  name: string;
  distribution: UncertaintyDistribution;
  /** Unit of the input. */
  standardUncertainty: number;
  sensitivity: number;
  /** |sensitivity| × standard uncertainty, unit of the result. */
  contribution: number;
  /** Part of the combined variance, 0 to 1; the rows add up to 1 (or are all 0 when every contribution is 0). */
  share: number;
  degreesOfFreedom: number;
}

export interface CombinedUncertainty {
  /** Combined standard uncertainty, unit of the result. */
  standard: number;
  /** Welch–Satterthwaite, not rounded; Infinity when every component has infinitely many. */
  effectiveDegreesOfFreedom: number;
  /** The whole number that the coverage factor was taken at. */
  coverageDegreesOfFreedom: number;
  coverageFactor: number;
  /** Expanded uncertainty U, unit of the result. */
  expanded: number;
  coverageProbability: number;
  budget: BudgetRow[];
}

/** [GUM 4.3.7, 4.3.9] standard deviation of a rectangular and of a triangular distribution: half-width over √3 and √6. */
const DIVISOR: Record<UncertaintyDistribution, number> = {
  normal: 1,
  rectangular: Math.sqrt(3),
  triangular: Math.sqrt(6),
};

/** [GUM G.4.1] the worked example takes 18.9987 as 19.0 and then 19: one decimal is kept before truncating. */
const DECIMALS_KEPT = 10;

/** [GUM 6.2.1, G.6.4] the level of confidence of the worked examples. */
const DEFAULT_COVERAGE_PROBABILITY = 0.95;

/** The level at which infinitely many degrees of freedom give k = 2.000 [GUM table G.2]. */
export const COVERAGE_PROBABILITY_K2 = 0.9545;

/**
 * The whole number of degrees of freedom at which the coverage factor is read.
 * Declared rule: round to one decimal, then truncate; so 18.9987 reads at 19 (as in GUM G.4.1) and 4.69 reads at 4.
 * @param effectiveDegreesOfFreedom 1 or more, or Infinity.
 * @returns whole number, at least 1, or Infinity.
 * @throws OutOfDomainError below 1.
 * Accuracy: exact. Source: gum-2008 G.4.1 note 1 and its example.
 * @example coverageDegreesOfFreedom(18.9987) // ≈ 19
 */
export function coverageDegreesOfFreedom(effectiveDegreesOfFreedom: number): number {
  if (effectiveDegreesOfFreedom === Infinity) return Infinity;
  const rounded = Math.round(effectiveDegreesOfFreedom * DECIMALS_KEPT) / DECIMALS_KEPT;
  requireDegreesOfFreedom('effective degrees of freedom', rounded);
  return Math.floor(rounded);
}

function toBudgetRow(component: UncertaintyComponent): BudgetRow {
  const { name, value, distribution, sensitivity = 1, degreesOfFreedom = Infinity } = component;
  const divisor = component.divisor ?? DIVISOR[distribution];
  requireNonNegative(`value of ${name}`, value, '');
  requirePositive(`divisor of ${name}`, divisor, '');
  requireFinite(`sensitivity of ${name}`, sensitivity, '');
  requireDegreesOfFreedom(`degrees of freedom of ${name}`, degreesOfFreedom);
  const standardUncertainty = value / divisor;
  const contribution = Math.abs(sensitivity) * standardUncertainty;
  requireFinite(`contribution of ${name}`, contribution, '');
  return { name, distribution, standardUncertainty, sensitivity, contribution, share: 0, degreesOfFreedom };
}

/** Root of the sum of squares, scaled by the largest so that no unit, however small or large, under- or overflows. */
function rootSumOfSquares(rows: BudgetRow[]): number {
  let largest = 0;
  for (const row of rows) if (row.contribution > largest) largest = row.contribution;
  if (largest === 0) return 0;
  let sum = 0;
  for (const row of rows) sum += (row.contribution / largest) ** 2;
  return largest * Math.sqrt(sum);
}

/**
 * Combines independent uncertainty components and expands the result to a stated coverage probability.
 * u_c^2 = sum (c_i u_i)^2; nu_eff = u_c^4 / sum((c_i u_i)^4/nu_i) (Welch–Satterthwaite); U = k u_c, where k is the t quantile
 * of (1 + p)/2 at nu_eff rounded to one decimal and then truncated (see coverageDegreesOfFreedom).
 * @param options.components at least one; a value is 0 or more in the unit of its input, as stated by its source: a certificate's
 *   U with its own k as `divisor`, half-widths for rectangular and triangular.
 * @param options.coverageProbability p, 0 to 1, ends excluded; 0.95 unless given. COVERAGE_PROBABILITY_K2 (0.9545) gives k = 2 when
 *   no component has few degrees of freedom.
 * @returns standard and expanded uncertainty in the unit of the result, and the budget row by row.
 * @throws OutOfDomainError for a negative or non-finite value, a divisor that is not positive, fewer than 1 degree of freedom.
 * @throws InconsistentInputError for an empty list: no component is not the same as no uncertainty.
 * Accuracy: 1e-13 relative. Components must be independent: correlated ones are combined before they get here.
 * Source: gum-2008 eq. 10, eq. G.2b, G.4.1.
 * @example combineUncertainty({ components: [{ name: 'lot', value: 0.5, divisor: 2, distribution: 'normal' }, { name: 'thermometer', value: 0.1, sensitivity: 1.944, distribution: 'rectangular' }] }).standard // ≈ 0.27404
 */
export function combineUncertainty(options: {
  components: readonly UncertaintyComponent[];
  coverageProbability?: number;
}): CombinedUncertainty {
  const { components, coverageProbability = DEFAULT_COVERAGE_PROBABILITY } = options;
  requireProbability('coverage probability', coverageProbability);
  if (components.length === 0) {
    throw new InconsistentInputError({
      quantity: 'uncertainty budget',
      reason: 'it has no component, which is not the same as no uncertainty',
      advice: 'Name what is known and add it.',
    });
  }
  const budget = components.map(toBudgetRow);
  const standard = rootSumOfSquares(budget);
  let inverseDegreesOfFreedom = 0;
  if (standard > 0) {
    for (const row of budget) {
      row.share = (row.contribution / standard) ** 2;
      inverseDegreesOfFreedom += row.share ** 2 / row.degreesOfFreedom;
    }
  }
  const effectiveDegreesOfFreedom = 1 / inverseDegreesOfFreedom;
  const readAt = coverageDegreesOfFreedom(effectiveDegreesOfFreedom);
  const coverageFactor = coverageFactorFor(coverageProbability, readAt);
  return {
    standard,
    effectiveDegreesOfFreedom,
    coverageDegreesOfFreedom: readAt,
    coverageFactor,
    expanded: coverageFactor * standard,
    coverageProbability,
    budget,
  };
}
