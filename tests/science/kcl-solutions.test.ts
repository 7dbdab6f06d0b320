import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { OutOfDomainError } from '../../shared/science/errors.ts';
import {
  diluteKclConductivity,
  diluteKclTemperatureRatio,
  kclConcentrationAt25,
  kclMolarConductivity,
  kclMolarConductivityInternationalOhm,
} from '../../shared/science/kcl-solutions.ts';
import { absoluteFromInternationalOhm } from '../../shared/science/kcl-standards.ts';

describe('KCl equations', () => {
  it('use the decimal logarithm: the natural one would be 1.1 % low at 0.01 mol/L', () => {
    expect(kclMolarConductivityInternationalOhm({ concentrationMolL: 0.01 })).toBeCloseTo(141.274, 3);
    expect(kclMolarConductivityInternationalOhm({ concentrationMolL: 0.01 })).toBeGreaterThan(139.744);
  });

  it('keep the two ohms apart: the 1959 value meets 141.27 as printed and 141.20 only after the factor', () => {
    const printed = kclMolarConductivityInternationalOhm({ concentrationMolL: 0.01 });
    expect(Math.abs(printed / 141.27 - 1)).toBeLessThan(5e-5);
    expect(Math.abs(printed / 141.2 - 1)).toBeGreaterThan(5e-4);
    expect(Math.abs(absoluteFromInternationalOhm(printed) / 141.2 - 1)).toBeLessThan(5e-5);
  });

  it('replace the limiting law where it fails: 0.01 mol/L is 1412.6, not 1403.5 uS/cm', () => {
    expect(10 * kclMolarConductivity({ concentrationMolL: 0.01 })).toBeCloseTo(1412.57, 2);
  });

  it('answer at 0 and at their limit, and refuse beyond', () => {
    expect(kclMolarConductivity({ concentrationMolL: 0 })).toBe(149.873);
    expect(kclMolarConductivity({ concentrationMolL: 0.04 })).toBeGreaterThan(134);
    for (const c of [-1e-9, 0.040001, NaN, Infinity]) {
      expect(() => kclMolarConductivity({ concentrationMolL: c })).toThrow(OutOfDomainError);
    }
    expect(() => kclMolarConductivityInternationalOhm({ concentrationMolL: 0.0121 })).toThrow(
      OutOfDomainError,
    );
  });

  it('can be turned round', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 0.04, noNaN: true }), (c) => {
        const kappa = 1000 * c * kclMolarConductivity({ concentrationMolL: c });
        expect(Math.abs(kclConcentrationAt25(kappa) - c)).toBeLessThanOrEqual(1e-9 * c);
      }),
    );
    expect(() => kclConcentrationAt25(5500)).toThrow(OutOfDomainError);
  });
});

describe('dilute KCl at a temperature', () => {
  const temperature = fc.double({ min: 0, max: 50, noNaN: true });

  it('adds the water it was made of', () => {
    const without = diluteKclConductivity({ concentrationMolL: 5.69e-4, temperatureC: 25, solventUsCm: 0 });
    const withWater = diluteKclConductivity({ concentrationMolL: 5.69e-4, temperatureC: 25, solventUsCm: 1 });
    expect(withWater.conductivityUsCm - without.conductivityUsCm).toBeCloseTo(1, 12);
    expect(withWater.standardUncertaintyUsCm).toBe(without.standardUncertaintyUsCm);
  });

  it('is the water alone when there is no salt', () => {
    const none = diluteKclConductivity({ concentrationMolL: 0, temperatureC: 30, solventUsCm: 0.9 });
    expect(none).toMatchObject({ conductivityUsCm: 0.9, standardUncertaintyUsCm: 0 });
  });

  it('rises with temperature and with concentration', () => {
    const concentration = fc.double({ min: 1e-6, max: 0.0099, noNaN: true });
    fc.assert(
      fc.property(concentration, fc.double({ min: 0, max: 49.9, noNaN: true }), (c, t) => {
        const at = (concentrationMolL: number, temperatureC: number) =>
          diluteKclConductivity({ concentrationMolL, temperatureC, solventUsCm: 0 }).conductivityUsCm;
        expect(at(c, t + 0.1)).toBeGreaterThan(at(c, t));
        expect(at(c * 1.01, t)).toBeGreaterThan(at(c, t));
      }),
    );
  });

  it('is one at 25 degC whatever the concentration, and its slope is its derivative', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 0.01, noNaN: true }), temperature, (concentrationMolL, t) => {
        expect(diluteKclTemperatureRatio({ concentrationMolL, temperatureC: 25 }).ratio).toBeCloseTo(1, 12);
        const inside = Math.min(Math.max(t, 0.001), 49.999);
        const low = diluteKclTemperatureRatio({ concentrationMolL, temperatureC: inside - 0.001 }).ratio;
        const high = diluteKclTemperatureRatio({ concentrationMolL, temperatureC: inside + 0.001 }).ratio;
        const { ratioPerK } = diluteKclTemperatureRatio({ concentrationMolL, temperatureC: inside });
        expect(ratioPerK).toBeCloseTo((high - low) / 0.002, 6);
      }),
    );
  });

  it('refuses what it was never checked against', () => {
    const ask = (concentrationMolL: number, temperatureC: number, solventUsCm = 0) =>
      diluteKclConductivity({ concentrationMolL, temperatureC, solventUsCm });
    expect(() => ask(0.0101, 25)).toThrow(OutOfDomainError);
    expect(() => ask(0.001, 50.1)).toThrow(OutOfDomainError);
    expect(() => ask(0.001, -0.1)).toThrow(OutOfDomainError);
    expect(() => ask(0.001, 25, -1)).toThrow(OutOfDomainError);
    expect(() => ask(NaN, 25)).toThrow(OutOfDomainError);
  });
});
