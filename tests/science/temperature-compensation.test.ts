import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { InvalidInputError, OutOfDomainError, RefusedModelError } from '../../shared/science/errors.ts';
import { kclStandardConductivity } from '../../shared/science/kcl-standards.ts';
import type { KclNominal } from '../../shared/science/kcl-standards.ts';
import { meetsStageOne, stageOneLimit } from '../../shared/science/pharmacopoeia-water.ts';
import {
  naturalWaterFactor,
  recogniseCompensation,
  restateCoefficient,
  toReferenceTemperature,
  undoLinearCompensation,
} from '../../shared/science/temperature-compensation.ts';
import { pureWaterConductivity } from '../../shared/science/water.ts';

const molal = (nominal: KclNominal, temperatureC: number) =>
  kclStandardConductivity({ basis: 'molal', nominal, temperatureC }).conductivityUsCm;
const linear = (conductivityUsCm: number, temperatureC: number, coefficientPerK: number, referenceC = 25) =>
  toReferenceTemperature({
    conductivityUsCm,
    temperatureC,
    model: { kind: 'linear', coefficientPerK, referenceC },
  });

describe('linear compensation', () => {
  it('compensates once: 1273.03 at 20 degC is 1408.2 at 25 degC', () => {
    expect(linear(1273.03, 20, 0.0192)).toBeCloseTo(1408.2, 1);
  });

  it('a coefficient belongs to its reference: 1.920 at 25 degC is 2.124 at 20 degC, else 0.9 % wrong', () => {
    expect(100 * restateCoefficient({ coefficientPerK: 0.0192, fromC: 25, toC: 20 })).toBeCloseTo(2.124, 3);
    expect(linear(molal(0.01, 25), 25, 0.02124, 20)).toBeCloseTo(1273.03, 0);
    expect(linear(molal(0.01, 25), 25, 0.0192, 20)).toBeCloseTo(1284.9, 1);
  });

  it('restating there and back changes nothing', () => {
    const coefficient = fc.double({ min: 0.001, max: 0.025, noNaN: true });
    const reference = fc.double({ min: 15, max: 35, noNaN: true });
    fc.assert(
      fc.property(coefficient, reference, reference, (coefficientPerK, fromC, toC) => {
        const there = restateCoefficient({ coefficientPerK, fromC, toC });
        fc.pre(there <= 0.1);
        expect(restateCoefficient({ coefficientPerK: there, fromC: toC, toC: fromC })).toBeCloseTo(
          coefficientPerK,
          12,
        );
      }),
    );
  });

  it('divides by 1 + alpha (T - 25) and does not multiply by 1 - alpha (T - 25): 1.2361, not 1.1910', () => {
    expect(linear(1000, 15, 0.0191) / 1000).toBeCloseTo(1.2361, 4);
  });

  it('one coefficient does not fit all: 2 %/K is 1.3 % wrong for 0.01 mol/kg and 1.91 %/K 2.3 % wrong for 1 mol/kg', () => {
    expect(linear(molal(0.01, 15), 15, 0.02) / molal(0.01, 25) - 1).toBeCloseTo(0.0132, 3);
    expect(linear(molal(1, 15), 15, 0.0191) / molal(1, 25) - 1).toBeCloseTo(0.023, 3);
  });

  it('can be undone exactly', () => {
    const coefficient = fc.double({ min: 0, max: 0.03, noNaN: true });
    fc.assert(
      fc.property(
        fc.double({ min: 100, max: 1e5, noNaN: true }),
        fc.double({ min: 5, max: 90, noNaN: true }),
        coefficient,
        (raw, t, a) => {
          const conductivityUsCm = linear(raw, t, a);
          const back = undoLinearCompensation({
            conductivityUsCm,
            temperatureC: t,
            coefficientPerK: a,
            referenceC: 25,
          });
          expect(Math.abs(back / raw - 1)).toBeLessThan(1e-14);
        },
      ),
    );
  });

  it('is proportional to the conductivity, so no unit matters, and is the identity at its reference', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 100, max: 1e4, noNaN: true }),
        fc.double({ min: 5, max: 90, noNaN: true }),
        (raw, t) => {
          expect(linear(raw * 10, t, 0.02) / linear(raw, t, 0.02)).toBeCloseTo(10, 9);
          expect(linear(raw, 25, 0.02)).toBe(raw);
        },
      ),
    );
  });

  it('refuses a temperature at which the line has no conductivity left', () => {
    expect(() => linear(1000, -5, 0.03)).toThrow(RefusedModelError);
    expect(() => linear(1000, 141, 0.02)).toThrow(OutOfDomainError);
    expect(() => linear(1000, 20, 0.11)).toThrow(OutOfDomainError);
    expect(() => linear(1000, 20, 2)).toThrow(OutOfDomainError);
    expect(() => linear(NaN, 20, 0.02)).toThrow(OutOfDomainError);
  });
});

