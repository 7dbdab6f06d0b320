/** Telling dirt from drift, and an adjustment that is needed from one that only chases noise. All errors of one call share a unit. */
import { driftStep } from './drift.ts';
import type { DriftStep } from './drift.ts';
import { requireFinite, requireNonNegative, requirePositive, requireWithin } from './errors.ts';

/** An error of indication with its standard uncertainty (0 or more). */
export interface ErrorWithUncertainty {
  error: number;
  standardUncertainty: number;
}

/** A difference of two errors, its standard uncertainty, and whether it exceeds twice that. */
export interface ErrorChange {
  change: number;
  standardUncertainty: number;
  isSignificant: boolean;
}

const COVERAGE_FACTOR = 2;

/** Correlated terms (same lot, same thermometer, same hour) cancel in a change: written so that r near 1 stays 0 or more. */
function differenceUncertainty(u1: number, u2: number, correlation: number): number {
  return Math.sqrt((u1 - u2) ** 2 + 2 * (1 - correlation) * u1 * u2);
}

function requireError(name: string, { error, standardUncertainty }: ErrorWithUncertainty): void {
  requireFinite(`error ${name}`, error, '');
  requireNonNegative(`uncertainty of the error ${name}`, standardUncertainty, '');
}

function changeBetween(
  before: ErrorWithUncertainty,
  after: ErrorWithUncertainty,
  correlation: number,
): ErrorChange {
  const change = after.error - before.error;
  const standardUncertainty = differenceUncertainty(
    before.standardUncertainty,
    after.standardUncertainty,
    correlation,
  );
  return {
    change,
    standardUncertainty,
    isSignificant: Math.abs(change) > COVERAGE_FACTOR * standardUncertainty,
  };
}

export interface FoulingSplit {
  /** Uncleaned less cleaned: what dirt did since the last cleaning. Feeds the cleaning schedule. */
  fouling: ErrorChange;
  /** As-left less cleaned: what the adjustment did; 0 when nothing was adjusted. */
  adjustment: ErrorChange;
  /** Cleaned less what was left last time: what the probe itself did. Feeds the calibration interval; null without an earlier visit. */
  drift: (ErrorChange & DriftStep) | null;
}

/**
 * Splits the three states of a visit into fouling, drift and adjustment.
 * fouling = e_uncleaned - e_cleaned - (change of the water meanwhile); drift = e_cleaned - e_left(last visit);
 * adjustment = e_left - e_cleaned; u^2 = u1^2 + u2^2 - 2 r u1 u2, plus u(water)^2 for fouling.
 * @param options.uncleaned, options.cleaned, options.asLeft errors of this visit, one unit (% of the reference value, or µS/cm).
 * @param options.correlation of errors within one visit, -1 to 1 (same lot and thermometer: near 1); 0 unless given.
 * @param options.waterChange when fouling is measured in the running process: change of the water between the two readings, as shown by a
 *   reference instrument (before less after), with its standard uncertainty; 0 in a reference solution.
 * @param options.lastVisit error left there, days since (above 0), and correlation between the visits.
 * @returns the three changes with standard uncertainties, same unit; drift also per day.
 * @throws OutOfDomainError outside those ranges.
 * Accuracy: 1e-14 relative. Source: usgs-tm1-d3, gum-2008 eq. 13.
 * @example splitFouling({ uncleaned: { error: -2.4, standardUncertainty: 0.4 }, cleaned: { error: -0.5, standardUncertainty: 0.4 }, asLeft: { error: 0.1, standardUncertainty: 0.4 }, correlation: 0.9 }).fouling.change // ≈ -1.9
 */
