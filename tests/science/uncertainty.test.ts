import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { InconsistentInputError, OutOfDomainError } from '../../shared/science/errors.ts';
import { combineUncertainty, coverageDegreesOfFreedom } from '../../shared/science/uncertainty.ts';
import type { UncertaintyComponent } from '../../shared/science/uncertainty.ts';

const component: fc.Arbitrary<UncertaintyComponent> = fc.record({
  name: fc.string(),
  // Eighths: wide enough, and far from the smallest doubles, where any product loses its digits.
  value: fc.integer({ min: 0, max: 8000 }).map((n) => n / 8),
  distribution: fc.constantFrom('normal', 'rectangular', 'triangular'),
  sensitivity: fc.integer({ min: -80, max: 80 }).map((n) => n / 8),
  degreesOfFreedom: fc.oneof(fc.double({ min: 1, max: 500, noNaN: true }), fc.constant(Infinity)),
});
const components = fc.array(component, { minLength: 1, maxLength: 8 });

describe('few readings', () => {
  const result = combineUncertainty({
    components: [
      { name: 'mean of five readings', value: 0.2, distribution: 'normal', degreesOfFreedom: 4 },
      { name: 'limits', value: 0.1, distribution: 'rectangular' },
    ],
  });

  test('4.69 effective degrees of freedom are read at 4: U is 0.578', () => {
    expect(result.standard).toBeCloseTo(0.20817, 5);
    expect(result.effectiveDegreesOfFreedom).toBeCloseTo(4.69, 2);
    expect(result.coverageFactor).toBeCloseTo(2.776, 3);
    expect(result.expanded).toBeCloseTo(0.578, 3);
  });

  test('k = 2 regardless would understate U by 28 %', () => {
    expect((2 * result.standard) / result.expanded).toBeCloseTo(0.72, 2);
  });
});

describe('what is stated is not yet a standard uncertainty', () => {
  const one = (stated: Omit<UncertaintyComponent, 'name'>) =>
    combineUncertainty({ components: [{ name: 'x', ...stated }] }).standard;

  test("a certificate's U is divided by its own k, not by 2 out of habit", () => {
    expect(one({ value: 0.75, divisor: 3, distribution: 'normal' })).toBeCloseTo(0.25, 14);
  });

  test('a thermometer good to 0.05 K enters as 0.056 % of a solution of 1.944 %/K, as large as the standard itself', () => {
    expect(one({ value: 0.05, distribution: 'rectangular', sensitivity: 1.944 })).toBeCloseTo(0.0561, 4);
  });

  test('a resolution r enters as r/(2 root 3)', () => {
    expect(one({ value: 1 / 2, distribution: 'rectangular' })).toBeCloseTo(1 / (2 * Math.sqrt(3)), 14);
  });
});

describe('typical budgets of field comparisons (common practice), % of value, expanded with k = 2', () => {
  test.each([
    ['1408 µS/cm in a beaker', [0.25, 0.19, 0.11, 0.09, 0.02, 0.12, 0.02, 0.12], 0.77, 0.03],
    ['100 µS/cm in a beaker', [0.5, 0.19, 0.11, 0.18, 0.03, 0.29, 0.32, 0.29], 1.55, 0.03],
    ['12.8 mS/cm, inductive', [0.25, 0.19, 0.22, 0.13, 0.02, 0.06, 0.12, 0.29], 1.03, 0.03],
    ['about 1 µS/cm in line', [1.0, 0.52, 0.3, 0.22, 0.03, 0.29], 2.5, 0.06],
  ])('%s', (_, terms, expanded, slack) => {
    const result = combineUncertainty({
      components: terms.map((value, index) => ({ name: `term ${index}`, value, distribution: 'normal' })),
      coverageProbability: 0.9545,
    });
    // The terms carry two decimals, and so does U; the last U carries one.
    expect(Math.abs(result.expanded - expanded)).toBeLessThan(slack);
  });
});

