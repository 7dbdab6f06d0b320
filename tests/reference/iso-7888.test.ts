/**
 * ISO 7888:1985 / EN 27888:1993, factor for natural waters. Provenance: published (equation read);
 * the printed table's 1.918 at 0 degC and 1.116 at 20 degC from memory, confidence high.
 * A viscosity-ratio approximation also published is the inverse ratio: it must divide.
 */
import { describe, expect, it } from 'vitest';
import { naturalWaterFactor } from '../../shared/science/temperature-compensation.ts';
import { relativeError } from './relative-error.ts';

/** Independent evaluation of the standard's equation, whole degrees from 0 to 35. */
const factors = [
  1.9187, 1.858, 1.8003, 1.7456, 1.6935, 1.6439, 1.5967, 1.5516, 1.5087, 1.4676, 1.4284, 1.3909, 1.355,
  1.3206, 1.2877, 1.2561, 1.2258, 1.1967, 1.1687, 1.1419, 1.116, 1.0911, 1.0672, 1.0441, 1.0218, 1.0004,
  0.9797, 0.9597, 0.9404, 0.9218, 0.9038, 0.8863, 0.8695, 0.8532, 0.8374, 0.8221,
];

describe('natural-water factor', () => {
  it('is the standard equation at every whole degree, to four decimals', () => {
    factors.forEach((printed, t) => expect(Math.abs(naturalWaterFactor(t) - printed)).toBeLessThan(0.6e-4));
  });

  it('starts at the printed 1.918 and passes the printed 1.116 at 20 degC', () => {
    expect(Math.abs(naturalWaterFactor(0) - 1.918)).toBeLessThan(1e-3);
    expect(Math.abs(naturalWaterFactor(20) - 1.116)).toBeLessThan(5e-4);
  });

  // 0.6 %: two fits to the viscosity of water. Multiplied instead of divided, it would be 0.5 where the factor is 1.9.
  it.each([5, 10, 15, 20, 25, 30])('is one over the viscosity ratio at %d degC', (t) => {
    const exponent = (1.37023 * (t - 20) + 8.36e-4 * (t - 20) ** 2) / (109 + t);
    const ratio = 0.889 * 10 ** exponent;
    expect(relativeError(naturalWaterFactor(t), 1 / ratio)).toBeLessThan(0.035);
    if (t < 25) expect(ratio).toBeLessThan(1);
  });
});
