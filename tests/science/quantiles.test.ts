import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { OutOfDomainError } from '../../shared/science/errors.ts';
import {
  chiSquareProbabilityAbove,
  coverageFactorFor,
  normalProbabilityBelow,
  normalQuantile,
  tProbabilityBelow,
  tQuantile,
} from '../../shared/science/quantiles.ts';

const probabilities = fc.double({ min: 1e-6, max: 1 - 1e-6, noNaN: true });
const freedoms = fc.double({ min: 1, max: 1e6, noNaN: true });

describe('round trips', () => {
  test('the probability below a normal quantile is the one asked for', () => {
    fc.assert(
      fc.property(probabilities, (p) => {
        expect(Math.abs(normalProbabilityBelow(normalQuantile(p)) - p)).toBeLessThan(1e-14);
      }),
    );
  });

  test('the probability below a t quantile is the one asked for', () => {
    fc.assert(
      fc.property(probabilities, freedoms, (p, nu) => {
        // The library's t probability carries about 11 digits for large, fractional degrees of freedom.
        expect(Math.abs(tProbabilityBelow(tQuantile(p, nu), nu) - p)).toBeLessThan(1e-10);
      }),
    );
  });
});

describe('shape', () => {
  test('k falls as degrees of freedom rise, and never below the normal k', () => {
    fc.assert(
      fc.property(freedoms, fc.double({ min: 0.5, max: 0.999, noNaN: true }), (nu, p) => {
        expect(coverageFactorFor(p, nu)).toBeGreaterThanOrEqual(coverageFactorFor(p, nu + 1) * (1 - 1e-12));
        expect(coverageFactorFor(p, nu)).toBeGreaterThanOrEqual(coverageFactorFor(p, Infinity) * (1 - 1e-12));
      }),
    );
  });

  test('quantiles are odd about one half', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.5, max: 0.9999, noNaN: true }), freedoms, (p, nu) => {
        expect(tQuantile(p, nu) + tQuantile(1 - p, nu)).toBeCloseTo(0, 7);
      }),
    );
  });

  test('a larger chi-square is never less surprising', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 1e4, noNaN: true }), fc.integer({ min: 1, max: 400 }), (x, nu) => {
        const here = chiSquareProbabilityAbove(x, nu);
        expect(here).toBeGreaterThanOrEqual(chiSquareProbabilityAbove(x + 0.5, nu) - 1e-14);
        expect(here >= 0 && here <= 1).toBe(true);
      }),
    );
  });
});

describe('limits', () => {
  test('infinitely many degrees of freedom give the normal k; the library alone answers NaN', () => {
    expect(tQuantile(0.975, Infinity)).toBe(normalQuantile(0.975));
    expect(tProbabilityBelow(1.96, Infinity)).toBe(normalProbabilityBelow(1.96));
  });

  test('1e20 degrees of freedom give the normal k; the library alone answers 0', () => {
    expect(tQuantile(0.975, 1e20)).toBeCloseTo(1.959964, 6);
  });

  test('infinite deviates are certain', () => {
    expect([normalProbabilityBelow(-Infinity), normalProbabilityBelow(Infinity)]).toEqual([0, 1]);
  });
});

test.each([
  ['a probability of 0', () => normalQuantile(0)],
  ['a probability of 1', () => tQuantile(1, 5)],
  ['95 for 95 %', () => coverageFactorFor(95, 5)],
  ['a probability that is not a number', () => normalQuantile(NaN)],
  ['half a degree of freedom', () => tQuantile(0.975, 0.5)],
  ['degrees of freedom that are not a number', () => tQuantile(0.975, NaN)],
  ['a deviate that is not a number', () => normalProbabilityBelow(NaN)],
  ['an infinite t', () => tProbabilityBelow(Infinity, 5)],
  ['a negative chi-square', () => chiSquareProbabilityAbove(-1, 3)],
  ['fractional degrees of freedom of chi-square', () => chiSquareProbabilityAbove(1, 2.5)],
  [
    'more degrees of freedom of chi-square than the sum is good for',
    () => chiSquareProbabilityAbove(1, 10_001),
  ],
])('%s is refused', (_, call) => {
  expect(call).toThrow(OutOfDomainError);
});
