/** Method names after ILAC-G24 / OIML D 10 (2022), contents published; the factors are policy, common practice. */
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { InconsistentInputError, OutOfDomainError } from '../../shared/science/errors.ts';
import {
  controlChartReview,
  groupReliability,
  inUseTimeReview,
  plannedInterval,
  staircase,
} from '../../shared/science/interval-review.ts';

const policy = { withinFraction: 0.8, extendFactor: 1.2, reduceFactor: 0.6, minDays: 14, maxDays: 365 };
const stairs = { ...policy, intervalDays: 90, tolerance: 3 };

describe('staircase', () => {
  test.each([
    ['well within: longer', 1, 108],
    ['at four fifths of the tolerance: still longer', 2.4, 108],
    ['between four fifths and the tolerance: unchanged', 2.41, 90],
    ['at the tolerance: unchanged', 3, 90],
    ['outside: shorter', 3.01, 54],
  ])('%s', (_, error, days) => {
    expect(staircase({ ...stairs, error })).toBeCloseTo(days, 10);
    expect(staircase({ ...stairs, error: -error })).toBeCloseTo(days, 10);
  });

  test('it stops at the shortest and at the longest interval', () => {
    expect(staircase({ ...stairs, intervalDays: 350, error: 0 })).toBe(365);
    expect(staircase({ ...stairs, intervalDays: 20, error: 9 })).toBe(14);
  });

  test('a larger error never earns a longer interval', () => {
    const errors = fc.double({ min: 0, max: 10, noNaN: true });
    fc.assert(
      fc.property(errors, errors, (a, b) => {
        const at = (error: number) => staircase({ ...stairs, error });
        expect(at(Math.max(a, b))).toBeLessThanOrEqual(at(Math.min(a, b)));
      }),
    );
  });
});

describe('control chart', () => {
  const chart = {
    ...policy,
    intervalDays: 90,
    target: 0,
    sigma: 0.4,
    lambda: 0.3,
    limitWidth: 3,
    quietPoints: 3,
  };

  test('a signal in the newest result shortens', () => {
    const review = controlChartReview({ ...chart, values: [0.1, 0.2, 0, 2.4] });
    expect(review).toEqual({ intervalDays: 54, reading: 'signal' });
  });

  test('three quiet results in a row lengthen; two do not', () => {
    expect(controlChartReview({ ...chart, values: [0.1, -0.2, 0.1] }).reading).toBe('quiet');
    expect(controlChartReview({ ...chart, values: [0.1, -0.2] })).toEqual({
      intervalDays: 90,
      reading: 'unsettled',
    });
  });

  test('an old signal that has passed neither shortens nor lengthens at once', () => {
    const review = controlChartReview({ ...chart, values: [3, 0, 0] });
    expect(review.reading).toBe('unsettled');
  });
});

describe('in-use time', () => {
  test('1000 h of use, 400 used in 50 days, leave 75 days', () => {
    expect(inUseTimeReview({ intervalHours: 1000, hoursUsed: 400, daysObserved: 50, maxDays: 365 })).toBe(75);
  });
  test('a probe not used runs to the longest interval, one used up is due now', () => {
    const at = (hoursUsed: number) =>
      inUseTimeReview({ intervalHours: 1000, hoursUsed, daysObserved: 50, maxDays: 365 });
    expect(at(0)).toBe(365);
    expect(at(1000)).toBe(0);
    expect(at(1e-9)).toBe(365);
  });
});

