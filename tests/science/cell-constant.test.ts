import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  adjustedCellConstant,
  cellConstant,
  expectedLoopConductivity,
  inductiveInstallationFactor,
  loopCheck,
} from '../../shared/science/cell-constant.ts';
import { OutOfDomainError, RefusedModelError } from '../../shared/science/errors.ts';
import { diluteKclConductivity, kclConcentrationAt25 } from '../../shared/science/kcl-solutions.ts';

describe('cell constant from a solution', () => {
  it('half an ohm of leads is 0.64 % at 12.8 mS/cm, and 6.4 % in a cell of 0.1 per cm', () => {
    const options = { referenceUsCm: 12824.6, conductanceUs: 1e6 / 78.4 };
    expect(cellConstant({ ...options, leadResistanceOhm: 0.5 })).toBeCloseTo(0.99904, 5);
    expect(cellConstant(options)).toBeCloseTo(1.00545, 5);
    const narrow = { referenceUsCm: 12824.6, conductanceUs: 1e6 / 8.29 };
    expect(cellConstant(narrow) / cellConstant({ ...narrow, leadResistanceOhm: 0.5 }) - 1).toBeCloseTo(
      0.064,
      3,
    );
  });

  it('water of 1 uS/cm is 1.2 % of an 84 uS/cm standard and 0.07 % of 1413', () => {
    expect(cellConstant({ referenceUsCm: 84, conductanceUs: 85, solventUsCm: 1 })).toBeCloseTo(1, 12);
    expect(cellConstant({ referenceUsCm: 84, conductanceUs: 85 })).toBeCloseTo(0.98824, 5);
    expect(cellConstant({ referenceUsCm: 1413, conductanceUs: 1414 })).toBeCloseTo(1 - 0.0007, 4);
  });

  it('a bottle of 84 that stood open gains up to 1 uS/cm and passes the gain on to K', () => {
    const fresh = diluteKclConductivity({
      concentrationMolL: kclConcentrationAt25(84),
      temperatureC: 25,
      solventUsCm: 0,
    });
    const open = diluteKclConductivity({
      concentrationMolL: kclConcentrationAt25(84),
      temperatureC: 25,
      solventUsCm: 1,
    });
    expect(open.conductivityUsCm / fresh.conductivityUsCm - 1).toBeCloseTo(0.0119, 4);
  });

  it('a length in cm entered for a constant per cm is refused', () => {
    expect(() => cellConstant({ referenceUsCm: 1408.23, conductanceUs: 1 })).toThrow(OutOfDomainError);
    expect(() =>
      adjustedCellConstant({ cellConstantPerCm: 101, referenceUsCm: 1413, indicatedUsCm: 1413 }),
    ).toThrow(/per cm/);
    expect(() =>
      adjustedCellConstant({ cellConstantPerCm: 9e-4, referenceUsCm: 1413, indicatedUsCm: 1413 }),
    ).toThrow(OutOfDomainError);
  });

  it('leads cannot resist more than everything', () => {
    expect(() => cellConstant({ referenceUsCm: 1408, conductanceUs: 1e4, leadResistanceOhm: 100 })).toThrow(
      OutOfDomainError,
    );
    expect(() => cellConstant({ referenceUsCm: 1408, conductanceUs: 0 })).toThrow(OutOfDomainError);
    expect(() => cellConstant({ referenceUsCm: NaN, conductanceUs: 1000 })).toThrow(OutOfDomainError);
  });

  it('gives back the conductance it came from', () => {
    const constant = fc.double({ min: 0.01, max: 10, noNaN: true });
    fc.assert(
      fc.property(
        constant,
        fc.double({ min: 10, max: 1e5, noNaN: true }),
        fc.double({ min: 0, max: 2, noNaN: true }),
        (k, kappa, leads) => {
          const conductanceUs = 1e6 / ((1e6 * k) / kappa + leads);
          const found = cellConstant({ referenceUsCm: kappa, conductanceUs, leadResistanceOhm: leads });
          // 1e-6: two ohms of leads taken off a tenth of an ohm of cell lose digits.
          expect(Math.abs(found / k - 1)).toBeLessThan(1e-6);
        },
      ),
    );
  });
});

describe('adjustment', () => {
  it('makes the indication true', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.01, max: 10, noNaN: true }),
        fc.double({ min: 0.7, max: 1.45, noNaN: true }),
        (k, ratio) => {
          const adjusted = adjustedCellConstant({
            cellConstantPerCm: k,
            referenceUsCm: 1000 * ratio,
            indicatedUsCm: 1000,
          });
          expect((1000 * adjusted) / k).toBeCloseTo(1000 * ratio, 9);
        },
      ),
    );
  });

  it('is refused for a wrong solution, which no cell constant can explain', () => {
    expect(() =>
      adjustedCellConstant({ cellConstantPerCm: 1, referenceUsCm: 1413, indicatedUsCm: 12880 }),
    ).toThrow(RefusedModelError);
    expect(() =>
      adjustedCellConstant({ cellConstantPerCm: 1, referenceUsCm: 1413, indicatedUsCm: 0 }),
    ).toThrow(OutOfDomainError);
  });

  it('a thermometer 0.5 K wrong looks like 1 % of cell drift', () => {
    // 1.944 %/K of the 0.01 mol/kg solution: the probe compensates for a temperature that is not there.
    const apparent = 1408.23 / (1 + 0.01944 * 0.5);
    const adjusted = adjustedCellConstant({
      cellConstantPerCm: 1,
      referenceUsCm: 1408.23,
      indicatedUsCm: apparent,
    });
    expect(adjusted - 1).toBeCloseTo(0.0097, 4);
  });
});

describe('inductive probes', () => {
  it('expect K/R through the loop, and the square of the turns', () => {
    const loop = { cellConstantPerCm: 2.5, loopResistanceOhm: 100 };
    expect(expectedLoopConductivity(loop)).toBe(25000);
    expect(expectedLoopConductivity({ ...loop, turns: 2 })).toBe(100000);
    expect(expectedLoopConductivity({ ...loop, installationFactor: 1.05 })).toBeCloseTo(26250, 9);
    expect(loopCheck({ ...loop, indicatedUsCm: 24750 }).errorPercent).toBeCloseTo(-1, 9);
  });

  it('refuse an installation factor that no mounting has', () => {
    expect(inductiveInstallationFactor({ referenceUsCm: 1.5, indicatedUsCm: 1 })).toBe(1.5);
    expect(() => inductiveInstallationFactor({ referenceUsCm: 1.51, indicatedUsCm: 1 })).toThrow(
      OutOfDomainError,
    );
    expect(() =>
      expectedLoopConductivity({ cellConstantPerCm: 2.5, loopResistanceOhm: 100, turns: 0.5 }),
    ).toThrow(OutOfDomainError);
  });
});
