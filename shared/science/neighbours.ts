/** Comparing probes in the same water: how far apart in time they see it, and which of three has moved. */
import { InconsistentInputError, requireCount, requireFinite, requirePositive } from './errors.ts';

/** Fewest pairs of changes from which a correlation is worth reading [common practice]. */
const FEWEST_PAIRS = 8;

function correlationOf(a: readonly number[], b: readonly number[]): number {
  const meanA = a.reduce((sum, value) => sum + value, 0) / a.length;
  const meanB = b.reduce((sum, value) => sum + value, 0) / b.length;
  let [ab, aa, bb] = [0, 0, 0];
  a.forEach((value, index) => {
    const [da, db] = [value - meanA, (b[index] as number) - meanB];
    ab += da * db;
    aa += da * da;
    bb += db * db;
  });
  return aa > 0 && bb > 0 ? ab / Math.sqrt(aa * bb) : 0;
}

const changesOf = (values: readonly number[]): number[] =>
  values.slice(1).map((value, index) => value - (values[index] as number));

/**
 * The transport delay between two probes, in readings.
 * The lag k with the largest correlation of x_(i+1) - x_i with y_(i+k+1) - y_(i+k), over |k| <= maxLag.
 * @param options.own, options.neighbour evenly spaced readings of the same period, as many of each, any one unit each.
 * @param options.maxLag whole number, 0 or more; at least 8 pairs must remain at that lag.
 * @returns lag (positive: the neighbour sees the water later) and its correlation, -1 to 1; lag 0 and correlation 0 when neither moves.
 * @throws OutOfDomainError for a value that is not finite; InconsistentInputError for lists that differ or are too short.
 * Accuracy: to one reading interval. Source: nist-handbook 6.4.4 (correlation at a lag).
 * @example alignDelay({ own: [0, 0, 5, 0, 0, 0, 7, 0, 0, 2, 0, 0, 0], neighbour: [0, 0, 0, 0, 5, 0, 0, 0, 7, 0, 0, 2, 0], maxLag: 3 }).lag // ≈ 2
 */
export function alignDelay(options: {
  own: readonly number[];
  neighbour: readonly number[];
  maxLag: number;
}): {
  lag: number;
  correlation: number;
} {
  const { own, neighbour, maxLag } = options;
  requireCount('largest lag', maxLag, 0);
  if (own.length !== neighbour.length || own.length - 1 - maxLag < FEWEST_PAIRS) {
    throw new InconsistentInputError({
      quantity: 'readings to align',
      reason: `there are ${own.length} and ${neighbour.length}, and each needs ${FEWEST_PAIRS + maxLag + 1}`,
      advice: 'Pair them over a longer time.',
    });
  }
  own.forEach((value) => requireFinite('own reading', value, ''));
  neighbour.forEach((value) => requireFinite("neighbour's reading", value, ''));
  const [ownChanges, theirChanges] = [changesOf(own), changesOf(neighbour)];
  let best = { lag: 0, correlation: correlationOf(ownChanges, theirChanges) };
  for (let lag = -maxLag; lag <= maxLag; lag += 1) {
    const mine = lag >= 0 ? ownChanges.slice(0, ownChanges.length - lag) : ownChanges.slice(-lag);
    const theirs = lag >= 0 ? theirChanges.slice(lag) : theirChanges.slice(0, theirChanges.length + lag);
    const correlation = correlationOf(mine, theirs);
    if (correlation > best.correlation) best = { lag, correlation };
  }
  return best;
}

export type MovedProbe = 'a' | 'b' | 'c' | 'none' | 'cannot-tell';

/**
 * Which of three probes in the same water has moved, from the shifts of their pairs.
 * A probe has moved when both pairs with it shifted significantly, in the sense that one move explains, and the third pair did not:
 * |shift| > 2 u for ab and ac, not for bc, and both shifts differ by less than 2 sqrt(u_ab^2 + u_ac^2).
 * @param options.ab, options.bc, options.ca shift of ln(first/second) since the baseline, with its standard uncertainty above 0.
 * @returns the probe, none when no pair shifted, cannot-tell when the pattern fits no single mover.
 * @throws OutOfDomainError outside those ranges.
 * Accuracy: about 95 % for each pair. Source: common practice.
 * @example whichMoved({ ab: { shift: 0.02, standardUncertainty: 0.003 }, bc: { shift: 0.001, standardUncertainty: 0.003 }, ca: { shift: -0.021, standardUncertainty: 0.003 } }) // 'a'
 */
export function whichMoved(
  options: Record<'ab' | 'bc' | 'ca', { shift: number; standardUncertainty: number }>,
): MovedProbe {
  const pairs = (['ab', 'bc', 'ca'] as const).map((name) => {
    const { shift, standardUncertainty } = options[name];
    requireFinite(`shift of ${name}`, shift, '');
    requirePositive(`uncertainty of the shift of ${name}`, standardUncertainty, '');
    return { shift, standardUncertainty, isShifted: Math.abs(shift) > 2 * standardUncertainty };
  });
  const shifted = pairs.filter((pair) => pair.isShifted);
  if (shifted.length === 0) return 'none';
  const still = pairs.findIndex((pair) => !pair.isShifted);
  if (shifted.length !== 2 || still < 0) return 'cannot-tell';
  // One mover enters its two pairs with opposite sign: first in one, second in the other. So its two shifts cancel.
  const [first, second] = shifted as [(typeof pairs)[0], (typeof pairs)[0]];
  const remainder = Math.abs(first.shift + second.shift);
  if (remainder > 2 * Math.hypot(first.standardUncertainty, second.standardUncertainty)) return 'cannot-tell';
  // The still pair is the one without the mover: ab without c, bc without a, ca without b.
  return (['c', 'a', 'b'] as const)[still] as MovedProbe;
}
