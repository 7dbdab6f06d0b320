/**
 * Source: JCGM 100:2008, Evaluation of measurement data - Guide to the expression of uncertainty in measurement.
 * Provenance: published. The data of H.3 were read; its results, G.4.1, H.1 and the clauses of chapter 4 are from memory, confidence high.
 */
import { describe, expect, test } from 'vitest';
import { coverageFactorFor } from '../../shared/science/quantiles.ts';
import { fitLine, predictLine } from '../../shared/science/regression.ts';
import { combineUncertainty, coverageDegreesOfFreedom } from '../../shared/science/uncertainty.ts';

const normal = (name: string, value: number, degreesOfFreedom: number) => ({
  name,
  value,
  distribution: 'normal' as const,
  degreesOfFreedom,
});

describe('4.3: from what is stated to a standard uncertainty', () => {
  test('4.3.3: 240 µg stated as three standard deviations is 80 µg', () => {
    const mass = { name: 'mass standard', value: 240, divisor: 3, distribution: 'normal' as const };
    expect(combineUncertainty({ components: [mass] }).standard).toBeCloseTo(80, 12);
  });

  test('4.3.7 and 4.3.9: a half-width is divided by the root of 3 and by the root of 6', () => {
    const width = (distribution: 'rectangular' | 'triangular') =>
      combineUncertainty({ components: [{ name: 'limits', value: 1, distribution }] }).standard;
    expect(width('rectangular') ** 2).toBeCloseTo(1 / 3, 14);
    expect(width('triangular') ** 2).toBeCloseTo(1 / 6, 14);
  });

  test('F.2.2.1: a resolution of one step has a standard uncertainty of 0.29 steps', () => {
    const half = { name: 'resolution', value: 0.5, distribution: 'rectangular' as const };
    expect(combineUncertainty({ components: [half] }).standard).toBeCloseTo(0.29, 2);
  });
});

describe('G.4.1: three components with 9, 4 and 14 degrees of freedom', () => {
  const result = combineUncertainty({
    components: [normal('p', 0.25, 9), normal('q', 0.57, 4), normal('r', 0.82, 14)],
  });

  test('combined 1.03 %, 19.0 effective degrees of freedom, t 2.09, expanded 2.2 %', () => {
    // Printed to three, three, three and two figures.
    expect(result.standard).toBeCloseTo(1.03, 2);
    expect(result.effectiveDegreesOfFreedom).toBeCloseTo(19.0, 1);
    expect(result.coverageFactor).toBeCloseTo(2.09, 2);
    expect(result.expanded).toBeCloseTo(2.2, 1);
  });

  test('18.9987 is read at 19, as printed; a strict floor would read it at 18 and give 2.101', () => {
    expect(result.effectiveDegreesOfFreedom).toBeCloseTo(18.9987, 4);
    expect(result.coverageDegreesOfFreedom).toBe(19);
    expect(coverageDegreesOfFreedom(18.94)).toBe(18);
  });
});

describe('H.1: the end gauge', () => {
  const result = combineUncertainty({
    components: [
      normal('standard, nm', 25, 18),
      normal('difference, nm', 9.7, 25.6),
      { ...normal('difference of expansion', 0.58e-6, 50), sensitivity: 50e6 * 0.1 },
      { ...normal('difference of temperature', 0.029, 2), sensitivity: 50e6 * 11.5e-6 },
    ],
    coverageProbability: 0.99,
  });

  test('32 nm combined, 16 degrees of freedom, t 2.92, 93 nm expanded at 99 %', () => {
    // Printed to whole nanometres and three figures of t.
    expect(Math.abs(result.standard - 32)).toBeLessThan(0.5);
    expect(result.coverageDegreesOfFreedom).toBe(16);
    expect(result.coverageFactor).toBeCloseTo(2.92, 2);
    expect(Math.abs(result.expanded - 93)).toBeLessThan(1);
  });

  test('a negative sensitivity contributes as much as a positive one', () => {
    const one = (sensitivity: number) =>
      combineUncertainty({ components: [{ ...normal('x', 0.58, 50), sensitivity }] }).budget[0]?.contribution;
    expect(one(-5)).toBe(one(5));
  });
});

