import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { cellConstant } from '../../shared/science/cell-constant.ts';
import { InvalidInputError, OutOfDomainError } from '../../shared/science/errors.ts';
import {
  absoluteFromInternationalOhm,
  carbonDioxideWaterConductivity,
  jonesBradshawConductivity,
  kclStandardConductivity,
  kclStandardLabel,
} from '../../shared/science/kcl-standards.ts';
import type { KclBasis, KclNominal } from '../../shared/science/kcl-standards.ts';

const bases = ['molal', 'demal', 'molar'] as const;
const nominals = [0.01, 0.1, 1] as const;
const kappa = (basis: KclBasis, nominal: KclNominal, temperatureC = 25) =>
  kclStandardConductivity({ basis, nominal, temperatureC }).conductivityUsCm;

describe('the three bases', () => {
  it('demal is not molal is not molar', () => {
    expect(kappa('molal', 1)).toBe(108620);
    expect(kappa('demal', 1)).toBeCloseTo(111310, 6);
    expect(kappa('molar', 1)).toBeGreaterThanOrEqual(111799.9);
    expect(kappa('molar', 1)).toBeLessThanOrEqual(111900);
    expect(kappa('molar', 0.01) / kappa('molal', 0.01) - 1).toBeGreaterThan(0.003);
  });

  it('taking 1413 for a 0.01 mol/kg bottle makes a good cell 0.34 % wrong', () => {
    const right = cellConstant({ referenceUsCm: kappa('molal', 0.01), conductanceUs: 1392.0 });
    expect(right).toBeCloseTo(1.01166, 5);
    expect(cellConstant({ referenceUsCm: 1413, conductanceUs: 1392.0 }) / right - 1).toBeCloseTo(0.0034, 4);
  });

  it('labels carry basis and value, and no two are alike', () => {
    const labels = bases.flatMap((basis) => nominals.map((nominal) => kclStandardLabel({ basis, nominal })));
    expect(new Set(labels).size).toBe(9);
    labels.forEach((label) =>
      expect(label).toMatch(/(mol\/kg|D|mol\/L at 25 °C) \((molal|demal|molar)\), [\d.]+ µS\/cm at 25 °C$/),
    );
    expect(labels.join()).not.toMatch(/0\.01 M\b/);
  });
});

describe('temperature', () => {
  it('the value on the label is 4 % wrong two kelvin away from 25 degC', () => {
    const at23 = kappa('molal', 0.01, 23);
    expect(at23).toBeCloseTo(1353.75, 2);
    expect(1408.23 / at23 - 1).toBeCloseTo(0.04, 3);
  });

  it.each(bases.flatMap((basis) => nominals.map((nominal) => [basis, nominal] as const)))(
    '%s %d rises with temperature, continuously, with the slope it states',
    (basis, nominal) => {
      fc.assert(
        fc.property(fc.double({ min: 0, max: 49.99, noNaN: true }), (t) => {
          const here = kclStandardConductivity({ basis, nominal, temperatureC: t });
          const next = kclStandardConductivity({ basis, nominal, temperatureC: t + 0.01 });
          expect(next.conductivityUsCm).toBeGreaterThan(here.conductivityUsCm);
          const mean = (here.slopeUsCmPerK + next.slopeUsCmPerK) / 2;
          const chord = (next.conductivityUsCm - here.conductivityUsCm) / 0.01;
          // 1 %: at 18 and 25 degC the demal ratio's straight lines meet at an angle.
          expect(Math.abs(chord / mean - 1)).toBeLessThan(0.01);
          expect(here.relativeStandardUncertainty).toBeGreaterThan(0);
        }),
      );
    },
  );

  it('never extrapolates', () => {
    for (const basis of bases) {
      for (const t of [-0.001, 50.001, NaN, Infinity])
        expect(() => kappa(basis, 0.01, t)).toThrow(OutOfDomainError);
      expect(kappa(basis, 0.01, 0)).toBeGreaterThan(770);
      expect(kappa(basis, 0.01, 50)).toBeLessThan(2135);
    }
  });

  it('two temperature scales differ by 6.2 mK, 0.012 %: less than the stated uncertainty, so tables are not rescaled', () => {
    const { slopeUsCmPerK, conductivityUsCm, relativeStandardUncertainty } = kclStandardConductivity({
      basis: 'molal',
      nominal: 0.01,
      temperatureC: 25,
    });
    const shift = (0.0062 * slopeUsCmPerK) / conductivityUsCm;
    expect(shift).toBeCloseTo(1.2e-4, 5);
    expect(shift).toBeLessThan(relativeStandardUncertainty);
  });
});

describe('what the value leaves out', () => {
  it('adds the water that the table subtracted only when told how much', () => {
    const options = { basis: 'molal', nominal: 0.01, temperatureC: 25 } as const;
    const co2 = carbonDioxideWaterConductivity(25);
    expect(kclStandardConductivity(options).solventUsCm).toBe(0);
    expect(kclStandardConductivity({ ...options, solventUsCm: co2 }).conductivityUsCm).toBeCloseTo(
      1409.33,
      6,
    );
  });

  it('carbon dioxide is 0.08 % of 1408 but 1.3 % of 84 uS/cm', () => {
    expect(carbonDioxideWaterConductivity(25) / 1408.23).toBeLessThan(8e-4);
    expect(carbonDioxideWaterConductivity(25) / 84).toBeGreaterThan(0.012);
  });
});

describe('the international ohm', () => {
  it('12 856 is 12 849.6 today; the inverse factor would double the error', () => {
    expect(absoluteFromInternationalOhm(12856)).toBeCloseTo(12849.6, 1);
    expect(absoluteFromInternationalOhm(12856)).toBeLessThan(12856);
  });

  it('old values exist at three temperatures only', () => {
    expect(() => jonesBradshawConductivity({ nominal: 0.01, temperatureC: 20 as 18 })).toThrow(
      InvalidInputError,
    );
  });
});

it('refuses a basis or a nominal value that has no table', () => {
  expect(() => kappa('normal' as KclBasis, 0.01)).toThrow(InvalidInputError);
  expect(() => kappa('molal', 0.02 as KclNominal)).toThrow(InvalidInputError);
});
