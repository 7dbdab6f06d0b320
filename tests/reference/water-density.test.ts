/**
 * M. Tanaka et al., Metrologia 38 (2001) 301, and G. S. Kell, J. Chem. Eng. Data 20 (1975) 97: density of water.
 * Provenance: published; both equations read. Kell's last coefficient circulates in variants that differ by 1 ppm.
 */
import { describe, expect, it } from 'vitest';
import { waterDensity } from '../../shared/science/water.ts';
import { relativeError } from './relative-error.ts';

const tanaka = (t: number) =>
  999.97495 * (1 - ((t - 3.983035) ** 2 * (t + 301.797)) / (522528.9 * (t + 69.34881)));
const kell = (t: number) =>
  (999.83952 +
    16.945176 * t -
    7.9870401e-3 * t ** 2 -
    46.170461e-6 * t ** 3 +
    105.56302e-9 * t ** 4 -
    280.54253e-12 * t ** 5) /
  (1 + 16.87985e-3 * t);

describe('density of water by three formulations', () => {
  // 1 ppm: what the authors of the metrological equation claim, and what they share with SR6-08 from 0 to 40 degC.
  it.each([0, 4, 10, 20, 25, 30, 40])('agrees with Tanaka at %d degC within 1 ppm', (t) => {
    expect(relativeError(waterDensity(t), tanaka(t))).toBeLessThan(1e-6);
  });

  // Kell is 2 ppm lower at 25 degC (997.0449 against 997.0470) and up to 5 ppm elsewhere: an older temperature scale.
  it.each([0, 10, 20, 25, 30, 40])('agrees with Kell at %d degC within 5 ppm', (t) => {
    expect(relativeError(waterDensity(t), kell(t))).toBeLessThan(5e-6);
  });
});
