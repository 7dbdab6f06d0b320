import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { InconsistentInputError, OutOfDomainError } from '../../shared/science/errors.ts';
import { fitLine, predict, predictLine } from '../../shared/science/regression.ts';

/** Seven errors of one probe over a year and a half, and their standard uncertainties. Independent computation. */
const days = [0, 92, 181, 273, 365, 457, 546];
const errorsPercent = [0.02, -0.11, -0.24, -0.31, -0.49, -0.55, -0.71];
const uPercent = [0.1, 0.1, 0.05, 0.05, 0.1, 0.05, 0.05];

describe('a drift line without stated uncertainties', () => {
  const fit = fitLine({ x: days, y: errorsPercent });

  test('intercept, slope, scatter and degrees of freedom', () => {
    expect(fit.intercept).toBeCloseTo(0.0142325, 7);
    expect(fit.slope).toBeCloseTo(-0.00130075, 8);
    expect(fit.residualSd).toBeCloseTo(0.0258365, 7);
    expect(fit.degreesOfFreedom).toBe(5);
  });

  test('at 730 days the line is known to 0.0677 but one reading only to 0.0948: the narrow band is not a prediction', () => {
    const at730 = predictLine(fit, 730, 0.95);
    expect(at730.value).toBeCloseTo(-0.935312, 6);
    expect(at730.confidenceHalfWidth).toBeCloseTo(0.067699, 6);
    expect(at730.predictionHalfWidth).toBeCloseTo(0.094837, 6);
    expect(predict(fit, 730, 0.95)).toBe(at730.predictionHalfWidth);
  });

  test.each([
    // where line, one-sided 95 % band and two-sided 95 % band reach -1 %
    ['the line alone', 0, 779.73],
    ['its one-sided 95 % band', 0.9, 722.96],
    ['its two-sided 95 % band', 0.95, 708.32],
  ])('%s reaches 1 % on the stated day', (_, probability, day) => {
    const at = predictLine(fit, day, probability === 0 ? 0.5 : probability);
    const reach = Math.abs(at.value) + (probability === 0 ? 0 : at.predictionHalfWidth);
    // A hundredth of a day of drift is 1.3e-5 %.
    expect(Math.abs(reach - 1)).toBeLessThan(2e-5);
  });
});

describe('the same line with stated uncertainties', () => {
  const fit = fitLine({ x: days, y: errorsPercent, u: uPercent });

  test('weighted intercept, slope and chi-square', () => {
    expect(fit.intercept).toBeCloseTo(0.0152076, 7);
    expect(fit.slope).toBeCloseTo(-0.00129021, 8);
    expect(fit.chiSquare).toBeCloseTo(1.0149, 4);
  });

  test('agreement better than stated (chi-square a fifth of its freedom) does not shrink the band from 0.2007 to 0.0904', () => {
    expect(predictLine(fit, 730, 0.95, 0.05).predictionHalfWidth).toBeCloseTo(0.2007, 4);
    const shrunk = predictLine(fit, 730, 0.95, 0.05).predictionHalfWidth * Math.sqrt(fit.chiSquare / 5);
    expect(shrunk).toBeCloseTo(0.0904, 4);
  });

  test('the one-sided 95 % band reaches 1 % after 673 days; shrunk it would have allowed 58 more', () => {
    // One-sided 95 % is two-sided 90 %.
    const at = predictLine(fit, 673.33, 0.9, 0.05);
    expect(Math.abs(at.value) + at.predictionHalfWidth).toBeCloseTo(1, 4);
    const later = predictLine(fit, 731.81, 0.9, 0.05);
    const shrunk = later.predictionHalfWidth * Math.sqrt(fit.chiSquare / 5);
    expect(Math.abs(later.value) + shrunk).toBeCloseTo(1, 4);
  });

  test('scatter larger than stated enlarges the errors', () => {
    const honest = fitLine({ x: days, y: errorsPercent, u: uPercent.map(() => 0.0258365) });
    const boastful = fitLine({ x: days, y: errorsPercent, u: uPercent.map(() => 0.001) });
    expect(boastful.slopeStandardError).toBeCloseTo(honest.slopeStandardError, 8);
  });
});