export function splitFouling(options: {
  uncleaned: ErrorWithUncertainty;
  cleaned: ErrorWithUncertainty;
  asLeft: ErrorWithUncertainty;
  correlation?: number;
  waterChange?: { change: number; standardUncertainty: number };
  lastVisit?: { asLeft: ErrorWithUncertainty; days: number; correlation?: number };
}): FoulingSplit {
  const { uncleaned, cleaned, asLeft, correlation = 0, lastVisit } = options;
  const { waterChange = { change: 0, standardUncertainty: 0 } } = options;
  requireError('as found, uncleaned', uncleaned);
  requireError('as found, cleaned', cleaned);
  requireError('as left', asLeft);
  requireWithin('correlation within the visit', correlation, '', -1, 1);
  requireFinite('change of the water', waterChange.change, '');
  requireNonNegative('uncertainty of the change of the water', waterChange.standardUncertainty, '');
  const change = uncleaned.error - cleaned.error - waterChange.change;
  const standardUncertainty = Math.hypot(
    differenceUncertainty(uncleaned.standardUncertainty, cleaned.standardUncertainty, correlation),
    waterChange.standardUncertainty,
  );
  const isSignificant = Math.abs(change) > COVERAGE_FACTOR * standardUncertainty;
  return {
    fouling: { change, standardUncertainty, isSignificant },
    adjustment: changeBetween(cleaned, asLeft, correlation),
    drift: lastVisit === undefined ? null : driftSince(lastVisit, cleaned),
  };
}

function driftSince(
  lastVisit: { asLeft: ErrorWithUncertainty; days: number; correlation?: number },
  cleaned: ErrorWithUncertainty,
): ErrorChange & DriftStep {
  const { asLeft, days, correlation = 0 } = lastVisit;
  requireError('left at the last visit', asLeft);
  const step = driftStep({
    days,
    asLeftError: asLeft.error,
    asFoundError: cleaned.error,
    uAsLeft: asLeft.standardUncertainty,
    uAsFound: cleaned.standardUncertainty,
    correlation,
  });
  const change = changeBetween(asLeft, cleaned, correlation);
  return { ...change, ratePerDay: step.ratePerDay };
}

/**
 * The E_n score of a change: how it compares with the expanded uncertainty of a difference.
 * E_n = |e2 - e1|/sqrt(U1^2 + U2^2 - 2 r U1 U2).
 * @param options.first, options.second errors with expanded uncertainties (0 or more, both with the same k), one unit.
 * @param options.correlation -1 to 1; 0 unless given.
 * @returns E_n, 0 or more; above 1 the change is more than uncertainty explains. Infinity when a change has no uncertainty at all.
 * @throws OutOfDomainError outside those ranges.
 * Accuracy: 1e-14 relative. Source: iso-13528 (E_n score).
 * @example changeScore({ first: { error: 0.1, expandedUncertainty: 0.8 }, second: { error: 0.44, expandedUncertainty: 0.8 } }) // ≈ 0.3005
 */
export function changeScore(options: {
  first: { error: number; expandedUncertainty: number };
  second: { error: number; expandedUncertainty: number };
  correlation?: number;
}): number {
  const { first, second, correlation = 0 } = options;
  requireFinite('first error', first.error, '');
  requireFinite('second error', second.error, '');
  requireNonNegative('uncertainty of the first error', first.expandedUncertainty, '');
  requireNonNegative('uncertainty of the second error', second.expandedUncertainty, '');
  requireWithin('correlation', correlation, '', -1, 1);
  const change = Math.abs(second.error - first.error);
  if (change === 0) return 0;
  return change / differenceUncertainty(first.expandedUncertainty, second.expandedUncertainty, correlation);
}

