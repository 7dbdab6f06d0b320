/**
 * Tests on a window of readings: what can be said about a probe from its own signal between two calibrations.
 * A test that lacks the readings it needs answers `isAssessed: false` and never `isSuspect: true`. Limits are common practice and can be set.
 */
import { ewma } from './control-charts.ts';
import {
  InconsistentInputError,
  requireFinite,
  requireNonNegative,
  requirePositive,
  requireWithin,
} from './errors.ts';
import { meanOf, median, noiseSd, welchT } from './robust-statistics.ts';

export interface HealthTest {
  isSuspect: boolean;
  /** False when the window is too short, or the test cannot see what it looks for. */
  isAssessed: boolean;
}

/** Fewest readings from which a spread is worth judging [common practice: 10 to 60]. */
const FEWEST_READINGS = 10;

/** Readings either side of a step that show whether the change came at once. */
const STEP_SHOULDER = 5;

/** Rounding of readings that are whole resolution steps, relative. */
const ROUNDING_SLACK = 1e-9;

function requireReadings(values: readonly number[]): void {
  values.forEach((value, index) => requireFinite(`reading ${index + 1} of the window`, value, ''));
}

function rangeOf(values: readonly number[]): number {
  let [lowest, highest] = [Infinity, -Infinity];
  for (const value of values) {
    if (value < lowest) lowest = value;
    if (value > highest) highest = value;
  }
  return values.length === 0 ? 0 : highest - lowest;
}

/**
 * Flat line: the readings stay within one resolution step while something says that they should move.
 * Suspect when max - min <= resolution and the companion (temperature or a neighbour) moved by more than two of its steps, or the
 * usual noise exceeds the resolution; with neither given, flatness alone counts.
 * @param options.values window, any one unit, 10 or more to be assessed. options.resolution one step, 0 or more, same unit.
 * @param options.usualSd usual noise of this probe (see noiseSd), 0 or more, same unit.
 * @param options.companion readings over the same time, and their resolution, in their own unit.
 * @returns isSuspect, isAssessed and the range, same unit.
 * @throws OutOfDomainError outside those ranges.
 * Accuracy: a probe whose noise lies under its resolution is not judged by its noise. Source: qartod; limits common practice.
 * @example flatLine({ values: [1061, 1061, 1062, 1061, 1061, 1061, 1062, 1061, 1061, 1061], resolution: 1, usualSd: 2.5 }).range // ≈ 1
 */
export function flatLine(options: {
  values: readonly number[];
  resolution: number;
  usualSd?: number;
  companion?: { values: readonly number[]; resolution: number };
}): HealthTest & { range: number } {
  const { values, resolution, usualSd, companion } = options;
  requireReadings(values);
  requireNonNegative('resolution', resolution, '');
  const range = rangeOf(values);
  const evidence: boolean[] = [];
  if (usualSd !== undefined) evidence.push(requireNonNegative('usual noise', usualSd, '') > resolution);
  if (companion !== undefined) {
    requireReadings(companion.values);
    evidence.push(
      rangeOf(companion.values) > 2 * requireNonNegative('companion resolution', companion.resolution, ''),
    );
  }
  const shouldMove = evidence.length === 0 || evidence.includes(true);
  const isAssessed = values.length >= FEWEST_READINGS && shouldMove;
  return { isSuspect: isAssessed && range <= resolution * (1 + ROUNDING_SLACK), isAssessed, range };
}

/**
 * Noise: much more than usual (bubbles, wiring) or much less (fouled, blocked, filtered).
 * ratio = noiseSd(window)/max(usual, resolution); noisy above noisyRatio, collapsed below quietRatio. A collapse cannot be seen when the
 * usual noise lies under the resolution.
 * @param options.values window, any one unit, 10 or more to be assessed. options.usualSd 30-day median of noiseSd, above 0.
 * @param options.resolution one step, 0 unless given. options.noisyRatio above 1 (4), options.quietRatio 0 to 1 (0.25).
 * @returns what the noise is, its standard deviation (same unit) and its ratio to the usual.
 * @throws OutOfDomainError outside those ranges.
 * Accuracy: that of noiseSd. Source: common practice.
 * @example noise({ values: [0, 9, 1, 8, 0, 9, 2, 9, 0, 8, 1, 9], usualSd: 1 }).ratio // ≈ 9.3817
 */
export function noise(options: {
  values: readonly number[];
  usualSd: number;
  resolution?: number;
  noisyRatio?: number;
  quietRatio?: number;
}): HealthTest & { reading: 'steady' | 'noisy' | 'collapsed'; sd: number; ratio: number } {
  const { values, usualSd, resolution = 0, noisyRatio = 4, quietRatio = 0.25 } = options;
  requireReadings(values);
  requirePositive('usual noise', usualSd, '');
  requireNonNegative('resolution', resolution, '');
  requireWithin('noisy ratio', noisyRatio, '', 1, Infinity);
  requireWithin('quiet ratio', quietRatio, '', 0, 1);
  if (values.length < FEWEST_READINGS) {
    return { isSuspect: false, isAssessed: false, reading: 'steady', sd: 0, ratio: 1 };
  }
  const sd = noiseSd(values);
  const ratio = sd / Math.max(usualSd, resolution);
  const canCollapse = usualSd > resolution;
  const reading = ratio > noisyRatio ? 'noisy' : canCollapse && ratio < quietRatio ? 'collapsed' : 'steady';
  return { isSuspect: reading !== 'steady', isAssessed: true, reading, sd, ratio };
}