describe('properties', () => {
  const points = fc
    .array(fc.tuple(fc.integer({ min: -500, max: 500 }), fc.integer({ min: -1000, max: 1000 })), {
      minLength: 4,
      maxLength: 20,
    })
    .filter((list) => new Set(list.map(([x]) => x)).size > 1);

  test('points on a line give that line', () => {
    fc.assert(
      fc.property(
        points,
        fc.integer({ min: -50, max: 50 }),
        fc.integer({ min: -9, max: 9 }),
        (list, a, b) => {
          const x = list.map(([value]) => value);
          const fit = fitLine({ x, y: x.map((value) => a + b * value) });
          expect(fit.slope).toBeCloseTo(b, 9);
          expect(fit.intercept).toBeCloseTo(a, 7);
        },
      ),
    );
  });

  test('units of x and y scale the line and nothing else', () => {
    fc.assert(
      fc.property(
        points,
        fc.constantFrom(1e-4, 24, 86_400_000),
        fc.constantFrom(1e-3, 10),
        (list, sx, sy) => {
          const here = fitLine({ x: list.map(([x]) => x), y: list.map(([, y]) => y) });
          const there = fitLine({ x: list.map(([x]) => x * sx), y: list.map(([, y]) => y * sy) });
          expect((there.slope * sx) / sy).toBeCloseTo(here.slope, 6);
          expect(there.slopeStandardError * sx).toBeCloseTo(here.slopeStandardError * sy, 6);
          expect(there.correlation).toBeCloseTo(here.correlation, 9);
        },
      ),
    );
  });

  test('a prediction is never narrower than the band of the line, and narrowest in the middle of the points', () => {
    fc.assert(
      fc.property(points, fc.double({ min: -1000, max: 1000, noNaN: true }), (list, x0) => {
        const fit = fitLine({ x: list.map(([x]) => x), y: list.map(([, y]) => y) });
        const at = predictLine(fit, x0, 0.95);
        expect(at.predictionHalfWidth).toBeGreaterThanOrEqual(at.confidenceHalfWidth);
        expect(predict(fit, fit.centreX, 0.95)).toBeLessThanOrEqual(at.predictionHalfWidth + 1e-12);
      }),
    );
  });

  test('every point seen twice, with the same u: the slope is known better by the root of 2', () => {
    const once = fitLine({ x: days, y: errorsPercent, u: uPercent });
    const both = <T>(list: T[]) => [...list, ...list];
    const twice = fitLine({ x: both(days), y: both(errorsPercent), u: both(uPercent) });
    expect(once.slopeStandardError / twice.slopeStandardError).toBeCloseTo(Math.SQRT2, 12);
  });
});

test('a line in epoch milliseconds predicts as well as one in days', () => {
  const start = Date.UTC(2026, 0, 1);
  const inDays = fitLine({ x: days, y: errorsPercent });
  const inMs = fitLine({ x: days.map((day) => start + day * 86_400_000), y: errorsPercent });
  const [day, ms] = [predictLine(inDays, 730, 0.95), predictLine(inMs, start + 730 * 86_400_000, 0.95)];
  expect(ms.value).toBeCloseTo(day.value, 10);
  expect(ms.predictionHalfWidth).toBeCloseTo(day.predictionHalfWidth, 10);
});

test('two points with stated uncertainties give a line, but no band: there is no scatter to judge', () => {
  const fit = fitLine({ x: [0, 100], y: [0, 1], u: [0.1, 0.1] });
  expect(fit.slope).toBeCloseTo(0.01, 12);
  expect(() => predict(fit, 50, 0.95)).toThrow(OutOfDomainError);
});

test.each([
  ['two points without u', { x: [1, 2], y: [1, 2] }],
  ['lists of different length', { x: [1, 2, 3], y: [1, 2] }],
  ['a u too few', { x: [1, 2, 3], y: [1, 2, 3], u: [1, 1] }],
  ['points all at one x', { x: [5, 5, 5], y: [1, 2, 3] }],
])('%s: refused', (_, input) => {
  expect(() => fitLine(input)).toThrow(InconsistentInputError);
});

test.each([
  ['an x that is not a number', { x: [1, NaN, 3], y: [1, 2, 3] }],
  ['an infinite y', { x: [1, 2, 3], y: [1, Infinity, 3] }],
  ['a u of 0', { x: [1, 2, 3], y: [1, 2, 3], u: [1, 0, 1] }],
])('%s: refused', (_, input) => {
  expect(() => fitLine(input)).toThrow(OutOfDomainError);
});

test.each([
  ['at an x that is not a number', NaN, 0.95],
  ['with a probability of 1', 5, 1],
])('a prediction %s: refused', (_, x0, probability) => {
  const fit = fitLine({ x: days, y: errorsPercent });
  expect(() => predict(fit, x0, probability)).toThrow(OutOfDomainError);
});
