import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { lotLabel, lotReferenceConductivity, suspectedBasis } from '../../shared/science/certified-lots.ts';
import type { CertifiedLot } from '../../shared/science/certified-lots.ts';
import { InconsistentInputError, InvalidInputError, OutOfDomainError } from '../../shared/science/errors.ts';
import { kclStandardConductivity } from '../../shared/science/kcl-standards.ts';

const lot = (facts: Partial<CertifiedLot> = {}): CertifiedLot => ({
  medium: 'kcl-aqueous',
  basis: 'molal',
  nominal: 0.01,
  certifiedConductivityUsCm: null,
  referenceTemperatureC: 25,
  expandedUncertaintyUsCm: null,
  coverageFactor: null,
  temperatureTable: null,
  ...facts,
});
const at = (facts: Partial<CertifiedLot>, temperatureC: number) =>
  lotReferenceConductivity({ lot: lot(facts), temperatureC });

/** A hydrochloric acid standard: its temperature coefficient is 1.5 %/K, not that of KCl. */
const acid: Partial<CertifiedLot> = {
  medium: 'other',
  basis: 'other',
  nominal: null,
  certifiedConductivityUsCm: 5000,
  expandedUncertaintyUsCm: 25,
  coverageFactor: 2,
  temperatureTable: [15, 20, 25, 30].map((temperatureC) => ({
    temperatureC,
    conductivityUsCm: 5000 * (1 + 0.015 * (temperatureC - 25)),
  })),
};

describe("a lot with its certificate's own table", () => {
  it('is read at its rows exactly and between them smoothly', () => {
    expect(at(acid, 20)).toMatchObject({ conductivityUsCm: 4625, interpolation: 'certificate-table' });
    expect(at(acid, 22.5).conductivityUsCm).toBeCloseTo(4812.5, 9);
    expect(at(acid, 22.5).slopeUsCmPerK).toBeCloseTo(75, 9);
  });

  it('never touches the KCl tables, even when it is aqueous KCl', () => {
    const table = [20, 25, 30].map((temperatureC) => ({
      temperatureC,
      conductivityUsCm: 1400 + temperatureC,
    }));
    const facts = { certifiedConductivityUsCm: 1425, temperatureTable: table };
    expect(at(facts, 20).conductivityUsCm).toBe(1420);
  });

  it('refuses to extrapolate by a tenth of a kelvin', () => {
    for (const t of [14.9, 30.1, NaN]) expect(() => at(acid, t)).toThrow(OutOfDomainError);
    expect(at(acid, 15).conductivityUsCm).toBeCloseTo(4250, 9);
    expect(at(acid, 30).conductivityUsCm).toBeCloseTo(5375, 9);
  });

  it('divides the certificate U by its own k and carries it in proportion', () => {
    expect(at(acid, 20).valueStandardUncertaintyUsCm).toBeCloseTo((25 / 2 / 5000) * 4625, 9);
    expect(at({ ...acid, coverageFactor: 2.5 }, 25).valueStandardUncertaintyUsCm).toBeCloseTo(10, 9);
  });

  it('is more uncertain in the middle of two rows five kelvin apart than at one of them', () => {
    const two = {
      ...acid,
      temperatureTable: acid.temperatureTable!.filter((row) => row.temperatureC !== 20),
    };
    expect(
      at({ ...two, temperatureTable: two.temperatureTable.slice(0, 2) }, 20)
        .interpolationStandardUncertaintyUsCm,
    ).toBeGreaterThan(1);
    expect(at(two, 25).interpolationStandardUncertaintyUsCm).toBeLessThan(1e-9);
  });

  it('refuses a table that contradicts the certified value: one of them was copied wrongly', () => {
    expect(() => at({ ...acid, certifiedConductivityUsCm: 5100 }, 20)).toThrow(InconsistentInputError);
  });

  it('refuses rows out of order', () => {
    const rows = [...acid.temperatureTable!].reverse();
    expect(() => at({ ...acid, temperatureTable: rows }, 20)).toThrow(InconsistentInputError);
  });
});

