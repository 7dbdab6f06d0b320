/**
 * KCl at 25 degC, mol/L: Standard Methods (APHA) 2510, from memory, confidence high; ISO 7888:1985 annex, from memory, confidence medium.
 */
import { describe, expect, it } from 'vitest';
import { kclMolarConductivity } from '../../shared/science/kcl-solutions.ts';
import { relativeError } from './relative-error.ts';

const conductivity = (c: number) => 1000 * c * kclMolarConductivity({ concentrationMolL: c });

describe('KCl at 25 degC in standard methods', () => {
  // 0.1 %, except the first, whose three digits allow 0.35 %.
  it.each([
    [1e-4, 14.9, 3.5e-3],
    [5e-4, 73.9, 1e-3],
    [1e-3, 146.9, 1e-3],
    [5e-3, 717.5, 1e-3],
    [0.01, 1412, 1e-3],
    [0.02, 2765, 1e-3],
  ])('APHA 2510: %d mol/L is %d uS/cm', (c, printed, tolerance) => {
    expect(relativeError(conductivity(c), printed)).toBeLessThan(tolerance);
  });

  // Printed in mS/m with two or three digits: half of the last digit.
  it.each([
    [0.0005, 7.4, 0.05],
    [0.001, 14.7, 0.05],
    [0.005, 72, 0.5],
    [0.01, 141, 0.5],
    [0.02, 277, 0.5],
  ])('ISO 7888: %d mol/L is %d mS/m', (c, printed, half) => {
    expect(Math.abs(conductivity(c) / 10 - printed)).toBeLessThanOrEqual(half);
  });
});
