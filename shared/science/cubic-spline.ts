/** A smooth curve through the rows of a table, exact at every row, with its slope. */
import { InconsistentInputError, OutOfDomainError, requireFinite } from './errors.ts';

export type Spline = {
  readonly x: readonly number[];
  readonly y: readonly number[];
  /** Slope at each node, y per x. */
  readonly slopes: readonly number[];
};

/** Values by index that the loops below know to exist. */
const at = (list: readonly number[], index: number): number => list[index] as number;

function requireIncreasing(x: readonly number[], y: readonly number[]): void {
  if (x.length < 2 || x.length !== y.length) {
    throw new InconsistentInputError({
      quantity: 'table',
      reason: `it needs at least two rows and one value for each; it has ${x.length} and ${y.length}`,
    });
  }
  for (let index = 0; index < x.length; index += 1) {
    const value = requireFinite('table argument', at(x, index), '');
    requireFinite('table value', at(y, index), '');
    if (index > 0 && value <= at(x, index - 1)) {
      throw new InconsistentInputError({
        quantity: 'table',
        reason: `its rows must rise: ${value} follows ${at(x, index - 1)}`,
      });
    }
  }
}

/** Gaussian elimination of a tridiagonal system, bands a (below), b (diagonal), c (above), right side d. */
function solveTridiagonal(a: number[], b: number[], c: number[], d: number[]): number[] {
  const n = b.length;
  for (let i = 1; i < n; i += 1) {
    const factor = at(a, i) / at(b, i - 1);
    b[i] = at(b, i) - factor * at(c, i - 1);
    d[i] = at(d, i) - factor * at(d, i - 1);
  }
  const solution = new Array<number>(n).fill(0);
  for (let i = n - 1; i >= 0; i -= 1) {
    const next = i + 1 < n ? at(c, i) * at(solution, i + 1) : 0;
    solution[i] = (at(d, i) - next) / at(b, i);
  }
  return solution;
}

/** Slopes at the nodes so that curvature is continuous, and third derivatives too at the two outer inner nodes. */
function notAKnotSlopes(x: readonly number[], y: readonly number[]): number[] {
  const n = x.length;
  const h: number[] = [];
  const chord: number[] = [];
  for (let i = 0; i + 1 < n; i += 1) {
    h.push(at(x, i + 1) - at(x, i));
    chord.push((at(y, i + 1) - at(y, i)) / at(h, i));
  }
  const first = at(x, 2) - at(x, 0);
  const last = at(x, n - 1) - at(x, n - 3);
  const below = [0];
  const diagonal = [at(h, 1)];
  const above = [first];
  const right = [((at(h, 0) + 2 * first) * at(h, 1) * at(chord, 0) + at(h, 0) ** 2 * at(chord, 1)) / first];
  for (let i = 1; i + 1 < n; i += 1) {
    below.push(at(h, i));
    diagonal.push(2 * (at(h, i - 1) + at(h, i)));
    above.push(at(h, i - 1));
    right.push(3 * (at(h, i) * at(chord, i - 1) + at(h, i - 1) * at(chord, i)));
  }
  below.push(last);
  diagonal.push(at(h, n - 3));
  above.push(0);
  const end = at(h, n - 2);
  right.push((end ** 2 * at(chord, n - 3) + (2 * last + end) * at(h, n - 3) * at(chord, n - 2)) / last);
  return solveTridiagonal(below, diagonal, above, right);
}

/** A parabola through three points has these slopes at them. */
function parabolaSlopes(x: readonly number[], y: readonly number[]): number[] {
  const h0 = at(x, 1) - at(x, 0);
  const h1 = at(x, 2) - at(x, 1);
  const c0 = (at(y, 1) - at(y, 0)) / h0;
  const c1 = (at(y, 2) - at(y, 1)) / h1;
  const curvature = (c1 - c0) / (h0 + h1);
  return [c0 - curvature * h0, c0 + curvature * h0, c1 + curvature * h1];
}

/**
 * The cubic spline through a table: a straight line for two rows, a parabola for three, not-a-knot ends for more.
 *
 * @param x arguments, strictly rising, at least two
 * @param y one finite value for each
 * @returns the spline, for evaluateSpline
 * @throws InconsistentInputError when rows do not rise or lists differ in length, OutOfDomainError for a value that is not finite
 * Accuracy: exact at the rows, and everywhere when the rows lie on a cubic.
 * Source: the definition of the not-a-knot cubic spline.
 * @example evaluateSpline(cubicSpline([0, 1, 2, 3], [0, 1, 8, 27]), 1.5).value // ≈ 3.375
 */
export function cubicSpline(x: readonly number[], y: readonly number[]): Spline {
  requireIncreasing(x, y);
  if (x.length === 2) {
    const slope = (at(y, 1) - at(y, 0)) / (at(x, 1) - at(x, 0));
    return { x, y, slopes: [slope, slope] };
  }
  return { x, y, slopes: x.length === 3 ? parabolaSlopes(x, y) : notAKnotSlopes(x, y) };
}

/**
 * Value and slope of a spline; it never extrapolates.
 *
 * @param spline from cubicSpline
 * @param argument between the first and the last row
 * @returns value (unit of y) and slope (y per x)
 * @throws OutOfDomainError outside the table
 * Accuracy: rounding of doubles.
 * Source: Hermite form of the cubic.
 * @example evaluateSpline(cubicSpline([0, 2], [1, 5]), 1) // { value: 3, slope: 2 }
 */
export function evaluateSpline(spline: Spline, argument: number): { value: number; slope: number } {
  const { x, y, slopes } = spline;
  const lower = at(x, 0);
  const upper = at(x, x.length - 1);
  if (!(argument >= lower && argument <= upper)) {
    throw new OutOfDomainError({ quantity: 'table argument', value: argument, unit: '', lower, upper });
  }
  let i = 0;
  while (i < x.length - 2 && argument >= at(x, i + 1)) i += 1;
  const h = at(x, i + 1) - at(x, i);
  const s = argument - at(x, i);
  const chord = (at(y, i + 1) - at(y, i)) / h;
  const c2 = (3 * chord - 2 * at(slopes, i) - at(slopes, i + 1)) / h;
  const c3 = (at(slopes, i) + at(slopes, i + 1) - 2 * chord) / h ** 2;
  // The last row is met from the right end of its interval: return it exactly as it stands in the table.
  const value = argument === upper ? at(y, x.length - 1) : at(y, i) + s * (at(slopes, i) + s * (c2 + s * c3));
  return { value, slope: at(slopes, i) + s * (2 * c2 + 3 * s * c3) };
}
