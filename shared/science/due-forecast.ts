/** The due date as a distribution: not one day but how early and how late it may come. */
import { probabilityInTolerance, requireForecast } from './drift.ts';
import type { ErrorForecast } from './drift.ts';
import { requirePositive, requireWithin } from './errors.ts';
import { requireProbability } from './quantiles.ts';

export interface DueDay {
  /** Chance that the tolerance has been left by then. */
  probability: number;
  /** Days from the as-left, 0 to maxDays. */
  days: number;
  /** The chance is not reached within maxDays; `days` is then maxDays. */
  isBeyondHorizon: boolean;
}

export interface DueForecast {
  early: DueDay;
  median: DueDay;
  late: DueDay;
  /** Probability in tolerance day by day, for drawing: evenly spaced from 0 to maxDays. */
  curve: { days: number; probabilityInTolerance: number }[];
}

/** Enough that no bend of the curve falls between two points: two years give a point every third day. */
const SCAN_POINTS = 240;

/** Halvings of a scan step: 2^-40 of it is far below a second. */
const HALVINGS = 40;

/** Longest horizon that a steady rate can be asked about: thirty years. */
const LONGEST_HORIZON_DAYS = 10_958;

function firstDayAt(outside: (days: number) => number, probability: number, maxDays: number): DueDay {
  const step = maxDays / SCAN_POINTS;
  for (let point = 0; point <= SCAN_POINTS; point += 1) {
    if (outside(point * step) < probability) continue;
    if (point === 0) return { probability, days: 0, isBeyondHorizon: false };
    let [before, after] = [(point - 1) * step, point * step];
    for (let halving = 0; halving < HALVINGS; halving += 1) {
      const middle = (before + after) / 2;
      if (outside(middle) < probability) before = middle;
      else after = middle;
    }
    return { probability, days: after, isBeyondHorizon: false };
  }
  return { probability, days: maxDays, isBeyondHorizon: true };
}

/**
 * The distribution of the day on which a probe leaves its tolerance.
 * Quantile at p: first t with 1 - P_in(t) >= p, P_in from probabilityInTolerance; early, median and late are p, one half and 1 - p.
 * @param options see ErrorForecast; options.maxDays horizon, above 0 to 10 958 days; options.earlyProbability p, above 0 and below
 *   one half, 0.05 unless given.
 * @returns the three days with the chance each stands for, and the curve of probability in tolerance.
 * @throws OutOfDomainError outside those ranges.
 * Accuracy: 1e-6 day for the model. An excursion that returns within one two-hundred-and-fortieth of the horizon is not seen.
 * Source: jcgm-106 7.4, ilac-g24.
 * @example dueForecast({ asLeftError: 0, uAsLeft: 0, ratePerDay: 0.01, uRate: 0.001, tolerance: 3, maxDays: 730 }).median.days // ≈ 300
 */
export function dueForecast(
  options: ErrorForecast & { maxDays: number; earlyProbability?: number },
): DueForecast {
  const { maxDays, earlyProbability = 0.05, ...forecast } = options;
  requireForecast(forecast);
  requirePositive('horizon', maxDays, 'd');
  requireWithin('horizon', maxDays, 'd', 0, LONGEST_HORIZON_DAYS);
  requireProbability('early probability', earlyProbability);
  requireWithin('early probability', earlyProbability, '', 0, 0.5);
  const outside = (days: number): number => 1 - probabilityInTolerance({ ...forecast, days });
  const dayAt = (probability: number): DueDay => firstDayAt(outside, probability, maxDays);
  const curve = Array.from({ length: SCAN_POINTS + 1 }, (_, point) => {
    const days = (point * maxDays) / SCAN_POINTS;
    return { days, probabilityInTolerance: 1 - outside(days) };
  });
  return { early: dayAt(earlyProbability), median: dayAt(0.5), late: dayAt(1 - earlyProbability), curve };
}
