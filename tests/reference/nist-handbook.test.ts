/**
 * Source: NIST/SEMATECH e-Handbook of Statistical Methods, 6.3.2.4 (EWMA control charts) and 6.3.2.3 (CUSUM control charts).
 * Provenance: worked examples, published.
 */
import { describe, expect, test } from 'vitest';
import { cusum, ewma } from '../../shared/science/control-charts.ts';

describe('6.3.2.4 EWMA', () => {
  const values = [
    52.0, 47.0, 53.0, 49.3, 50.1, 47.0, 51.0, 50.1, 51.2, 50.5, 49.6, 47.6, 49.9, 51.3, 47.8, 51.2, 52.6,
    52.4, 53.6, 52.1,
  ];
  const printed = [
    50.6, 49.52, 50.56, 50.18, 50.16, 49.21, 49.75, 49.85, 50.26, 50.33, 50.11, 49.36, 49.52, 50.05, 49.38,
    49.92, 50.73, 51.23, 51.94, 51.99,
  ];
  const chart = ewma({ values, lambda: 0.3, target: 50, sigma: 2.0539, limitWidth: 3 });

  test('every average to the printed hundredth, and no signal', () => {
    chart.values.forEach((value, index) => {
      // Half a hundredth: the page rounds.
      expect(Math.abs(value - (printed[index] as number))).toBeLessThanOrEqual(0.005);
    });
    expect(chart.signals).toEqual([]);
  });

  test('the limits settle at the printed 52.5884 and 47.4115', () => {
    const long = ewma({
      ...{ values: Array.from({ length: 60 }, () => 50) },
      lambda: 0.3,
      target: 50,
      sigma: 2.0539,
      limitWidth: 3,
    });
    // The page truncates: 52.58843 and 47.41157.
    expect(long.upper.at(-1)).toBeCloseTo(52.58843, 5);
    expect(long.lower.at(-1)).toBeCloseTo(47.41157, 5);
  });

  test('the first limits are narrower: 48.151 to 51.849, and 47.448 to 52.552 at the fifth', () => {
    expect([chart.lower[0], chart.upper[0]]).toEqual([expect.closeTo(48.151, 3), expect.closeTo(51.849, 3)]);
    expect([chart.lower[4], chart.upper[4]]).toEqual([expect.closeTo(47.448, 3), expect.closeTo(52.552, 3)]);
  });

  test('limits of a long run used from the first point miss a first value of 56.67', () => {
    const first = ewma({ values: [56.67], lambda: 0.3, target: 50, sigma: 2.0539, limitWidth: 3 });
    expect(first.values[0]).toBeCloseTo(52.0, 2);
    expect(first.signals).toEqual([0]);
    expect(first.values[0]).toBeLessThan(52.5884);
  });
});

describe('6.3.2.3 CUSUM', () => {
  const values = [
    324.925, 324.675, 324.725, 324.35, 325.35, 325.225, 324.125, 324.525, 325.225, 324.6, 324.625, 325.15,
    328.325, 327.25, 327.825, 328.5, 326.675, 327.775, 326.875, 328.35,
  ];
  const chart = cusum({ values, target: 325, allowance: 0.3175, decisionInterval: 4.1959 });

  test('points 14 to 20 signal, and no others', () => {
    expect(chart.signals).toEqual([13, 14, 15, 16, 17, 18, 19]);
  });

  test('the upward sum is 3.0075 at point 13 and 4.940 at point 14', () => {
    expect(chart.high[12]).toBeCloseTo(3.0075, 4);
    expect(chart.high[13]).toBeCloseTo(4.94, 3);
  });
});
