/** Leaning on similar probes while a probe has too little history of its own. */
import { combineSteps, driftRate, isBeyondNoise } from './drift.ts';
import type { DriftSegment, DriftStep } from './drift.ts';
import { InconsistentInputError, requireFinite, requirePositive } from './errors.ts';

/** What the drift of similar probes (same kind, same medium) says about one more of them. */
export interface DriftPrior extends DriftStep {
  /** Standard deviation of the true rates from probe to probe. */
  betweenProbeSd: number;
  count: number;
}

export interface DriftRateWithPrior extends DriftStep {
  isSignificant: boolean;
  basis: 'own' | 'own-and-similar' | 'similar';
  /** Part of the answer that comes from similar probes, 0 to 1. */
  priorShare: number;
}

/** Fewer own steps than this and similar probes are consulted: two steps say nothing about their own scatter. */
export const STEPS_THAT_STAND_ALONE = 3;

/**
 * What similar probes say about the drift rate of one more, before it has a history of its own.
 * Random effects: Q = sum w (b_i - bw)^2, tau^2 = max(0, (Q - (n - 1))/(W - sum(w^2)/W)), w = 1/u_i^2, W = sum w;
 * mean m = sum(b_i/(u_i^2 + tau^2))/sum(1/(u_i^2 + tau^2)); u^2 = tau^2 + 1/sum(1/(u_i^2 + tau^2)).
 * @param options.rates rates of at least two similar probes with standard uncertainties above 0, one unit per day.
 * @returns expected rate and its standard uncertainty for a further probe, same unit, with the spread from probe to probe.
 * @throws OutOfDomainError outside those ranges; InconsistentInputError for fewer than two probes.
 * Accuracy: the spread is itself uncertain by about 1/sqrt(2(n - 1)). Source: dersimonian-laird-1986.
 * @example pooledDriftPrior({ rates: [{ ratePerDay: 0.004, standardUncertainty: 0.001 }, { ratePerDay: 0.008, standardUncertainty: 0.001 }] }).standardUncertainty // ≈ 0.0033166
 */
export function pooledDriftPrior(options: { rates: readonly DriftStep[] }): DriftPrior {
  const { rates } = options;
  if (rates.length < 2) {
    throw new InconsistentInputError({
      quantity: 'rate of similar probes',
      reason: `at least two probes are needed, and ${rates.length} given`,
      advice: 'Widen the group, for instance to every probe of the kind.',
    });
  }
  for (const rate of rates) {
    requireFinite('drift rate of a similar probe', rate.ratePerDay, '');
    requirePositive('uncertainty of a similar probe', rate.standardUncertainty, '');
  }
  const { chiSquare } = combineSteps([...rates]);
  const unit = (rates[0] as DriftStep).standardUncertainty;
  const weights = rates.map((rate) => (unit / rate.standardUncertainty) ** 2);
  const weight = weights.reduce((sum, w) => sum + w, 0);
  const squares = weights.reduce((sum, w) => sum + w * w, 0);
  const excess = Math.max(0, chiSquare - (rates.length - 1)) / (weight - squares / weight);
  const betweenProbeSd = unit * Math.sqrt(excess);
  const widened = rates.map(({ ratePerDay, standardUncertainty }) => ({
    ratePerDay,
    standardUncertainty: Math.hypot(standardUncertainty, betweenProbeSd),
  }));
  const { mean, internal } = combineSteps(widened);
  return {
    ratePerDay: mean,
    standardUncertainty: Math.hypot(betweenProbeSd, internal),
    betweenProbeSd,
    count: rates.length,
  };
}

/**
 * The drift rate of a probe, leaning on similar probes while it has fewer than three steps of its own.
 * b = (b_own/u_own^2 + b_prior/u_prior^2) u^2; u^-2 = u_own^-2 + u_prior^-2. With three own steps or more the prior is left out.
 * @param options.segments own steps, possibly none (see DriftSegment).
 * @param options.prior from pooledDriftPrior, same unit per day, standard uncertainty above 0.
 * @returns rate and standard uncertainty, same unit per day, and what it rests on.
 * @throws OutOfDomainError outside those ranges.
 * Accuracy: 1e-13 relative. Source: bevington eq. 4.17.
 * @example driftRateWithPrior({ segments: [], prior: { ratePerDay: 0.006, standardUncertainty: 0.002, betweenProbeSd: 0.002, count: 5 } }).ratePerDay // ≈ 0.006
 */
export function driftRateWithPrior(options: {
  segments: readonly DriftSegment[];
  prior: DriftPrior;
}): DriftRateWithPrior {
  const { segments, prior } = options;
  requireFinite('drift rate of similar probes', prior.ratePerDay, '');
  requirePositive('uncertainty of the rate of similar probes', prior.standardUncertainty, '');
  if (segments.length === 0) {
    const { ratePerDay, standardUncertainty } = prior;
    return {
      ratePerDay,
      standardUncertainty,
      isSignificant: isBeyondNoise(prior),
      basis: 'similar',
      priorShare: 1,
    };
  }
  const own = driftRate({ segments });
  if (segments.length >= STEPS_THAT_STAND_ALONE) {
    const { ratePerDay, standardUncertainty, isSignificant } = own;
    return { ratePerDay, standardUncertainty, isSignificant, basis: 'own', priorShare: 0 };
  }
  const { mean, internal } = combineSteps([own, prior]);
  const rate = { ratePerDay: mean, standardUncertainty: internal };
  return {
    ...rate,
    isSignificant: isBeyondNoise(rate),
    basis: 'own-and-similar',
    priorShare: (internal / prior.standardUncertainty) ** 2,
  };
}
