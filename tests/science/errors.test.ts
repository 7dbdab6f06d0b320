import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  InconsistentInputError,
  OutOfDomainError,
  RefusedModelError,
  requireCount,
  requireFinite,
  requireNonNegative,
  requirePositive,
  requireWithin,
} from '../../shared/science/errors.ts';

const caught = (action: () => unknown): unknown => {
  try {
    action();
  } catch (error) {
    return error;
  }
  return null;
};

describe('refusals of the science', () => {
  it('say what, how much, which limits and what to do', () => {
    const error = caught(() => requireWithin('temperature', 61, '°C', 0, 50, 'Cool the solution.'));
    expect(error).toBeInstanceOf(OutOfDomainError);
    expect(error).toMatchObject({
      code: 'science.out-of-domain',
      quantity: 'temperature',
      value: 61,
      unit: '°C',
      lower: 0,
      upper: 50,
      message: 'temperature is 61 °C; it must be from 0 to 50 °C. Cool the solution.',
    });
  });

  it('name the model and the reason when a model does not fit', () => {
    expect(
      new RefusedModelError({ model: 'The law', reason: 'ions pair', advice: 'Measure.' }),
    ).toMatchObject({
      code: 'science.refused-model',
      message: 'The law does not apply: ions pair. Measure.',
    });
    expect(new InconsistentInputError({ quantity: 'Table', reason: 'rows fall' }).message).toBe(
      'Table: rows fall.',
    );
  });

  it('take both ends of a range as belonging to it', () => {
    expect(requireWithin('x', 0, '', 0, 1)).toBe(0);
    expect(requireWithin('x', 1, '', 0, 1)).toBe(1);
  });

  it('never let a value through that is not a number', () => {
    for (const value of [NaN, Infinity, -Infinity]) {
      expect(() => requireFinite('x', value, '')).toThrow(OutOfDomainError);
      expect(() => requireWithin('x', value, '', -1e300, 1e300)).toThrow(OutOfDomainError);
      expect(() => requirePositive('x', value, '')).toThrow(OutOfDomainError);
      expect(() => requireNonNegative('x', value, '')).toThrow(OutOfDomainError);
      expect(() => requireCount('x', value, 1)).toThrow(OutOfDomainError);
    }
  });

  it('return exactly what they let through', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-300, max: 1e300, noNaN: true }), (value) => {
        expect(requirePositive('x', value, '')).toBe(value);
        expect(requireNonNegative('x', value, '')).toBe(value);
        expect(requireFinite('x', value, '')).toBe(value);
      }),
    );
    expect(() => requirePositive('x', 0, '')).toThrow(OutOfDomainError);
    expect(() => requireNonNegative('x', -1e-300, '')).toThrow(OutOfDomainError);
    expect(() => requireCount('x', 2.5, 1)).toThrow(OutOfDomainError);
  });
});