/**
 * Spike: single readings far from their neighbours in time.
 * |x_i - median(x_(i-2) ... x_(i+2))| > threshold max(median of these distances, resolution/2); the first and last two are not judged.
 * @param options.values window, any one unit, 10 or more to be assessed. options.resolution one step, 0 unless given.
 * @param options.threshold above 0; 6 unless given.
 * @returns indices (from 0) of the spikes.
 * @throws OutOfDomainError outside those ranges.
 * Accuracy: two spikes in a row are still seen, three are a step. Source: qartod; limit common practice.
 * @example spike({ values: [10, 11, 10, 9, 10, 60, 10, 11, 9, 10, 11, 10], resolution: 1 }).indices[0] // ≈ 5
 */
export function spike(options: {
  values: readonly number[];
  resolution?: number;
  threshold?: number;
}): HealthTest & { indices: number[] } {
  const { values, resolution = 0, threshold = 6 } = options;
  requireReadings(values);
  requireNonNegative('resolution', resolution, '');
  requirePositive('spike threshold', threshold, '');
  if (values.length < FEWEST_READINGS) return { isSuspect: false, isAssessed: false, indices: [] };
  const distances = values
    .slice(2, -2)
    .map((value, offset) => value - median(values.slice(offset, offset + 5)));
  const scale = Math.max(median(distances.map(Math.abs)), resolution / 2);
  const indices: number[] = [];
  distances.forEach((distance, offset) => {
    if (Math.abs(distance) > threshold * scale) indices.push(offset + 2);
  });
  return { isSuspect: indices.length > 0, isAssessed: true, indices };
}

interface Split {
  index: number;
  size: number;
  t: number;
}

function splitAt(values: readonly number[], index: number, quantisation: number): Split {
  const { difference, t } = welchT(values.slice(0, index), values.slice(index), quantisation);
  return { index, size: difference, t };
}

/**
 * Step: the level changes at once and stays.
 * The split with the largest Welch t = (mean after - mean before)/sqrt(s1^2/n1 + s2^2/n2) beyond the threshold, at least 5 readings either
 * side, where the 5 before and the 5 after already differ by half of the step (a steady slope does not count). Whether process or probe
 * moved is asked of temperature and neighbours with the same test.
 * @param options.values window, any one unit, 10 or more to be assessed. options.resolution one step, 0 unless given.
 * @param options.threshold above 0; 5 unless given.
 * @returns index of the first reading after the step, its size (same unit) and t.
 * @throws OutOfDomainError outside those ranges.
 * Accuracy: readings that depend on each other make t too large. Source: nist-handbook 1.3.5.3 (t test); limit common practice.
 * @example step({ values: [1, 2, 1, 2, 1, 2, 9, 8, 9, 8, 9, 8], resolution: 1 }).size // ≈ 7
 */
export function step(options: {
  values: readonly number[];
  resolution?: number;
  threshold?: number;
}): HealthTest & Split {
  const { values, resolution = 0, threshold = 5 } = options;
  requireReadings(values);
  requireNonNegative('resolution', resolution, '');
  requirePositive('step threshold', threshold, '');
  if (values.length < 2 * STEP_SHOULDER)
    return { isSuspect: false, isAssessed: false, index: 0, size: 0, t: 0 };
  // [gum-2008 F.2.2.1] variance of a value rounded to a step.
  const quantisation = resolution ** 2 / 12;
  let best = splitAt(values, STEP_SHOULDER, quantisation);
  for (let index = STEP_SHOULDER + 1; index <= values.length - STEP_SHOULDER; index += 1) {
    const candidate = splitAt(values, index, quantisation);
    if (Math.abs(candidate.t) > Math.abs(best.t)) best = candidate;
  }
  const { index, size } = best;
  const atOnce =
    meanOf(values.slice(index, index + STEP_SHOULDER)) - meanOf(values.slice(index - STEP_SHOULDER, index));
  const isSuspect = Math.abs(best.t) > threshold && Math.abs(atOnce) >= Math.abs(size) / 2;
  return { isSuspect, isAssessed: true, ...best };
}