/**
 * Over-adjustment guard: whether there is ground to adjust, or adjusting would only move the probe by the noise of the comparison.
 * Leave when the change since the last as-left has E_n <= 1 and the error itself lies within its acceptance limit; adjust otherwise.
 * @param options.asLeftBefore error left at the last visit, options.cleanedNow error found now after cleaning, each with expanded
 *   uncertainty (same k), one unit.
 * @param options.acceptanceLimit from decide, same unit; below 0 nothing is clearly within.
 * @param options.correlation between the visits, -1 to 1; 0 unless given.
 * @returns advice, and the E_n it rests on.
 * @throws OutOfDomainError outside those ranges.
 * Accuracy: 1e-14 relative. Source: iso-13528 (E_n score); the rule is common practice.
 * @example adjustmentGuard({ asLeftBefore: { error: 0.1, expandedUncertainty: 0.8 }, cleanedNow: { error: 0.44, expandedUncertainty: 0.8 }, acceptanceLimit: 2.2 }).changeScore // ≈ 0.3005
 */
export function adjustmentGuard(options: {
  asLeftBefore: { error: number; expandedUncertainty: number };
  cleanedNow: { error: number; expandedUncertainty: number };
  acceptanceLimit: number;
  correlation?: number;
}): {
  advice: 'leave' | 'adjust';
  changeScore: number;
  reason: 'not-significant' | 'significant' | 'beyond-acceptance';
} {
  const { asLeftBefore, cleanedNow, acceptanceLimit, correlation } = options;
  const score = changeScore({
    first: asLeftBefore,
    second: cleanedNow,
    ...(correlation === undefined ? {} : { correlation }),
  });
  requireFinite('acceptance limit', acceptanceLimit, '');
  if (Math.abs(cleanedNow.error) > acceptanceLimit) {
    return { advice: 'adjust', changeScore: score, reason: 'beyond-acceptance' };
  }
  const isSignificant = score > 1;
  return {
    advice: isSignificant ? 'adjust' : 'leave',
    changeScore: score,
    reason: isSignificant ? 'significant' : 'not-significant',
  };
}

/**
 * Second-point agreement: whether the cell constant found at one solution also holds at another.
 * d = K2/K1 - 1; u(d)^2 = u1^2 + u2^2 - 2 r u1 u2 (relative); E_n = |d|/(k sqrt(...)); agrees when E_n <= 1.
 * One constant must not be carried over decades of conductivity without this.
 * @param options.first, options.second cell constants in cm-1, above 0, with relative standard uncertainties, 0 or more (0.004 is 0.4 %).
 * @param options.correlation -1 to 1 (same thermometer: above 0); 0 unless given. options.coverageFactor k above 0; 2 unless given.
 * @returns relative difference, its standard uncertainty, E_n, and whether they agree.
 * @throws OutOfDomainError outside those ranges.
 * Accuracy: first order in d. Source: gum-2008 eq. 13, iso-13528 (E_n score).
 * @example secondPointAgreement({ first: { cellConstantPerCm: 1, relativeUncertainty: 0.003 }, second: { cellConstantPerCm: 1.005, relativeUncertainty: 0.004 } }).score // ≈ 0.5
 */
export function secondPointAgreement(options: {
  first: { cellConstantPerCm: number; relativeUncertainty: number };
  second: { cellConstantPerCm: number; relativeUncertainty: number };
  correlation?: number;
  coverageFactor?: number;
}): { relativeDifference: number; standardUncertainty: number; score: number; agrees: boolean } {
  const { first, second, correlation = 0, coverageFactor = COVERAGE_FACTOR } = options;
  requirePositive('first cell constant', first.cellConstantPerCm, 'cm⁻¹');
  requirePositive('second cell constant', second.cellConstantPerCm, 'cm⁻¹');
  requirePositive('coverage factor', coverageFactor, '');
  const relativeDifference = second.cellConstantPerCm / first.cellConstantPerCm - 1;
  const score = changeScore({
    first: { error: 0, expandedUncertainty: coverageFactor * first.relativeUncertainty },
    second: { error: relativeDifference, expandedUncertainty: coverageFactor * second.relativeUncertainty },
    correlation,
  });
  const standardUncertainty = differenceUncertainty(
    first.relativeUncertainty,
    second.relativeUncertainty,
    correlation,
  );
  return { relativeDifference, standardUncertainty, score, agrees: score <= 1 };
}
