/**
 * ASTM D1125 reference solutions: preparation by weight in air, made up to a litre at 20 degC.
 * Provenance: from memory; high for the numbers, medium for the edition.
 */
import { describe, expect, it } from 'vitest';
import { convertConcentration } from '../../shared/science/concentration.ts';
import { massFromReading } from '../../shared/science/kcl-preparation.ts';
import { relativeError } from './relative-error.ts';

describe('ASTM D1125 solutions by mass', () => {
  // 0.02 %: the accuracy of the density equation. Without buoyancy A would be 0.045 % lower and fail.
  it.each([
    ['A', 1, 74.246],
    ['B', 0.1, 7.4365],
    ['C', 0.01, 0.744],
  ] as const)('solution %s holds %d D', (_, demal, gramsInAir) => {
    const perLitreAt20 =
      convertConcentration({ value: demal, from: 'demal', to: 'molar', temperatureC: 20 }) * 74.5513;
    const mass = massFromReading({ readingG: gramsInAir, airDensityKgM3: 1.2, bodyDensityKgM3: 1984 });
    expect(relativeError(perLitreAt20, mass)).toBeLessThan(2.5e-4);
  });
});
