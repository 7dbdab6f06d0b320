/**
 * Source: SciPy and NumPy, general-purpose numerical libraries, as a second opinion. Provenance: independent computation.
 * The numbers are stored beside the script that made them; where python3 with SciPy is on the machine the script runs again.
 */
import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { expect, test } from 'vitest';
import { groupReliability } from '../../shared/science/interval-review.ts';
import {
  chiSquareProbabilityAbove,
  normalProbabilityBelow,
  normalQuantile,
  tProbabilityBelow,
  tQuantile,
} from '../../shared/science/quantiles.ts';
import { fitLine } from '../../shared/science/regression.ts';
import { welchT } from '../../shared/science/robust-statistics.ts';
import stored from '../support/generators/scipy-statistics.json' with { type: 'json' };

const generator = fileURLToPath(new URL('../support/generators/scipy_statistics.py', import.meta.url));

/** Relative where the number is not small, absolute where it is. */
function expectClose(actual: number, expected: number, tolerance: number): void {
  expect(Math.abs(actual - expected)).toBeLessThanOrEqual(tolerance * Math.max(1, Math.abs(expected)));
}

function flatten(value: unknown): unknown[] {
  if (typeof value !== 'object' || value === null) return [value];
  return Object.entries(value).flatMap(([key, inner]) => [key, ...flatten(inner)]);
}

// Only where the library is present: on a bare machine the stored numbers stand alone.
if (spawnSync('python3', ['-c', 'import scipy']).status === 0) {
  test('the stored numbers are what the library on this machine answers', () => {
    const run = spawnSync('python3', [generator], { encoding: 'utf8' });
    expect(run.status, run.stderr).toBe(0);
    const fresh = flatten(JSON.parse(run.stdout) as unknown);
    flatten(stored).forEach((value, index) => {
      // Another release may differ in the last digits of an iterated quantile.
      if (typeof value === 'number') expectClose(fresh[index] as number, value, 1e-11);
      else if (!String(value).startsWith('scipy')) expect(fresh[index]).toBe(value);
    });
  });
}

test('t quantiles agree to 12 digits, from 1 degree of freedom to 100 million', () => {
  for (const { probability, degreesOfFreedom, t } of stored.tQuantiles) {
    expectClose(tQuantile(probability, degreesOfFreedom), t, 1e-12);
  }
});

test('t probabilities agree to 13 digits', () => {
  for (const { t, degreesOfFreedom, probability } of stored.tProbabilities) {
    expectClose(tProbabilityBelow(t, degreesOfFreedom), probability, 1e-13);
  }
});

test('normal quantiles and probabilities agree to 14 digits', () => {
  for (const { probability, z } of stored.normal.quantiles)
    expectClose(normalQuantile(probability), z, 1e-14);
  for (const { z, probability } of stored.normal.probabilities) {
    expectClose(normalProbabilityBelow(z), probability, 1e-15);
  }
});

test('a small normal tail keeps its relative accuracy', () => {
  const far = stored.normal.probabilities.find(({ z }) => z === -8);
  expect(far).toBeDefined();
  expect(normalProbabilityBelow(-8) / (far?.probability ?? NaN) - 1).toBeCloseTo(0, 11);
});

test('chi-square tails agree to 13 digits for odd and even degrees of freedom', () => {
  for (const { chiSquare, degreesOfFreedom, probability } of stored.chiSquare) {
    expectClose(chiSquareProbabilityAbove(chiSquare, degreesOfFreedom), probability, 1e-13);
  }
});

test('upper failure rates are the exact Poisson bounds', () => {
  for (const { failures, confidence, mean } of stored.poissonUpperMeans) {
    const { upperRatePerYear } = groupReliability({ failures, exposureYears: 1, target: 0.9, confidence });
    expectClose(upperRatePerYear, mean, 1e-12);
  }
});

test('an unweighted drift line agrees in every coefficient and error', () => {
  const { days, errors } = stored.driftLine;
  const fit = fitLine({ x: days, y: errors });
  for (const [name, expected] of Object.entries(stored.unweightedLine)) {
    expect(fit[name as keyof typeof stored.unweightedLine] / expected - 1).toBeCloseTo(0, 11);
  }
});

test('a weighted drift line agrees in every coefficient and error from the given u', () => {
  const { days, errors, u } = stored.driftLine;
  const fit = fitLine({ x: days, y: errors, u });
  for (const [name, expected] of Object.entries(stored.weightedLine)) {
    expect(fit[name as keyof typeof stored.weightedLine] / expected - 1).toBeCloseTo(0, 11);
  }
});

test("Welch's t agrees", () => {
  const { before, after, t } = stored.welch;
  expectClose(welchT(before, after).t, t, 1e-13);
});
