import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { OutOfDomainError } from '../../shared/science/errors.ts';
import {
  kclConductivityByMolality,
  massFromReading,
  prepareKcl,
} from '../../shared/science/kcl-preparation.ts';
import type { KclWeighing } from '../../shared/science/kcl-preparation.ts';

const weigh = (facts: Partial<KclWeighing> = {}) =>
  prepareKcl({ kclReadingG: 0.745513, waterReadingG: 1000, airDensityKgM3: 1.2, ...facts });

describe('KCl prepared by weighing', () => {
  it('ignoring the air makes the molality 0.06 % wrong, twice the uncertainty of the standard', () => {
    const inAir = weigh().molalityMolKg;
    const naive = weigh({ airDensityKgM3: 0 }).molalityMolKg;
    expect(naive).toBeCloseTo(0.01, 9);
    expect(100 * (inAir / naive - 1)).toBeCloseTo(-0.06, 2);
  });

  it('reaches the primary values at 0.01, 0.1 and 1 mol/kg', () => {
    expect(kclConductivityByMolality(0.01).conductivityUsCm).toBeCloseTo(1408.23, 9);
    expect(kclConductivityByMolality(0.1).conductivityUsCm).toBeCloseTo(12824.6, 8);
    expect(kclConductivityByMolality(1).conductivityUsCm).toBeCloseTo(108620, 7);
  });

  // 0.05 %: what the demal table itself is good for (1408.3 printed for 0.01 D; its mass by the molal table is 1408.8).
  it.each([
    [0.745263, 1408.3],
    [7.41913, 12852],
    [71.1352, 111310],
  ])('%d g per 1000 g of solution meets the demal value %d', (grams, printed) => {
    const { conductivityUsCm } = weigh({
      kclReadingG: grams,
      waterReadingG: 1000 - grams,
      airDensityKgM3: 0,
    });
    expect(Math.abs(conductivityUsCm / printed - 1)).toBeLessThan(5e-4);
  });

  it('adds the water blank to the solution and not to the salt', () => {
    const blank = weigh({ waterBlankUsCm: 0.9 });
    expect(blank.conductivityUsCm - blank.saltConductivityUsCm).toBeCloseTo(0.9, 9);
    expect(blank.expandedUncertainty).toBeGreaterThan(weigh().expandedUncertainty);
  });

  it('counts moisture as water and impurity as nothing', () => {
    expect(weigh({ purity: 0.999 }).molalityMolKg / weigh().molalityMolKg).toBeCloseTo(0.999, 9);
    const wet = weigh({ dryingLossFraction: 0.01 });
    expect(wet.kclMassG / weigh().kclMassG).toBeCloseTo(0.99, 12);
    expect(wet.waterMassG).toBeGreaterThan(weigh().waterMassG);
  });

  it('lists a budget whose shares make one, and U that follows from it', () => {
    const { budget, standardUncertaintyUsCm, coverageFactor, expandedUncertainty, conductivityUsCm } =
      weigh();
    expect(budget.reduce((sum, line) => sum + line.share, 0)).toBeCloseTo(1, 12);
    expect(expandedUncertainty).toBeCloseTo(standardUncertaintyUsCm * coverageFactor, 12);
    // Careful bench work: about 0.1 %, no better than the table and no worse than a bought bottle.
    expect(expandedUncertainty / conductivityUsCm).toBeGreaterThan(6e-4);
    expect(expandedUncertainty / conductivityUsCm).toBeLessThan(1.5e-3);
  });

  it('a coarser balance makes a less certain solution', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-4, max: 0.05, noNaN: true }), (u) => {
        const fine = weigh({ kclReadingStandardUncertaintyG: u });
        const coarse = weigh({ kclReadingStandardUncertaintyG: u * 1.1 });
        expect(coarse.expandedUncertainty).toBeGreaterThan(fine.expandedUncertainty);
      }),
    );
  });

  it('conducts more the more salt there is, without steps', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-4, max: 1.03, noNaN: true }), (m) => {
        const here = kclConductivityByMolality(m).conductivityUsCm;
        const next = kclConductivityByMolality(m * 1.001).conductivityUsCm;
        expect(next).toBeGreaterThan(here);
        // Conductivity grows a little slower than molality; a step between equation and table would show.
        expect(next / here - 1).toBeLessThan(1.05e-3);
        expect(next / here - 1).toBeGreaterThan(0.85e-3);
      }),
    );
  });

  it('depends on the ratio of the weighings only', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.1, max: 10, noNaN: true }), (scale) => {
        const scaled = weigh({ kclReadingG: 0.745513 * scale, waterReadingG: 1000 * scale });
        expect(scaled.molalityMolKg).toBeCloseTo(weigh().molalityMolKg, 14);
      }),
    );
  });

  it('refuses weighings that make no reference solution', () => {
    for (const facts of [
      { kclReadingG: 0 },
      { kclReadingG: NaN },
      { kclReadingG: 100 },
      { waterReadingG: 0 },
      { airDensityKgM3: 2.1 },
      { airDensityKgM3: -0.1 },
      { purity: 1.01 },
      { purity: 0.89 },
      { dryingLossFraction: 0.11 },
      { waterBlankUsCm: -1 },
      { waterTemperatureC: 101 },
    ]) {
      expect(() => weigh(facts), JSON.stringify(facts)).toThrow(OutOfDomainError);
    }
    expect(() => massFromReading({ readingG: 1, airDensityKgM3: 1.2, bodyDensityKgM3: 499 })).toThrow(
      OutOfDomainError,
    );
  });
});