describe('H.3: the thermometer line', () => {
  const temperaturesC = [
    21.521, 22.012, 22.512, 23.003, 23.507, 23.999, 24.513, 25.002, 25.503, 26.01, 26.511,
  ];
  const correctionsC = [
    -0.171, -0.169, -0.166, -0.159, -0.164, -0.165, -0.156, -0.157, -0.159, -0.161, -0.16,
  ];
  const fit = fitLine({ x: temperaturesC.map((t) => t - 20), y: correctionsC });

  test('intercept, slope, their errors, correlation and scatter', () => {
    // Printed: -0.1712 (0.0029), 0.00218 (0.00067), -0.930, 0.0035.
    expect(fit.intercept).toBeCloseTo(-0.1712, 4);
    expect(fit.interceptStandardError).toBeCloseTo(0.0029, 4);
    expect(fit.slope).toBeCloseTo(0.00218, 5);
    expect(fit.slopeStandardError).toBeCloseTo(0.00067, 5);
    expect(fit.correlation).toBeCloseTo(-0.93, 3);
    expect(fit.residualSd).toBeCloseTo(0.0035, 4);
  });

  test('the same to the digits of an independent computation', () => {
    expect(fit.intercept).toBeCloseTo(-0.1712, 5);
    expect(fit.slope).toBeCloseTo(0.0021827, 7);
    expect(fit.slopeStandardError).toBeCloseTo(0.0006679, 7);
    expect(fit.interceptStandardError).toBeCloseTo(0.002878, 6);
    expect(fit.correlation).toBeCloseTo(-0.9304, 4);
    expect(fit.residualSd).toBeCloseTo(0.003498, 6);
  });

  test('the correction at 30 °C is -0.1494 with u 0.0041 and 9 degrees of freedom', () => {
    const at30 = predictLine(fit, 10, 0.95);
    expect(at30.value).toBeCloseTo(-0.1494, 4);
    expect(at30.standardUncertainty).toBeCloseTo(0.0041, 4);
    expect(fit.degreesOfFreedom).toBe(9);
  });

  test('leaving out the covariance would overstate the uncertainty at 30 °C by more than half', () => {
    const naive = Math.hypot(fit.interceptStandardError, 10 * fit.slopeStandardError);
    expect(naive / predictLine(fit, 10, 0.95).standardUncertainty).toBeGreaterThan(1.5);
  });
});

describe('table G.2', () => {
  test.each([
    // degrees of freedom, k at 95.45 %, k at 95 %; printed to two decimals
    [1, 13.97, 12.71],
    [2, 4.53, 4.3],
    [3, 3.31, 3.18],
    [4, 2.87, 2.78],
    [5, 2.65, 2.57],
    [6, 2.52, 2.45],
    [7, 2.43, 2.36],
    [8, 2.37, 2.31],
    [9, 2.32, 2.26],
    [10, 2.28, 2.23],
  ])('%i degrees of freedom', (degreesOfFreedom, k9545, k95) => {
    // Half a unit of the last printed digit, and a little for 95.45 % standing for two standard deviations.
    expect(Math.abs(coverageFactorFor(0.9545, degreesOfFreedom) - k9545)).toBeLessThan(0.0051);
    expect(Math.abs(coverageFactorFor(0.95, degreesOfFreedom) - k95)).toBeLessThan(0.005);
  });

  test.each([
    [15, 2.18],
    [20, 2.13],
    [25, 2.105],
    [30, 2.09],
    [50, 2.05],
    [100, 2.025],
    [Infinity, 2.0],
  ])('%d degrees of freedom at 95.45 %%', (degreesOfFreedom, k) => {
    expect(Math.abs(coverageFactorFor(0.9545, degreesOfFreedom) - k)).toBeLessThan(0.0051);
  });
});

describe('Source: EA-4/02, worked example of a 10 kg weight. Provenance: worked example, from memory, confidence medium', () => {
  test('29.3 mg combined and 59 mg expanded with k = 2', () => {
    const result = combineUncertainty({
      components: [
        { name: 'standard, mg', value: 45, divisor: 2, distribution: 'normal' },
        { name: 'drift of the standard, mg', value: 15, distribution: 'rectangular' },
        { name: 'difference, mg', value: 14.4, distribution: 'normal' },
        { name: 'comparator, mg', value: 10, distribution: 'rectangular' },
        { name: 'air buoyancy, mg', value: 10, distribution: 'rectangular' },
      ],
      coverageProbability: 0.9545,
    });
    // Printed after rounding each row to three figures.
    expect(Math.abs(result.standard - 29.3)).toBeLessThan(0.1);
    expect(Math.abs(result.expanded - 59)).toBeLessThan(0.6);
    expect(result.coverageFactor).toBeCloseTo(2, 3);
  });
});