describe('a certified KCl lot without a table', () => {
  const certified = { certifiedConductivityUsCm: 1409.5, expandedUncertaintyUsCm: 2.8, coverageFactor: 2 };

  it('follows the shape of its basis, scaled to its own value', () => {
    const shape =
      kclStandardConductivity({ basis: 'molal', nominal: 0.01, temperatureC: 18 }).conductivityUsCm / 1408.23;
    expect(at(certified, 18).conductivityUsCm).toBeCloseTo(1409.5 * shape, 9);
    expect(at(certified, 25)).toMatchObject({ conductivityUsCm: 1409.5, standardUncertaintyUsCm: 1.4 });
    expect(at(certified, 18).standardUncertaintyUsCm).toBeGreaterThan(1.4 * shape);
  });

  it('certified at 20 degC gives the same lot', () => {
    const at20 = at(certified, 20).conductivityUsCm;
    const same = { ...certified, certifiedConductivityUsCm: at20, referenceTemperatureC: 20 };
    expect(at(same, 31).conductivityUsCm).toBeCloseTo(at(certified, 31).conductivityUsCm, 8);
  });

  it('is taken as good to 1 % when its label states no uncertainty', () => {
    expect(at({ certifiedConductivityUsCm: 1409.5 }, 25).standardUncertaintyUsCm).toBeCloseTo(
      (0.01 / Math.sqrt(3)) * 1409.5,
      9,
    );
  });

  it('of 84 uS/cm follows dilute KCl: 75.90 at 20 degC', () => {
    const low = { basis: 'other', nominal: null, certifiedConductivityUsCm: 84 } as const;
    expect(at(low, 20)).toMatchObject({ interpolation: 'kcl-dilute-shape' });
    expect(at(low, 20).conductivityUsCm).toBeCloseTo(75.9, 2);
    const from20 = { ...low, certifiedConductivityUsCm: 75.897, referenceTemperatureC: 20 };
    expect(at(from20, 25).conductivityUsCm).toBeCloseTo(84, 2);
  });

  it('of any strength meets the standards where they are', () => {
    for (const nominal of [0.01, 0.1, 1] as const) {
      const standard = (t: number) =>
        kclStandardConductivity({ basis: 'molal', nominal, temperatureC: t }).conductivityUsCm;
      const facts = { basis: 'other', nominal: null, certifiedConductivityUsCm: standard(25) } as const;
      // 0.05 %: at 0.01 mol/kg the scaled limiting law stands in for the table.
      expect(Math.abs(at(facts, 18).conductivityUsCm / standard(18) - 1)).toBeLessThan(5e-4);
    }
  });

  it('stronger than 1 mol/kg needs its own table', () => {
    expect(() => at({ basis: 'other', nominal: null, certifiedConductivityUsCm: 150000 }, 20)).toThrow(
      OutOfDomainError,
    );
  });

  it('refuses temperatures without a shape', () => {
    expect(() => at(certified, 50.1)).toThrow(OutOfDomainError);
    expect(() => at(certified, -0.1)).toThrow(OutOfDomainError);
  });
});

describe('another liquid without a table', () => {
  const { temperatureTable: _, ...noTable } = acid;

  it('is known at its own temperature only', () => {
    expect(at(noTable, 25).conductivityUsCm).toBe(5000);
    expect(at(noTable, 25.2).interpolationStandardUncertaintyUsCm).toBeGreaterThan(10);
    expect(() => at(noTable, 25.3)).toThrow(OutOfDomainError);
    expect(() => at(noTable, 20)).toThrow(/not aqueous KCl/);
  });
});

describe('a lot made by its basis alone', () => {
  it('has the value of the table at its temperature, not the one on the label', () => {
    expect(at({}, 23).conductivityUsCm).toBeCloseTo(1353.75, 2);
  });

  it('is never better than its table and never better than what was stated of it', () => {
    expect(at({}, 25).valueStandardUncertaintyUsCm).toBeCloseTo(3e-4 * 1408.23, 6);
    expect(
      at({ expandedUncertaintyUsCm: 10, coverageFactor: 2 }, 25).valueStandardUncertaintyUsCm,
    ).toBeCloseTo(5, 9);
    expect(at({ expandedUncertaintyUsCm: 0.01 }, 25).valueStandardUncertaintyUsCm).toBeCloseTo(
      3e-4 * 1408.23,
      6,
    );
  });

  it('without basis, value or table states nothing', () => {
    expect(() => at({ basis: 'other', nominal: null }, 25)).toThrow(InvalidInputError);
    expect(() => at({ medium: 'other', basis: 'molal' }, 25)).toThrow(InvalidInputError);
  });
});

describe('labels', () => {
  it('tell 0.01 mol/kg from 0.01 demal and say the certified value', () => {
    expect(lotLabel({ lot: lot({ certifiedConductivityUsCm: 1409.5 }) })).toBe(
      'KCl 0.01 mol/kg (molal), 1409.5 µS/cm at 25 °C',
    );
    expect(lotLabel({ lot: lot({ basis: 'demal' }) })).toBe('KCl 0.01 D (demal), 1408.3 µS/cm at 25 °C');
  });

  it('suspect a molar solution sold under a molal label', () => {
    expect(suspectedBasis({ lot: lot({ certifiedConductivityUsCm: 1413 }) })).toBe('molar');
    expect(suspectedBasis({ lot: lot({ certifiedConductivityUsCm: 1409.5 }) })).toBeNull();
    expect(suspectedBasis({ lot: lot({ nominal: 1, certifiedConductivityUsCm: 111300 }) })).toBe('demal');
  });
});

it('every kind of lot rises with temperature and states a positive uncertainty', () => {
  const kinds: Partial<CertifiedLot>[] = [
    {},
    { basis: 'demal', nominal: 1 },
    { certifiedConductivityUsCm: 1409.5, expandedUncertaintyUsCm: 2.8 },
    { basis: 'other', nominal: null, certifiedConductivityUsCm: 84 },
    { basis: 'other', nominal: null, certifiedConductivityUsCm: 5000 },
    acid,
  ];
  fc.assert(
    fc.property(fc.constantFrom(...kinds), fc.double({ min: 15, max: 29.9, noNaN: true }), (facts, t) => {
      const here = at(facts, t);
      expect(at(facts, t + 0.1).conductivityUsCm).toBeGreaterThan(here.conductivityUsCm);
      expect(here.standardUncertaintyUsCm).toBeGreaterThan(0);
      expect(here.standardUncertaintyUsCm).toBeGreaterThanOrEqual(here.valueStandardUncertaintyUsCm);
      expect(Number.isFinite(here.slopeUsCmPerK)).toBe(true);
    }),
  );
});