describe('properties', () => {
  test('never negative, never NaN, and never less than the largest contribution', () => {
    fc.assert(
      fc.property(components, (list) => {
        const result = combineUncertainty({ components: list });
        const largest = Math.max(...result.budget.map((row) => row.contribution));
        expect(result.standard).toBeGreaterThanOrEqual(largest * (1 - 1e-12));
        expect(result.expanded).toBeGreaterThanOrEqual(0);
        expect(Number.isNaN(result.effectiveDegreesOfFreedom)).toBe(false);
      }),
    );
  });

  test('shares add up to 1, or to 0 when nothing contributes', () => {
    fc.assert(
      fc.property(components, (list) => {
        const result = combineUncertainty({ components: list });
        const total = result.budget.reduce((sum, row) => sum + row.share, 0);
        expect(total).toBeCloseTo(result.standard > 0 ? 1 : 0, 10);
      }),
    );
  });

  test('the same budget in another unit gives the same uncertainty in that unit and the same degrees of freedom', () => {
    fc.assert(
      fc.property(components, fc.constantFrom(1e-200, 1e-6, 1e-2, 10, 1e4, 1e150), (list, factor) => {
        const here = combineUncertainty({ components: list });
        const there = combineUncertainty({
          components: list.map((item) => ({ ...item, sensitivity: (item.sensitivity ?? 1) * factor })),
        });
        expect(there.standard / factor).toBeCloseTo(here.standard, 8);
        expect(1 / there.effectiveDegreesOfFreedom).toBeCloseTo(1 / here.effectiveDegreesOfFreedom, 12);
      }),
    );
  });

  test('one more component never makes the standard uncertainty smaller', () => {
    fc.assert(
      fc.property(components, component, (list, extra) => {
        const before = combineUncertainty({ components: list }).standard;
        const after = combineUncertainty({ components: [...list, extra] }).standard;
        expect(after).toBeGreaterThanOrEqual(before * (1 - 1e-12));
      }),
    );
  });

  test('the effective degrees of freedom lie between the fewest of one component and the sum of all', () => {
    fc.assert(
      fc.property(components, (list) => {
        const freedoms = list.map((item) => item.degreesOfFreedom ?? Infinity);
        const { effectiveDegreesOfFreedom } = combineUncertainty({ components: list });
        expect(effectiveDegreesOfFreedom).toBeGreaterThanOrEqual(Math.min(...freedoms) * (1 - 1e-9));
        const { standard } = combineUncertainty({ components: list });
        if (standard === 0) return;
        expect(effectiveDegreesOfFreedom).toBeLessThanOrEqual(
          freedoms.reduce((a, b) => a + b, 0) * (1 + 1e-9),
        );
      }),
    );
  });

  test('the mean of more readings is known better', () => {
    const meanOf = (n: number) =>
      combineUncertainty({
        components: [
          { name: 'mean', value: 1 / Math.sqrt(n), distribution: 'normal', degreesOfFreedom: n - 1 },
        ],
      }).expanded;
    for (let n = 2; n < 60; n += 1) expect(meanOf(n + 1)).toBeLessThan(meanOf(n));
  });
});

describe('limits', () => {
  test('components that are all zero give zero, with a k and no NaN', () => {
    const result = combineUncertainty({ components: [{ name: 'x', value: 0, distribution: 'normal' }] });
    expect(result).toMatchObject({ standard: 0, expanded: 0, effectiveDegreesOfFreedom: Infinity });
    expect(result.coverageFactor).toBeCloseTo(1.96, 2);
    expect(result.budget[0]?.share).toBe(0);
  });

  test('degrees of freedom are rounded to one decimal, then truncated, and never below 1', () => {
    expect([18.9987, 18.94, 4.69, 1, 0.99, Infinity].map(coverageDegreesOfFreedom)).toEqual([
      19,
      18,
      4,
      1,
      1,
      Infinity,
    ]);
  });

  test.each<[string, Partial<UncertaintyComponent>]>([
    ['a negative value', { value: -0.1 }],
    ['a value that is not a number', { value: NaN }],
    ['an infinite value', { value: Infinity }],
    ['a divisor of 0', { divisor: 0 }],
    ['an infinite sensitivity', { sensitivity: Infinity }],
    ['less than one degree of freedom', { degreesOfFreedom: 0 }],
    ['degrees of freedom that are not a number', { degreesOfFreedom: NaN }],
  ])('%s is refused and the refusal names the component', (_, part) => {
    const call = () =>
      combineUncertainty({
        components: [{ name: 'thermometer', value: 1, distribution: 'normal', ...part }],
      });
    expect(call).toThrow(OutOfDomainError);
    expect(call).toThrow(/thermometer/);
  });

  test('a distribution that is not known is refused', () => {
    const component = { name: 'x', value: 1, distribution: 'arcsine' } as unknown as UncertaintyComponent;
    expect(() => combineUncertainty({ components: [component] })).toThrow(OutOfDomainError);
  });

  test('an empty budget is refused: it is not the same as no uncertainty', () => {
    expect(() => combineUncertainty({ components: [] })).toThrow(InconsistentInputError);
  });

  test('95 for 95 % is refused', () => {
    const components: UncertaintyComponent[] = [{ name: 'x', value: 1, distribution: 'normal' }];
    expect(() => combineUncertainty({ components, coverageProbability: 95 })).toThrow(OutOfDomainError);
  });
});
