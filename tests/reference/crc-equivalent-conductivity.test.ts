/**
 * CRC Handbook, Equivalent conductivity of electrolytes in aqueous solution at 25 degC (absolute ohm; EQUIVALENTS per litre),
 * after Shedlovsky, MacInnes, Harned and Owen. Provenance: from memory, confidence high.
 * The distances of the limiting law to this table were computed with the table's own limiting values.
 */
import { describe, expect, it } from 'vitest';
import { limitingMolarConductivity, saltComposition } from '../../shared/science/electrolytes.ts';
import type { Salt } from '../../shared/science/electrolytes.ts';
import { kclMolarConductivity } from '../../shared/science/kcl-solutions.ts';
import { onsagerEquivalentSlopes } from '../../shared/science/onsager.ts';
import { limitingEquivalents } from '../../shared/science/electrolytes.ts';
import { onsagerValidity } from '../../shared/science/onsager-validity.ts';
import { relativeError } from './relative-error.ts';

const concentrations = [0.0005, 0.001, 0.005, 0.01] as const;
/** Lambda0, then Lambda at the four concentrations above. */
const table = {
  KCl: [149.79, 147.74, 146.88, 143.48, 141.2],
  NaCl: [126.39, 124.44, 123.68, 120.59, 118.45],
  HCl: [425.95, 422.53, 421.15, 415.59, 411.8],
  LiCl: [114.97, 113.09, 112.34, 109.35, 107.27],
  CaCl2: [135.77, 131.86, 130.3, 124.19, 120.3],
  MgCl2: [129.34, 125.55, 124.15, 118.25, 114.49],
  Na2SO4: [129.8, 125.68, 124.09, 117.09, 112.38],
  CuSO4: [133.6, 121.6, 115.2, 94.02, 83.08],
} as const satisfies Partial<Record<Salt, readonly number[]>>;

function lawFromTableLimit(salt: keyof typeof table, equivalents: number): number {
  const composition = saltComposition(salt);
  const ions = limitingEquivalents({ salt, temperatureC: 25 });
  const { a, b } = onsagerEquivalentSlopes({ composition, ...ions, temperatureC: 25 });
  const limit = table[salt][0];
  return limit - (a + b * limit) * Math.sqrt(equivalents);
}

describe('the limiting law against measured equivalent conductivities', () => {
  // The distances in per cent, computed independently: to the digit shown (0.05 where one decimal was kept).
  it.each([
    ['KCl', [-0.05, -0.07, -0.29, -0.65], 0.006],
    ['NaCl', [-0.04, -0.1, -0.45, -0.87], 0.006],
    ['HCl', [-0.03, -0.05, -0.2, -0.41], 0.006],
    ['LiCl', [-0.06, -0.11, -0.49, -0.94], 0.006],
    ['CaCl2', [-0.07, -0.14, -0.85, -2.0], 0.05],
    ['MgCl2', [-0.09, -0.27, -1.06, -2.3], 0.05],
    ['Na2SO4', [0.04, -0.04, -0.15, -0.7], 0.05],
    ['CuSO4', [3.5, 6.5, 16, 19], 0.5],
  ] as const)('%s is off by %s %% at 0.0005, 0.001, 0.005, 0.01 equivalents/L', (salt, percents, digit) => {
    concentrations.forEach((c, index) => {
      const printed = table[salt][index + 1] as number;
      const percent = 100 * (lawFromTableLimit(salt, c) / printed - 1);
      expect(Math.abs(percent - (percents[index] as number))).toBeLessThan(digit);
    });
  });

  it.each(['KCl', 'NaCl', 'HCl', 'LiCl', 'CaCl2', 'MgCl2', 'Na2SO4'] as const)(
    '%s stays inside the stated model uncertainty',
    (salt) => {
      concentrations.forEach((c, index) => {
        const printed = table[salt][index + 1] as number;
        const concentrationMolL = c / saltComposition(salt).equivalentsPerMole;
        const halfWidth =
          onsagerValidity({ salt, concentrationMolL }).relativeStandardUncertainty * Math.sqrt(3);
        expect(relativeError(lawFromTableLimit(salt, c), printed)).toBeLessThanOrEqual(halfWidth);
      });
    },
  );

  // Ionic values come from two lists (cubics and 25 degC): 0.07 % is their largest distance to this table's limits.
  it.each(['KCl', 'NaCl', 'HCl', 'LiCl', 'CaCl2', 'MgCl2'] as const)(
    'the limit of %s is the table value within 0.2 %%',
    (salt) => {
      const perEquivalent =
        limitingMolarConductivity({ salt, temperatureC: 25 }) / saltComposition(salt).equivalentsPerMole;
      expect(relativeError(perEquivalent, table[salt][0])).toBeLessThan(salt === 'KCl' ? 5e-4 : 2e-3);
    },
  );
});

describe('the extended KCl equation against the absolute table', () => {
  // It is higher by these fractions of a per cent, computed independently.
  it.each([
    [0.0005, 147.74, 0.023],
    [0.001, 146.88, 0.034],
    [0.005, 143.48, 0.059],
    [0.01, 141.2, 0.04],
  ])('at %d mol/L it exceeds %d by %d %%', (concentrationMolL, printed, percent) => {
    expect(100 * (kclMolarConductivity({ concentrationMolL }) / printed - 1)).toBeCloseTo(percent, 2);
  });

  it('reaches 0.02 mol/L within 0.05 % of 138.27', () => {
    expect(relativeError(kclMolarConductivity({ concentrationMolL: 0.02 }), 138.27)).toBeLessThan(5e-4);
  });
});