/**
 * Gap: readings that are late or missing, by time and by sequence number.
 * Late when now - newest > lateFactor x interval; a gap is a pause longer than lateFactor x interval; missing numbers lie between two
 * received ones.
 * @param options.atMs times of the readings, ms, ascending. options.intervalS expected interval, above 0, s.
 * @param options.nowMs time to judge at, ms. options.lateFactor 1 or more; 3 unless given.
 * @param options.sequence numbers of the same readings within one boot, any order, duplicates allowed.
 * @returns age of the newest in s (Infinity when there is none), the pauses, and the ranges of missing numbers, ends included.
 * @throws OutOfDomainError outside those ranges; InconsistentInputError for times that go back.
 * Accuracy: exact. Source: qartod; factor common practice.
 * @example gap({ atMs: [0, 10000, 60000], intervalS: 10, nowMs: 65000 }).ageS // ≈ 5
 */
export function gap(options: {
  atMs: readonly number[];
  intervalS: number;
  nowMs: number;
  lateFactor?: number;
  sequence?: readonly number[];
}): HealthTest & {
  isLate: boolean;
  ageS: number;
  pauses: { fromMs: number; toMs: number }[];
  missing: { first: number; last: number }[];
} {
  const { atMs, intervalS, nowMs, lateFactor = 3, sequence = [] } = options;
  requireReadings(atMs);
  requireReadings(sequence);
  requirePositive('expected interval', intervalS, 's');
  requireFinite('time to judge at', nowMs, 'ms');
  requireWithin('late factor', lateFactor, '', 1, Infinity);
  const longest = lateFactor * intervalS * 1000;
  const newest = atMs.at(-1);
  const ageS = newest === undefined ? Infinity : (nowMs - newest) / 1000;
  const pauses: { fromMs: number; toMs: number }[] = [];
  atMs.forEach((toMs, index) => {
    const fromMs = index === 0 ? toMs : (atMs[index - 1] as number);
    if (toMs < fromMs) {
      throw new InconsistentInputError({
        quantity: 'times of the readings',
        reason: 'they go back',
        advice: 'Sort them.',
      });
    }
    if (toMs - fromMs > longest) pauses.push({ fromMs, toMs });
  });
  const missing: { first: number; last: number }[] = [];
  const numbers = [...new Set(sequence)].sort((a, b) => a - b);
  numbers.forEach((number, index) => {
    const before = index === 0 ? number - 1 : (numbers[index - 1] as number);
    if (number > before + 1) missing.push({ first: before + 1, last: number - 1 });
  });
  const isLate = ageS > lateFactor * intervalS;
  return {
    isSuspect: isLate || pauses.length > 0 || missing.length > 0,
    isAssessed: true,
    isLate,
    ageS,
    pauses,
    missing,
  };
}

/**
 * Creep against a neighbour: the ratio of two probes in the same water leaves its commissioning baseline.
 * EWMA of ln(own/neighbour) with target and sigma of the baseline, exact limits; suspect while the newest average is outside.
 * @param options.own, options.neighbour readings of the same moments (see alignDelay), above 0, one unit, as many of each; 10 or more to be
 *   assessed. options.baselineMean and options.baselineSd (above 0) of ln(own/neighbour).
 * @param options.lambda above 0 to 1, 0.2 unless given. options.limitWidth above 0, 3 unless given.
 * @returns shift = newest average less the baseline, as a natural logarithm (0.01 is about 1 %), and the first index outside (-1: none).
 * @throws OutOfDomainError outside those ranges; InconsistentInputError when the lists differ in length.
 * Accuracy: that of ewma; says that one of the two moved, not which (see whichMoved). Source: nist-ewma; limits common practice.
 * @example neighbourCreep({ own: Array.from({ length: 40 }, () => 102), neighbour: Array.from({ length: 40 }, () => 100), baselineMean: 0, baselineSd: 0.004 }).shift // ≈ 0.0198
 */
export function neighbourCreep(options: {
  own: readonly number[];
  neighbour: readonly number[];
  baselineMean: number;
  baselineSd: number;
  lambda?: number;
  limitWidth?: number;
}): HealthTest & { shift: number; firstOutside: number } {
  const { own, neighbour, baselineMean, baselineSd, lambda = 0.2, limitWidth = 3 } = options;
  if (own.length !== neighbour.length) {
    throw new InconsistentInputError({
      quantity: 'readings of the two probes',
      reason: `there are ${own.length} and ${neighbour.length}`,
      advice: 'Pair them by time first.',
    });
  }
  requirePositive('standard deviation of the baseline', baselineSd, '');
  const ratios = own.map((value, index) => {
    requirePositive(`own reading ${index + 1}`, value, '');
    return Math.log(
      value / requirePositive(`neighbour's reading ${index + 1}`, neighbour[index] as number, ''),
    );
  });
  if (ratios.length < FEWEST_READINGS)
    return { isSuspect: false, isAssessed: false, shift: 0, firstOutside: -1 };
  const chart = ewma({ values: ratios, lambda, target: baselineMean, sigma: baselineSd, limitWidth });
  return {
    isSuspect: chart.signals.at(-1) === ratios.length - 1,
    isAssessed: true,
    shift: (chart.values.at(-1) as number) - baselineMean,
    firstOutside: chart.signals[0] ?? -1,
  };
}
