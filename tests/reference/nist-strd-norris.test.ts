/**
 * Source: NIST Statistical Reference Datasets, Norris (linear regression, 36 observations). Provenance: published. The observations are
 * from memory, confidence high: any wrong digit in them would fail the certified values below.
 */
import { describe, expect, test } from 'vitest';
import { fitLine } from '../../shared/science/regression.ts';

const OBSERVATIONS: readonly (readonly [y: number, x: number])[] = [
  [0.1, 0.2],
  [338.8, 337.4],
  [118.1, 118.2],
  [888.0, 884.6],
  [9.2, 10.1],
  [228.1, 226.5],
  [668.5, 666.3],
  [998.5, 996.3],
  [449.1, 448.6],
  [778.9, 777.0],
  [559.2, 558.2],
  [0.3, 0.4],
  [0.1, 0.6],
  [778.1, 775.5],
  [668.8, 666.9],
  [339.3, 338.0],
  [448.9, 447.5],
  [10.8, 11.6],
  [557.7, 556.0],
  [228.3, 228.1],
  [998.0, 995.8],
  [888.8, 887.6],
  [119.6, 120.2],
  [0.3, 0.3],
  [0.6, 0.3],
  [557.6, 556.8],
  [339.3, 339.1],
  [888.0, 887.2],
  [998.5, 999.0],
  [778.9, 779.0],
  [10.2, 11.1],
  [117.6, 118.3],
  [228.9, 229.2],
  [668.4, 669.1],
  [449.2, 448.9],
  [0.2, 0.5],
];

const CERTIFIED = {
  intercept: -0.262323073774029,
  slope: 1.00211681802045,
  interceptStandardError: 0.232818234301152,
  slopeStandardError: 0.429796848199937e-3,
  rSquared: 0.999993745883712,
  residualSd: 0.884796396144373,
};

const y = OBSERVATIONS.map(([value]) => value);
const x = OBSERVATIONS.map(([, value]) => value);

describe('Norris', () => {
  const fit = fitLine({ x, y });

  test.each(Object.entries(CERTIFIED))('%s agrees with the certified %d to 12 digits', (name, certified) => {
    // The certificate has 15 digits; the fit loses about two in sums of squares of 36 points.
    expect(Math.abs(fit[name as keyof typeof CERTIFIED] / certified - 1)).toBeLessThan(1e-12);
  });

  test.each([
    // shift of x, largest relative error: the rounding of x itself at that size
    [1e6, 1e-12],
    [1e9, 5e-11],
    [1e12, 5e-8],
  ])('times as large as %d keep the slope', (shift, tolerance) => {
    const shifted = fitLine({ x: x.map((value) => value + shift), y });
    expect(Math.abs(shifted.slope / CERTIFIED.slope - 1)).toBeLessThan(tolerance);
  });

  test('sums of raw squares, the textbook way, lose the slope at 1e12', () => {
    const n = x.length;
    const far = x.map((value) => value + 1e12);
    const sum = (values: number[]) => values.reduce((total, value) => total + value, 0);
    const denominator = n * sum(far.map((value) => value * value)) - sum(far) ** 2;
    const slope =
      (n * sum(far.map((value, index) => value * (y[index] as number))) - sum(far) * sum(y)) / denominator;
    // Written with `not`: the denominator may come out as 0, and the slope as no number at all.
    expect(Math.abs(slope / CERTIFIED.slope - 1)).not.toBeLessThan(0.1);
  });
});
