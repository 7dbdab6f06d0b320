import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { cusum, ewma } from '../../shared/science/control-charts.ts';
import { InconsistentInputError, OutOfDomainError } from '../../shared/science/errors.ts';

const series = fc.array(fc.double({ min: -50, max: 50, noNaN: true }), { minLength: 1, maxLength: 60 });
const settings = { lambda: 0.25, target: 0, sigma: 1, limitWidth: 3 };

describe('EWMA', () => {
  test('the average stays among the target and the values', () => {
    fc.assert(
      fc.property(series, fc.double({ min: 0.01, max: 1, noNaN: true }), (values, lambda) => {
        const chart = ewma({ ...settings, values, lambda });
        chart.values.forEach((value, index) => {
          const seen = [0, ...values.slice(0, index + 1)];
          expect(value).toBeGreaterThanOrEqual(Math.min(...seen) - 1e-9);
          expect(value).toBeLessThanOrEqual(Math.max(...seen) + 1e-9);
        });
      }),
    );
  });

  test('limits widen from point to point and are the same on both sides', () => {
    const chart = ewma({ ...settings, values: Array.from({ length: 30 }, () => 0) });
    for (let index = 1; index < 30; index += 1) {
      expect(chart.upper[index]).toBeGreaterThan(chart.upper[index - 1] as number);
      expect(chart.lower[index]).toBe(-(chart.upper[index] as number));
    }
  });

  test('with lambda 1 it is a plain chart of single values at L sigma', () => {
    const chart = ewma({ ...settings, lambda: 1, values: [2.9, -3.1, 3] });
    expect(chart.values).toEqual([2.9, expect.closeTo(-3.1, 12), expect.closeTo(3, 12)]);
    expect(chart.upper[0]).toBeCloseTo(3, 12);
    expect(chart.signals).toContain(1);
    expect(chart.signals).not.toContain(0);
  });

  test('a shift of one and a half sigma that no single value shows is seen', () => {
    const chart = ewma({ ...settings, values: Array.from({ length: 20 }, () => 1.5) });
    expect(chart.signals.length).toBeGreaterThan(0);
    expect(Math.min(...chart.signals)).toBeLessThan(10);
  });

  test('the unit of the values does not change the signals', () => {
    fc.assert(
      fc.property(series, fc.constantFrom(2 ** -20, 0.25, 1024), (values, unit) => {
        // Powers of two scale without rounding, so that a point on a limit stays on it.
        const scaled = ewma({ ...settings, values: values.map((value) => value * unit), sigma: unit });
        expect(scaled.signals).toEqual(ewma({ ...settings, values }).signals);
      }),
    );
  });
});

describe('CUSUM', () => {
  test('sums are never negative and start again from 0', () => {
    fc.assert(
      fc.property(series, (values) => {
        const chart = cusum({ values, target: 0, allowance: 0.5, decisionInterval: 5 });
        expect(Math.min(...chart.high, ...chart.low)).toBeGreaterThanOrEqual(0);
      }),
    );
  });

  test('a shift down is seen as soon as the same shift up', () => {
    fc.assert(
      fc.property(series, (values) => {
        const up = cusum({ values, target: 0, allowance: 0.5, decisionInterval: 5 });
        const down = cusum({
          values: values.map((value) => -value),
          target: 0,
          allowance: 0.5,
          decisionInterval: 5,
        });
        expect(down.signals).toEqual(up.signals);
        expect(down.low).toEqual(up.high);
      }),
    );
  });

  test('a sum that just reaches the decision interval is no signal yet', () => {
    expect(cusum({ values: [2, 2], target: 0, allowance: 0, decisionInterval: 4 }).signals).toEqual([]);
    expect(cusum({ values: [2, 2.5], target: 0, allowance: 0, decisionInterval: 4 }).signals).toEqual([1]);
  });
});

test.each([
  ['a weight of 0', () => ewma({ ...settings, values: [1], lambda: 0 })],
  ['a weight above 1', () => ewma({ ...settings, values: [1], lambda: 1.1 })],
  ['a standard deviation of 0', () => ewma({ ...settings, values: [1], sigma: 0 })],
  ['limits of no width', () => ewma({ ...settings, values: [1], limitWidth: 0 })],
  ['a value that is not a number', () => ewma({ ...settings, values: [1, NaN] })],
  [
    'a target that is not a number',
    () => cusum({ values: [1], target: NaN, allowance: 0, decisionInterval: 1 }),
  ],
  ['a negative allowance', () => cusum({ values: [1], target: 0, allowance: -1, decisionInterval: 1 })],
  ['a decision interval of 0', () => cusum({ values: [1], target: 0, allowance: 0, decisionInterval: 0 })],
])('%s is refused', (_, call) => {
  expect(call).toThrow(OutOfDomainError);
});

test('a chart without values is refused', () => {
  expect(() => ewma({ ...settings, values: [] })).toThrow(InconsistentInputError);
  expect(() => cusum({ values: [], target: 0, allowance: 0, decisionInterval: 1 })).toThrow(
    InconsistentInputError,
  );
});