describe('double compensation', () => {
  it('is refused when the value is marked as compensated', () => {
    const options = { conductivityUsCm: 1408.2, temperatureC: 20, isCompensated: true } as const;
    expect(() =>
      toReferenceTemperature({
        ...options,
        model: { kind: 'linear', coefficientPerK: 0.0192, referenceC: 25 },
      }),
    ).toThrow(RefusedModelError);
    expect(() => toReferenceTemperature({ ...options, model: 'natural-water' })).toThrow(RefusedModelError);
    expect(toReferenceTemperature({ ...options, model: 'none' })).toBe(1408.2);
  });

  it('is recognised in a known solution: 1557.8 instead of 1408.2, 10.6 % too high', () => {
    expect(linear(linear(1273.03, 20, 0.0192), 20, 0.0192)).toBeCloseTo(1557.8, 1);
    const state = (indicatedUsCm: number, temperatureC = 20) =>
      recogniseCompensation({
        indicatedUsCm,
        referenceUsCm: molal(0.01, temperatureC),
        temperatureC,
        coefficientPerK: 0.0192,
        referenceC: 25,
      });
    expect(state(1273)).toBe('uncompensated');
    expect(state(1408.2)).toBe('compensated-once');
    expect(state(1557.8)).toBe('compensated-twice');
    expect(state(1800)).toBe('not-recognised');
    expect(state(1408, 25)).toBe('cannot-tell');
  });
});

describe('water that is nearly pure', () => {
  it('2 %/K would be 63 % too high at 40 degC, so the linear model refuses and the ultrapure one answers', () => {
    expect(0.1167 / (1 + 0.02 * 15)).toBeCloseTo(0.0898, 4);
    expect(() => linear(0.1167, 40, 0.02)).toThrow(RefusedModelError);
    const ultrapure = toReferenceTemperature({
      conductivityUsCm: 0.1167,
      temperatureC: 40,
      model: 'ultrapure',
    });
    expect(Math.abs(ultrapure / 0.055 - 1)).toBeLessThan(2e-3);
  });

  it('0.100 uS/cm at 40 degC is less than water can conduct: refused, not compensated', () => {
    for (const model of ['ultrapure', { kind: 'linear', coefficientPerK: 0.02, referenceC: 25 }] as const) {
      expect(() => toReferenceTemperature({ conductivityUsCm: 0.1, temperatureC: 40, model })).toThrow(
        OutOfDomainError,
      );
    }
    expect(() =>
      toReferenceTemperature({ conductivityUsCm: 0, temperatureC: 10, model: 'natural-water' }),
    ).toThrow(OutOfDomainError);
  });

  it('ultrapure: pure water stays pure, and more salt gives more conductivity', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 5, max: 55, noNaN: true }),
        fc.double({ min: 0.001, max: 5, noNaN: true }),
        (t, salt) => {
          const at = (conductivityUsCm: number) =>
            toReferenceTemperature({ conductivityUsCm, temperatureC: t, model: 'ultrapure' });
          expect(at(pureWaterConductivity(t))).toBeCloseTo(pureWaterConductivity(25), 12);
          expect(at(pureWaterConductivity(t) + salt)).toBeGreaterThan(at(pureWaterConductivity(t)));
        },
      ),
    );
  });

  it('ultrapure refuses waters that are not', () => {
    expect(() =>
      toReferenceTemperature({ conductivityUsCm: 10.1, temperatureC: 25, model: 'ultrapure' }),
    ).toThrow(OutOfDomainError);
    expect(() =>
      toReferenceTemperature({ conductivityUsCm: 1, temperatureC: 56, model: 'ultrapure' }),
    ).toThrow(OutOfDomainError);
  });
});

