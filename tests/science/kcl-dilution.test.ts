import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { OutOfDomainError } from '../../shared/science/errors.ts';
import { diluteLot, kclMolalityByConductivity } from '../../shared/science/kcl-dilution.ts';
import type { KclDilution } from '../../shared/science/kcl-dilution.ts';
import { kclConductivityByMolality } from '../../shared/science/kcl-preparation.ts';

/** Ten times less of 0.01 mol/kg in water that reads 0.9 µS/cm. */
const dilute = (facts: Partial<KclDilution> = {}) =>
  diluteLot({
    stockConductivityUsCm: 1408.23,
    stockStandardUncertaintyUsCm: 1.4,
    stockReadingG: 100,
    waterReadingG: 900,
    airDensityKgM3: 1.2,
    waterBlankUsCm: 0.9,
    isBlankInSameState: true,
    ...facts,
  });

describe('a lot diluted by weighing', () => {
  it('finds the molality of a solution from its conductivity', () => {
    fc.assert(
      fc.property(fc.double({ min: 1.01e-4, max: 1.03, noNaN: true }), (molality) => {
        const { conductivityUsCm } = kclConductivityByMolality(molality);
        expect(kclMolalityByConductivity(conductivityUsCm) / molality).toBeCloseTo(1, 9);
      }),
      { numRuns: 40 },
    );
  });

  // CRC Handbook, equivalent conductivity of KCl at 25 °C: 146.88 S cm²/mol at 0.001 mol/L (0.1 % for density and model).
  it('meets the handbook at 0.001 mol/L, the water added', () => {
    const { molarityMolL, saltConductivityUsCm, conductivityUsCm } = dilute();
    expect(molarityMolL).toBeCloseTo(0.000996, 6);
    expect(Math.abs(saltConductivityUsCm / (1000 * molarityMolL) / 146.88 - 1)).toBeLessThan(1e-3);
    expect(conductivityUsCm - saltConductivityUsCm).toBeCloseTo(0.9, 12);
  });

  it('loses no salt: the molality falls as the water grows', () => {
    const { stockMolalityMolKg, molalityMolKg } = dilute({ airDensityKgM3: 0 });
    const stockWater = 100 / (1 + (stockMolalityMolKg * 74.5513) / 1000);
    expect(molalityMolKg / stockMolalityMolKg).toBeCloseTo(stockWater / (stockWater + 900), 9);
  });

  it('gives a table that holds the value at 25 °C and rises about 2 %/K', () => {
    const { temperatureTable, conductivityUsCm } = dilute();
    const at = (t: number) => temperatureTable.find((row) => row.temperatureC === t)!.conductivityUsCm;
    expect(at(25)).toBeCloseTo(conductivityUsCm, 12);
    expect(at(20) / at(25)).toBeGreaterThan(0.9);
    expect(at(20) / at(25)).toBeLessThan(0.905);
    expect(temperatureTable.map((row) => row.conductivityUsCm)).toEqual(
      [...temperatureTable.map((row) => row.conductivityUsCm)].sort((a, b) => a - b),
    );
  });

  it('has a budget that carries the lot’s U, grows when the blank is in doubt, and adds up', () => {
    const careful = dilute();
    expect(careful.budget.reduce((sum, row) => sum + row.share, 0)).toBeCloseTo(1, 12);
    expect(careful.expandedUncertainty).toBeCloseTo(
      careful.coverageFactor * careful.standardUncertaintyUsCm,
      12,
    );
    const doubtful = dilute({ isBlankInSameState: false });
    // 1.1 µS/cm of carbon dioxide as a half-width, against about 147.
    expect(doubtful.standardUncertaintyUsCm ** 2 - careful.standardUncertaintyUsCm ** 2).toBeCloseTo(
      1.1 ** 2 / 3,
      9,
    );
    expect(dilute({ stockStandardUncertaintyUsCm: 7 }).expandedUncertainty).toBeGreaterThan(
      2 * careful.expandedUncertainty,
    );
  });

  it('refuses what the equations do not hold for', () => {
    expect(() => dilute({ waterReadingG: 100_000 })).toThrow(OutOfDomainError);
    expect(() => dilute({ stockConductivityUsCm: 12_824.6, stockReadingG: 500, waterReadingG: 500 })).toThrow(
      /Take more water/,
    );
    expect(() => dilute({ waterBlankUsCm: 20 })).toThrow(OutOfDomainError);
    expect(() => dilute({ stockReadingG: 0 })).toThrow(OutOfDomainError);
  });
});
