import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { CertifiedLot } from '../../shared/science/certified-lots.ts';
import { evaluateCheck } from '../../shared/science/check-evaluation.ts';
import type { CheckInput } from '../../shared/science/check-evaluation.ts';
import { OutOfDomainError } from '../../shared/science/errors.ts';

const molal: CertifiedLot = {
  medium: 'kcl-aqueous',
  basis: 'molal',
  nominal: 0.01,
  certifiedConductivityUsCm: 1408.23,
  referenceTemperatureC: 25,
  expandedUncertaintyUsCm: 2.8,
  coverageFactor: 2,
  temperatureTable: null,
};
const check = (facts: Partial<CheckInput> = {}) =>
  evaluateCheck({
    lot: molal,
    temperatureC: 25,
    temperatureStandardUncertaintyC: 0.0289,
    conductivityUsCm: 1408.23,
    cellConstantPerCm: 1,
    tolerancePercent: 2,
    rule: 'guarded-u',
    ...facts,
  });
const row = (result: ReturnType<typeof check>, name: string) =>
  result.budget.find((line) => line.name === name);

describe('a check reading', () => {
  it('is judged against the lot at the temperature of the check, not at 25 degC', () => {
    const at23 = check({ temperatureC: 23, conductivityUsCm: 1353.75 });
    expect(at23.referenceUsCm).toBeCloseTo(1353.745, 3);
    expect(at23.errorPercent).toBeCloseTo(0, 3);
    expect(at23.outcome).toBe('within-clear');
  });

  it('has its error relative to the reference, not to the reading', () => {
    expect(check({ conductivityUsCm: 1408.23 * 1.1 }).errorPercent).toBeCloseTo(10, 9);
    expect(check({ conductivityUsCm: 1408.23 * 0.9 }).errorPercent).toBeCloseTo(-10, 9);
  });

  it('implies the cell constant that would have made it true', () => {
    const result = check({ conductivityUsCm: 1392, cellConstantPerCm: 1 });
    expect(result.impliedCellConstantPerCm).toBeCloseTo(1.01166, 5);
    expect(check({ conductivityUsCm: 0 }).impliedCellConstantPerCm).toBeNull();
    expect(check({ conductivityUsCm: 0 }).outcome).toBe('outside-clear');
  });

  it('half-width 0.05 K of the thermometer is 0.056 %, as large as a good standard', () => {
    const temperature = row(check({ temperatureStandardUncertaintyC: 0.05 / Math.sqrt(3) }), 'temperature');
    expect(temperature?.contribution).toBeCloseTo(0.0561, 4);
  });

  it('divides resolution by 2 sqrt 3 and the certificate U by its k', () => {
    const result = check({ resolutionUsCm: 1 });
    expect(row(result, 'probe resolution')?.standardUncertainty).toBeCloseTo(1 / (2 * Math.sqrt(3)), 12);
    expect(row(result, 'lot value')?.standardUncertainty).toBeCloseTo(1.4, 12);
  });

  it('uses more than k = 2 when few readings dominate', () => {
    const result = check({ repeatabilityPercent: 0.2, repeatabilityDegreesOfFreedom: 4 });
    expect(result.coverageFactor).toBeGreaterThan(2.4);
    expect(check().coverageFactor).toBeCloseTo(2, 4);
  });

  it('keeps the rule beside the verdict: the same reading is clear by one rule and unsure by another', () => {
    const facts = { conductivityUsCm: 1408.23 * 1.019 };
    expect(check({ ...facts, rule: 'simple' }).outcome).toBe('within-clear');
    expect(check({ ...facts, rule: 'guarded-u' }).outcome).toBe('within-unsure');
  });

  it('does not depend on the unit of conductivity or on the sign of the error', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 5, noNaN: true }), (percent) => {
        const up = check({ conductivityUsCm: 1408.23 * (1 + percent / 100) });
        const down = check({ conductivityUsCm: 1408.23 * (1 - percent / 100) });
        expect(up.probabilityOutside).toBeCloseTo(down.probabilityOutside, 9);
        expect(up.expandedUncertaintyPercent).toBe(down.expandedUncertaintyPercent);
      }),
    );
  });

  it('grows no more certain when a component is added', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0, max: 20, noNaN: true }),
        fc.double({ min: 0, max: 1, noNaN: true }),
        (resolutionUsCm, repeatabilityPercent) => {
          const more = check({ resolutionUsCm, repeatabilityPercent });
          expect(more.expandedUncertaintyPercent).toBeGreaterThanOrEqual(check().expandedUncertaintyPercent);
          const shares = more.budget.reduce((sum, line) => sum + line.share, 0);
          expect(shares).toBeCloseTo(1, 9);
        },
      ),
    );
  });

  it('refuses what it cannot judge', () => {
    for (const facts of [
      { conductivityUsCm: NaN },
      { conductivityUsCm: -1 },
      { cellConstantPerCm: 0 },
      { cellConstantPerCm: 1000 },
      { tolerancePercent: 0 },
      { temperatureC: 50.1 },
      { temperatureC: NaN },
      { temperatureStandardUncertaintyC: -0.1 },
      { temperatureStandardUncertaintyC: NaN },
      { resolutionUsCm: -1 },
      { repeatabilityPercent: NaN },
    ]) {
      expect(() => check(facts), JSON.stringify(facts)).toThrow(OutOfDomainError);
    }
  });
});
