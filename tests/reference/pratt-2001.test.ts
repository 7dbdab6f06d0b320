/**
 * Pratt, Koch, Wu, Berezansky, Pure Appl. Chem. 73 (2001) 1783, as reprinted in the CRC Handbook of Chemistry and Physics, p. 5-73.
 * Provenance: published (table read in the reprint; five entries confirmed by a second, independent copy).
 * ITS-90, absolute ohm, conductivity of the water subtracted.
 */
import { describe, expect, it } from 'vitest';
import { cubicSpline, evaluateSpline } from '../../shared/science/cubic-spline.ts';
import {
  carbonDioxideWaterConductivity,
  kclStandardConductivity,
} from '../../shared/science/kcl-standards.ts';
import type { KclNominal } from '../../shared/science/kcl-standards.ts';
import { MOLAL_TABLE } from '../../shared/science/kcl-tables.ts';
import { relativeError } from './relative-error.ts';

const printed: [number, number, number, number | null, number][] = [
  [0, 772.92, 7116.85, 63488, 0.58],
  [5, 890.96, 8183.7, 72030, 0.68],
  [10, 1013.95, 9291.72, 80844, 0.79],
  [15, 1141.45, 10437.1, 89900, 0.89],
  [18, 1219.93, 11140.6, null, 0.95],
  [20, 1273.03, 11615.9, 99170, 0.99],
  [25, 1408.23, 12824.6, 108620, 1.1],
  [30, 1546.63, 14059.2, 118240, 1.2],
  [35, 1687.79, 15316.0, 127970, 1.3],
  [40, 1831.27, 16591.0, 137810, 1.4],
  [45, 1976.62, 17880.6, 147720, 1.51],
  [50, 2123.43, 19180.9, 157670, 1.61],
];
const molal = (nominal: KclNominal, temperatureC: number) =>
  kclStandardConductivity({ basis: 'molal', nominal, temperatureC }).conductivityUsCm;

describe('molal KCl standards', () => {
  it.each(printed)('returns the printed row at %d degC exactly', (t, weak, middle, strong, water) => {
    expect(molal(0.01, t)).toBe(weak);
    expect(molal(0.1, t)).toBe(middle);
    if (strong !== null) expect(molal(1, t)).toBe(strong);
    expect(carbonDioxideWaterConductivity(t)).toBe(water);
  });

  // Independent second copy, in S/m or mS/cm: to its own last digit.
  it.each([
    [0.1, 25, 12824, 1],
    [0.1, 5, 8183.7, 0.05],
    [0.1, 50, 19180.9, 0.05],
    [1, 25, 108620, 5],
  ] as const)('%d mol/kg at %d degC agrees with the second copy', (nominal, t, value, lastDigit) => {
    expect(Math.abs(molal(nominal, t) - value)).toBeLessThan(lastDigit);
  });

  // Cubics fitted to all rows elsewhere; 5 ppm (48 ppm for 1 mol/kg) is how well a single cubic fits the rows, 7 ppm between them, so a wrong digit shows.
  it.each([
    [0.01, 1.943954e-2, 4.538298e-5, -4.149152e-7, 7e-6],
    [0.1, 1.906119e-2, 4.045596e-5, -3.956564e-7, 7e-6],
    [1, 1.756088e-2, 2.880211e-5, -3.508307e-7, 8e-5],
  ] as const)('%d mol/kg keeps to one cubic from 0 to 50 degC', (nominal, a, b, c, tolerance) => {
    for (let t = 0; t <= 50; t += 0.5) {
      const d = t - 25;
      const cubic = molal(nominal, 25) * (1 + a * d + b * d ** 2 + c * d ** 3);
      expect(relativeError(molal(nominal, t), cubic)).toBeLessThan(tolerance);
    }
  });

  // Computed with an independent not-a-knot spline: to the digits shown.
  it.each([
    [0.01, 23.0, 1353.745, 1e-3],
    [0.1, 23.7, 12507.68, 1e-2],
    [1, 21.3, 101609.9, 1e-1],
  ] as const)('%d mol/kg at %d degC interpolates to %d', (nominal, t, value, lastDigit) => {
    expect(Math.abs(molal(nominal, t) - value)).toBeLessThan(lastDigit);
  });

  it.each([0.01, 0.1] as const)(
    '%d mol/kg: a spline without one row finds it again within the stated 9 ppm',
    (nominal) => {
      const rows = MOLAL_TABLE[nominal];
      for (let left = 1; left + 1 < rows.length; left += 1) {
        const others = rows.filter((_, index) => index !== left);
        const spline = cubicSpline(
          others.map(([t]) => t),
          others.map(([, value]) => value),
        );
        const [t, value] = rows[left] as readonly [number, number];
        const { interpolationRelativeHalfWidth } = kclStandardConductivity({
          basis: 'molal',
          nominal,
          temperatureC: t,
        });
        // Leaving a row out doubles the step, so this is harder than any interpolation the function is asked for.
        expect(relativeError(evaluateSpline(spline, t).value, value)).toBeLessThan(
          interpolationRelativeHalfWidth,
        );
      }
    },
  );

  // Local coefficients at 25 degC and chords from 20 degC, computed from the table to four digits.
  it.each([
    [0.01, 1.944, 1.92, 2.124],
    [0.1, 1.906, 1.885, 2.081],
    [1, 1.757, 1.74, 1.906],
  ] as const)(
    '%d mol/kg: coefficient at 25 degC %d, chord %d, chord referred to 20 degC %d',
    (nominal, local, chord, to20) => {
      const at = kclStandardConductivity({ basis: 'molal', nominal, temperatureC: 25 });
      expect((100 * at.slopeUsCmPerK) / at.conductivityUsCm).toBeCloseTo(local, 2);
      expect((100 * (molal(nominal, 25) - molal(nominal, 20))) / 5 / molal(nominal, 25)).toBeCloseTo(
        chord,
        2,
      );
      expect((100 * (molal(nominal, 25) - molal(nominal, 20))) / 5 / molal(nominal, 20)).toBeCloseTo(to20, 2);
    },
  );
});
