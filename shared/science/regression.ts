/** Straight lines by least squares, ordinary or weighted by given uncertainties, with what they can and cannot predict. */
import { InconsistentInputError, requireFinite, requireNonNegative, requirePositive } from './errors.ts';
import { requireProbability, tQuantile } from './quantiles.ts';

export interface LineFit {
  /** Value of the line at x = 0, unit of y. */
  intercept: number;
  /** Unit of y per unit of x. */
  slope: number;
  interceptStandardError: number;
  slopeStandardError: number;
  /** Covariance of intercept and slope. */
  covariance: number;
  /** Correlation of intercept and slope, -1 to 1. */
  correlation: number;
  /** Standard deviation about the line, unit of y; with given u, the deviation of a point of weight one (dimensionless). */
  residualSd: number;
  /** Sum of squared residuals, each over its u when u is given. */
  chiSquare: number;
  degreesOfFreedom: number;
  /** Share of the variation that the line explains, 0 to 1. */
  rSquared: number;
  count: number;
  /** Weighted mean of x, and the height of the line there: the two numbers that predict without cancellation. */
  centreX: number;
  centreY: number;
  centreStandardError: number;
  /** Standard deviation of one further reading: residualSd, or the root mean square of the given u. */
  readingSd: number;
}

interface Sums {
  weight: number;
  meanX: number;
  meanY: number;
  xx: number;
  xy: number;
  yy: number;
}

function checkedWeights(x: readonly number[], y: readonly number[], u?: readonly number[]): number[] {
  if (x.length !== y.length || (u !== undefined && u.length !== x.length)) {
    throw new InconsistentInputError({
      quantity: 'points of the line',
      reason: `x, y and u have ${x.length}, ${y.length} and ${u?.length ?? 'no'} entries`,
      advice: 'Give one entry per point in each.',
    });
  }
  const fewest = u === undefined ? 3 : 2;
  if (x.length < fewest) {
    throw new InconsistentInputError({
      quantity: 'points of the line',
      reason: `a line with its uncertainty needs at least ${fewest}, and ${x.length} are given`,
      advice: 'Add points, or state the u of each.',
    });
  }
  x.forEach((value, index) => requireFinite(`x of point ${index + 1}`, value, ''));
  y.forEach((value, index) => requireFinite(`y of point ${index + 1}`, value, ''));
  if (u === undefined) return x.map(() => 1);
  u.forEach((value, index) => requirePositive(`u of point ${index + 1}`, value, ''));
  return u.map((value) => 1 / (value * value));
}

/** A mean with a second pass over the remainders, so that a large offset in the values costs no digits. */
function weightedMean(values: readonly number[], weights: readonly number[], weight: number): number {
  let first = 0;
  values.forEach((value, index) => (first += (value * (weights[index] as number)) / weight));
  let remainder = 0;
  values.forEach((value, index) => (remainder += (value - first) * (weights[index] as number)));
  return first + remainder / weight;
}

/** Centres before multiplying: sums of raw x times y lose every digit when x is a time in milliseconds. */
function centredSums(x: readonly number[], y: readonly number[], weights: readonly number[]): Sums {
  const weight = weights.reduce((sum, value) => sum + value, 0);
  const meanX = weightedMean(x, weights, weight);
  const meanY = weightedMean(y, weights, weight);
  let [xx, xy, yy] = [0, 0, 0];
  weights.forEach((w, index) => {
    const dx = (x[index] as number) - meanX;
    const dy = (y[index] as number) - meanY;
    xx += w * dx * dx;
    xy += w * dx * dy;
    yy += w * dy * dy;
  });
  return { weight, meanX, meanY, xx, xy, yy };
}

/**
 * Fits a straight line by least squares, ordinary or weighted by 1/u^2.
 * slope = Sxy/Sxx about the (weighted) means; u(slope)^2 = s^2/Sxx; u(intercept)^2 = s^2 (1/W + xm^2/Sxx);
 * covariance = -s^2 xm/Sxx. Without u: W = n and s^2 = chiSquare/(n - 2). With u: W = sum 1/u^2 and s^2 = max(1, chiSquare/(n - 2)):
 * scatter larger than stated enlarges the errors, scatter smaller than stated never shrinks them.
 * @param options.x at least 3 finite values (2 with u), not all equal. Any origin: epoch milliseconds lose no more than their own rounding.
 * @param options.y as many values, any one unit.
 * @param options.u standard uncertainty of each y, above 0, unit of y.
 * @returns the line in the units of y and x, with standard errors, covariance, chi-square and degrees of freedom.
 * @throws InconsistentInputError for lists of different length, too few points or x all equal; OutOfDomainError for a number out of range.
 * Accuracy: 13 significant digits on the NIST reference data set Norris. Source: gum-2008 H.3, nist-strd-norris, bevington 6.3.
 * @example fitLine({ x: [1, 2, 3, 4], y: [2.1, 3.9, 6.2, 7.8] }).slope // ≈ 1.94
 */