describe('natural waters', () => {
  const natural = (conductivityUsCm: number, temperatureC: number) =>
    toReferenceTemperature({ conductivityUsCm, temperatureC, model: 'natural-water' });

  it('multiplies by f25: 100 at 10 degC is 142.8, not 70.0', () => {
    expect(natural(100, 10)).toBeCloseTo(142.84, 2);
  });

  it('is 1.0004, not 1, at 25 degC, as the standard has it', () => {
    expect(natural(1000, 25)).toBeCloseTo(1000.4, 1);
  });

  it('refuses temperatures outside 0 to 35.9 degC', () => {
    expect(natural(100, 0)).toBeCloseTo(191.87, 1);
    expect(natural(100, 35.9)).toBeGreaterThan(80);
    for (const t of [-0.1, 36, 40]) expect(() => natural(100, t)).toThrow(OutOfDomainError);
  });

  it('refuses a KCl standard, which it would make 2.8 % too high at 10 degC', () => {
    expect((1013.95 * naturalWaterFactor(10)) / 1408.23 - 1).toBeCloseTo(0.0284, 3);
    expect(() =>
      toReferenceTemperature({
        conductivityUsCm: 1013.95,
        temperatureC: 10,
        model: 'natural-water',
        medium: 'kcl-standard',
      }),
    ).toThrow(RefusedModelError);
  });

  it('falls steadily with temperature', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 35.8, noNaN: true }), (t) => {
        expect(naturalWaterFactor(t + 0.1)).toBeLessThan(naturalWaterFactor(t));
      }),
    );
  });
});

it('averaging before converting gives 1340.6, a value that belongs to no temperature', () => {
  const readings = [
    { conductivityUsCm: 1408.23, temperatureC: 25 },
    { conductivityUsCm: 1273.03, temperatureC: 20 },
  ];
  const converted = readings.map((reading) => linear(reading.conductivityUsCm, reading.temperatureC, 0.0192));
  expect((converted[0]! + converted[1]!) / 2).toBeCloseTo(1408.2, 1);
  const averagedFirst = (1408.23 + 1273.03) / 2;
  expect(averagedFirst).toBeCloseTo(1340.6, 1);
  expect(averagedFirst / molal(0.01, 25) - 1).toBeLessThan(-0.04);
  expect(averagedFirst / molal(0.01, 20) - 1).toBeGreaterThan(0.04);
});

it('refuses a model nobody defined', () => {
  const model = { kind: 'quadratic' } as unknown as 'none';
  expect(() => toReferenceTemperature({ conductivityUsCm: 1000, temperatureC: 20, model })).toThrow(
    InvalidInputError,
  );
});

describe('the stage 1 table', () => {
  it('is read down and never interpolated: 1.1 at 23 degC, not 1.22', () => {
    expect(stageOneLimit(23)).toBe(1.1);
    expect(meetsStageOne({ conductivityUsCm: 1.2, temperatureC: 23 })).toEqual({
      limitUsCm: 1.1,
      isMet: false,
    });
  });

  it('is for uncompensated values', () => {
    expect(() => meetsStageOne({ conductivityUsCm: 1, temperatureC: 23, isCompensated: true })).toThrow(
      RefusedModelError,
    );
  });

  it('ends at 0 and 100 degC', () => {
    expect(stageOneLimit(100)).toBe(3.1);
    for (const t of [-0.1, 100.1, NaN]) expect(() => stageOneLimit(t)).toThrow(OutOfDomainError);
  });
});