describe('group reliability', () => {
  test('4 found outside in 40 probe-years: 0.1 a year, and 0.513 years keep 95 % within', () => {
    const group = groupReliability({ failures: 4, exposureYears: 40, target: 0.95 });
    expect(group.ratePerYear).toBe(0.1);
    expect(group.intervalYears).toBeCloseTo(0.512933, 6);
  });

  test('at the end of the interval the target share is still within', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 200 }),
        fc.double({ min: 0.5, max: 0.999, noNaN: true }),
        (n, target) => {
          const { ratePerYear, intervalYears } = groupReliability({ failures: n, exposureYears: 55, target });
          expect(Math.exp(-ratePerYear * intervalYears)).toBeCloseTo(target, 12);
        },
      ),
    );
  });

  test('never found outside is no proof for ever: the cautious interval stays finite', () => {
    const group = groupReliability({ failures: 0, exposureYears: 10, target: 0.95 });
    expect(group).toMatchObject({ ratePerYear: 0, intervalYears: Infinity });
    // -ln(1 - 0.9)/10 a year.
    expect(group.upperRatePerYear).toBeCloseTo(0.2302585, 7);
    expect(group.cautiousIntervalYears).toBeCloseTo(0.2227635, 6);
  });

  test('more experience brings the cautious interval nearer to the plain one', () => {
    const gap = (years: number) => {
      const group = groupReliability({ failures: years / 10, exposureYears: years, target: 0.9 });
      return group.intervalYears / group.cautiousIntervalYears;
    };
    expect(gap(20)).toBeGreaterThan(gap(200));
    expect(gap(200)).toBeGreaterThan(gap(2000));
    expect(gap(2000)).toBeGreaterThan(1);
  });
});

describe('the interval to plan with', () => {
  const plan = { lastDays: 90, predictedDays: 120, growFactor: 1.5, minDays: 14, maxDays: 365 };

  test.each([
    ['the forecast, when it is shortest', {}, 120, 'forecast'],
    ['one step, when the forecast is hopeful', { predictedDays: 300 }, 135, 'step'],
    ['policy, when both are longer', { predictedDays: 900, lastDays: 300 }, 365, 'policy'],
    ["a bottle's life, when it ends first", { ceilings: [60, 200] }, 60, 'ceiling'],
    ['the floor, when the forecast asks for a visit every other day', { predictedDays: 2 }, 14, 'floor'],
  ] as const)('%s', (_, part, intervalDays, decidedBy) => {
    expect(plannedInterval({ ...plan, ...part })).toEqual({ intervalDays, decidedBy });
  });

  test('the floor never lifts an interval above a ceiling', () => {
    const decided = { intervalDays: 7, decidedBy: 'ceiling' };
    expect(plannedInterval({ ...plan, ceilings: [7] })).toEqual(decided);
    expect(plannedInterval({ ...plan, predictedDays: 2, ceilings: [7] })).toEqual(decided);
  });
});

test.each<[string, () => unknown]>([
  ['an interval of 0', () => staircase({ ...stairs, error: 1, intervalDays: 0 })],
  ['an error that is not a number', () => staircase({ ...stairs, error: NaN })],
  ['a tolerance of 0', () => staircase({ ...stairs, error: 1, tolerance: 0 })],
  ['a fraction above 1', () => staircase({ ...stairs, error: 1, withinFraction: 1.1 })],
  ['an extending factor that shortens', () => staircase({ ...stairs, error: 1, extendFactor: 0.9 })],
  ['a reducing factor that lengthens', () => staircase({ ...stairs, error: 1, reduceFactor: 1.1 })],
  ['half a failure', () => groupReliability({ failures: 0.5, exposureYears: 1, target: 0.9 })],
  ['no exposure', () => groupReliability({ failures: 1, exposureYears: 0, target: 0.9 })],
  ['a target of 1', () => groupReliability({ failures: 1, exposureYears: 1, target: 1 })],
  ['negative hours', () => inUseTimeReview({ intervalHours: 1, hoursUsed: -1, daysObserved: 1, maxDays: 1 })],
])('%s is refused', (_, call) => {
  expect(call).toThrow(OutOfDomainError);
});

test('limits the wrong way round are refused', () => {
  expect(() => staircase({ ...stairs, error: 1, minDays: 400 })).toThrow(InconsistentInputError);
});