export function fitLine(options: {
  x: readonly number[];
  y: readonly number[];
  u?: readonly number[];
}): LineFit {
  const { x, y, u } = options;
  const weights = checkedWeights(x, y, u);
  const sums = centredSums(x, y, weights);
  if (!(sums.xx > 0)) {
    throw new InconsistentInputError({
      quantity: 'points of the line',
      reason: 'every x is the same, so a slope cannot be found',
      advice: 'Add a point at another x.',
    });
  }
  const slope = sums.xy / sums.xx;
  let chiSquare = 0;
  weights.forEach((w, index) => {
    const residual = (y[index] as number) - sums.meanY - slope * ((x[index] as number) - sums.meanX);
    chiSquare += w * residual * residual;
  });
  const degreesOfFreedom = x.length - 2;
  const unitVariance = degreesOfFreedom > 0 ? chiSquare / degreesOfFreedom : 0;
  const scale = u === undefined ? unitVariance : Math.max(1, unitVariance);
  const interceptVariance = scale * (1 / sums.weight + (sums.meanX * sums.meanX) / sums.xx);
  const slopeVariance = scale / sums.xx;
  const covariance = (-scale * sums.meanX) / sums.xx;
  const spread = Math.sqrt(interceptVariance) * Math.sqrt(slopeVariance);
  return {
    intercept: sums.meanY - slope * sums.meanX,
    slope,
    interceptStandardError: Math.sqrt(interceptVariance),
    slopeStandardError: Math.sqrt(slopeVariance),
    covariance,
    correlation: spread > 0 ? Math.max(-1, Math.min(1, covariance / spread)) : 0,
    residualSd: Math.sqrt(unitVariance),
    chiSquare,
    degreesOfFreedom,
    rSquared: sums.yy > 0 ? Math.max(0, Math.min(1, 1 - chiSquare / sums.yy)) : 1,
    count: x.length,
    centreX: sums.meanX,
    centreY: sums.meanY,
    centreStandardError: Math.sqrt(scale / sums.weight),
    readingSd:
      u === undefined
        ? Math.sqrt(unitVariance)
        : Math.sqrt(scale * (u.reduce((sum, value) => sum + value * value, 0) / u.length)),
  };
}

/**
 * What a fitted line says at an x: its height, the band for the line itself and the wider band for one further reading.
 * value = ym + slope (x0 - xm); u(line)^2 = u(ym)^2 + (x0 - xm)^2 u(slope)^2; confidence half-width t u(line);
 * prediction half-width t sqrt(u0^2 + u(line)^2), with t for n - 2 degrees of freedom.
 * @param fit from fitLine, with at least 1 degree of freedom.
 * @param x0 unit of x. Beyond the fitted points the band assumes that the line goes on straight.
 * @param probability two-sided coverage, 0 to 1, ends excluded.
 * @param readingSd u0, standard uncertainty of the further reading, unit of y; fit.readingSd unless given.
 * @returns value and half-widths, unit of y.
 * @throws OutOfDomainError outside those ranges.
 * Accuracy: 1e-12 relative. Source: gum-2008 H.3.4, nist-handbook 4.5.2.
 * @example predictLine(fitLine({ x: [1, 2, 3, 4], y: [2.1, 3.9, 6.2, 7.8] }), 5, 0.95).value // ≈ 9.85
 */
export function predictLine(
  fit: LineFit,
  x0: number,
  probability: number,
  readingSd: number = fit.readingSd,
): { value: number; standardUncertainty: number; confidenceHalfWidth: number; predictionHalfWidth: number } {
  requireFinite('x of the prediction', x0, '');
  requireProbability('probability', probability);
  requireNonNegative('standard uncertainty of a reading', readingSd, '');
  const t = tQuantile((1 + probability) / 2, fit.degreesOfFreedom);
  const distance = x0 - fit.centreX;
  const lineUncertainty = Math.hypot(fit.centreStandardError, distance * fit.slopeStandardError);
  return {
    value: fit.centreY + fit.slope * distance,
    standardUncertainty: lineUncertainty,
    confidenceHalfWidth: t * lineUncertainty,
    predictionHalfWidth: t * Math.hypot(readingSd, lineUncertainty),
  };
}

/**
 * The half-width of the band that holds one further reading at x0; wider than the band for the line (see predictLine).
 * h = t sqrt(u0^2 + u(line)^2).
 * @param fit from fitLine, with at least 1 degree of freedom.
 * @param x0 unit of x.
 * @param probability two-sided coverage, 0 to 1, ends excluded.
 * @returns half-width, unit of y.
 * @throws OutOfDomainError outside those ranges.
 * Accuracy: 1e-12 relative. Source: nist-handbook 4.5.2.
 * @example predict(fitLine({ x: [1, 2, 3, 4], y: [2.1, 3.9, 6.2, 7.8] }), 5, 0.95) // ≈ 1.37752
 */
export function predict(fit: LineFit, x0: number, probability: number): number {
  return predictLine(fit, x0, probability).predictionHalfWidth;
}
