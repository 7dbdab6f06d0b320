import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { cubicSpline, evaluateSpline } from '../../shared/science/cubic-spline.ts';
import { InconsistentInputError, OutOfDomainError } from '../../shared/science/errors.ts';

describe('cubic spline', () => {
  const coefficient = fc.double({ min: -5, max: 5, noNaN: true });

  it('is the cubic itself when the rows lie on one, with its slope', () => {
    fc.assert(
      fc.property(
        coefficient,
        coefficient,
        coefficient,
        coefficient,
        fc.double({ min: 0, max: 10, noNaN: true }),
        (a, b, c, d, at) => {
          const f = (x: number) => a + b * x + c * x ** 2 + d * x ** 3;
          const x = [0, 1, 2.5, 4, 7, 10];
          const { value, slope } = evaluateSpline(cubicSpline(x, x.map(f)), at);
          // Values reach 5500: 1e-9 is rounding.
          expect(Math.abs(value - f(at))).toBeLessThan(1e-9);
          expect(Math.abs(slope - (b + 2 * c * at + 3 * d * at ** 2))).toBeLessThan(1e-9);
        },
      ),
    );
  });

  it('is exact at every row, the last one included', () => {
    const x = [0, 5, 10, 15, 18, 20, 25];
    const y = [772.92, 890.96, 1013.95, 1141.45, 1219.93, 1273.03, 1408.23];
    const spline = cubicSpline(x, y);
    x.forEach((at, index) => expect(evaluateSpline(spline, at).value).toBe(y[index]));
  });

  it('is a straight line through two rows and a parabola through three', () => {
    expect(evaluateSpline(cubicSpline([0, 2], [1, 5]), 0.5)).toEqual({ value: 2, slope: 2 });
    expect(evaluateSpline(cubicSpline([0, 1, 3], [0, 1, 9]), 2).value).toBeCloseTo(4, 12);
  });

  it('never extrapolates and never accepts rows out of order', () => {
    const spline = cubicSpline([0, 1, 2, 3], [0, 1, 4, 9]);
    for (const at of [-1e-9, 3.000001, NaN, Infinity])
      expect(() => evaluateSpline(spline, at)).toThrow(OutOfDomainError);
    expect(() => cubicSpline([0, 2, 1], [0, 1, 2])).toThrow(InconsistentInputError);
    expect(() => cubicSpline([0, 1, 1], [0, 1, 2])).toThrow(InconsistentInputError);
    expect(() => cubicSpline([0], [0])).toThrow(InconsistentInputError);
    expect(() => cubicSpline([0, 1], [0])).toThrow(InconsistentInputError);
    expect(() => cubicSpline([0, 1], [0, NaN])).toThrow(OutOfDomainError);
  });
});
