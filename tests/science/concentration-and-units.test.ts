import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { convertConcentration, kclSolutionDensity } from '../../shared/science/concentration.ts';
import type { ConcentrationBasis } from '../../shared/science/concentration.ts';
import { InvalidInputError, OutOfDomainError } from '../../shared/science/errors.ts';
import {
  cellConstantFromPerMetre,
  conductanceFromResistance,
  conductivityFromMolar,
  conductivityFromResistivity,
  conductivityUnits,
  convertConductance,
  convertConductivity,
  resistivityFromConductivity,
  resistivityUnits,
} from '../../shared/science/units.ts';
import type { ConductivityUnit } from '../../shared/science/units.ts';

describe('concentration', () => {
  const basis = fc.constantFrom<ConcentrationBasis>('molal', 'demal', 'molar');
  const value = fc.double({ min: 1e-4, max: 1.04, noNaN: true });
  const temperature = fc.double({ min: 0, max: 95, noNaN: true });

  it('survives a round trip over any two bases', () => {
    fc.assert(
      fc.property(basis, basis, value, temperature, (from, to, amount, temperatureC) => {
        const there = convertConcentration({ value: amount, from, to, temperatureC });
        fc.pre(there <= 1.1);
        const back = convertConcentration({ value: there, from: to, to: from, temperatureC });
        expect(Math.abs(back / amount - 1)).toBeLessThan(1e-9);
      }),
    );
  });

  it('rises with the amount on every basis', () => {
    fc.assert(
      fc.property(basis, basis, value, (from, to, amount) => {
        const at = (v: number) => convertConcentration({ value: v, from, to, temperatureC: 25 });
        expect(at(amount * 1.001)).toBeGreaterThan(at(amount));
      }),
    );
  });

  it('a litre holds less when it is warm, a kilogram does not', () => {
    const molar = (temperatureC: number) =>
      convertConcentration({ value: 1, from: 'molal', to: 'molar', temperatureC });
    expect(molar(20)).toBeGreaterThan(molar(25));
    const demal = (temperatureC: number) =>
      convertConcentration({ value: 1, from: 'molal', to: 'demal', temperatureC });
    expect(demal(20)).toBe(demal(25));
    expect(convertConcentration({ value: 1, from: 'molar', to: 'molal', temperatureC: 20 })).toBeCloseTo(
      1.0313,
      4,
    );
    expect(convertConcentration({ value: 1, from: 'molar', to: 'molal', temperatureC: 25 })).toBeCloseTo(
      1.0328,
      4,
    );
  });

  it('of nothing is nothing', () => {
    for (const from of ['molal', 'demal', 'molar'] as const) {
      for (const to of ['molal', 'demal', 'molar'] as const) {
        expect(convertConcentration({ value: 0, from, to, temperatureC: 25 })).toBe(0);
      }
    }
  });

  it('refuses what it does not know', () => {
    const ask = (amount: number, temperatureC: number) =>
      convertConcentration({ value: amount, from: 'molal', to: 'molar', temperatureC });
    for (const amount of [-0.001, 1.11, NaN]) expect(() => ask(amount, 25)).toThrow(OutOfDomainError);
    for (const t of [-0.1, 95.1, NaN]) expect(() => ask(1, t)).toThrow(OutOfDomainError);
    expect(() =>
      convertConcentration({ value: 1, from: 'normal' as 'molar', to: 'molal', temperatureC: 25 }),
    ).toThrow(InvalidInputError);
    expect(() => kclSolutionDensity({ massFraction: 0.26, temperatureC: 25 })).toThrow(OutOfDomainError);
  });
});

describe('units', () => {
  it('1413 uS/cm = 1.413 mS/cm = 141.3 mS/m = 0.1413 S/m', () => {
    const from1413 = (to: ConductivityUnit) => convertConductivity({ value: 1413, from: 'uS/cm', to });
    expect(from1413('mS/cm')).toBeCloseTo(1.413, 12);
    expect(from1413('mS/m')).toBeCloseTo(141.3, 10);
    expect(from1413('S/m')).toBeCloseTo(0.1413, 12);
  });

  it('1 mS/m is 10 uS/cm, not 1000', () => {
    expect(convertConductivity({ value: 1, from: 'mS/m', to: 'uS/cm' })).toBe(10);
  });

  it('K of 1 per cm is 100 per m', () => {
    expect(cellConstantFromPerMetre(100)).toBe(1);
  });

  it('kappa in uS/cm is 1000 Lambda c, and m2/mol is ten thousand times cm2/mol', () => {
    expect(conductivityFromMolar({ molarConductivity: 141.257, concentrationMolL: 0.01 })).toBeCloseTo(
      1412.57,
      9,
    );
    const siemensPerMetre = 141.257e-4 * 10;
    expect(convertConductivity({ value: siemensPerMetre, from: 'S/m', to: 'uS/cm' })).toBeCloseTo(1412.57, 9);
  });

  it('survive a round trip', () => {
    const unit = fc.constantFrom(...conductivityUnits);
    fc.assert(
      fc.property(fc.double({ min: 1e-6, max: 1e6, noNaN: true }), unit, unit, (value, from, to) => {
        const back = convertConductivity({
          value: convertConductivity({ value, from, to }),
          from: to,
          to: from,
        });
        expect(Math.abs(back / value - 1)).toBeLessThan(1e-14);
      }),
    );
    fc.assert(
      fc.property(
        fc.double({ min: 1e-3, max: 1e6, noNaN: true }),
        fc.constantFrom(...resistivityUnits),
        (value, u) => {
          const resistivity = resistivityFromConductivity({ conductivityUsCm: value, unit: u });
          expect(Math.abs(conductivityFromResistivity({ resistivity, unit: u }) / value - 1)).toBeLessThan(
            1e-14,
          );
        },
      ),
    );
  });

  it('18.18 megohm cm is pure water', () => {
    expect(conductivityFromResistivity({ resistivity: 18.18 })).toBeCloseTo(0.055, 4);
  });

  it('refuse a zero where they must divide, and a unit nobody defined', () => {
    expect(() => resistivityFromConductivity({ conductivityUsCm: 0 })).toThrow(OutOfDomainError);
    expect(() => conductanceFromResistance(0)).toThrow(OutOfDomainError);
    expect(() => convertConductance({ value: NaN, from: 'uS', to: 'S' })).toThrow(OutOfDomainError);
    expect(() => convertConductivity({ value: 1, from: 'toString' as 'S/m', to: 'S/m' })).toThrow(
      InvalidInputError,
    );
  });
});
