import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  DECISION_OUTCOMES,
  DECISION_RULES,
  assessMethod,
  decide,
  probabilityAboveLimit,
  probabilityOutside,
} from '../../shared/science/decision.ts';
import type { DecisionRule } from '../../shared/science/decision.ts';
import { InconsistentInputError, OutOfDomainError } from '../../shared/science/errors.ts';

const outcomeOf = (error: number, rule: DecisionRule, expandedUncertainty = 1) =>
  decide({ error, expandedUncertainty, coverageFactor: 2, tolerance: 3, rule }).outcome;

describe('outcomes at tolerance 3 and U 1', () => {
  test.each([
    ['guarded-u', 2, 'within-clear'],
    ['guarded-u', 2.001, 'within-unsure'],
    ['guarded-u', 3, 'within-unsure'],
    ['guarded-u', 3.001, 'outside-unsure'],
    ['guarded-u', 4, 'outside-unsure'],
    ['guarded-u', 4.001, 'outside-clear'],
    ['guarded-0.83u', 2.17, 'within-clear'],
    ['guarded-0.83u', 2.18, 'within-unsure'],
    ['guarded-0.83u', 3.83, 'outside-unsure'],
    ['guarded-0.83u', 3.84, 'outside-clear'],
    ['simple', 3, 'within-clear'],
    ['simple', 3.001, 'outside-clear'],
  ] as const)('%s, error %d: %s', (rule, error, outcome) => {
    expect(outcomeOf(error, rule)).toBe(outcome);
    expect(outcomeOf(-error, rule)).toBe(outcome);
  });

  test('the guard band may exceed the tolerance: then nothing is clearly within, not even no error', () => {
    const decision = decide({
      error: 0,
      expandedUncertainty: 5,
      coverageFactor: 2,
      tolerance: 3,
      rule: 'guarded-u',
    });
    expect(decision).toMatchObject({ outcome: 'within-unsure', acceptanceLimit: -2 });
  });
});

describe('both sides count', () => {
  test('with U as large as the tolerance, an error of 0 lies outside with 4.55 %, not 2.28 %', () => {
    const { probabilityOutside: outside } = decide({
      error: 0,
      expandedUncertainty: 3,
      coverageFactor: 2,
      tolerance: 3,
      rule: 'simple',
    });
    expect(outside).toBeCloseTo(0.0455, 4);
  });

  test('a very small risk keeps its digits instead of vanishing in 1 minus 1', () => {
    const outside = probabilityOutside({ error: 0, standardUncertainty: 0.3, tolerance: 3 });
    // Two tails of ten standard deviations: 2 x 7.6199e-24.
    expect(outside / 1.52397e-23).toBeCloseTo(1, 4);
  });
});

describe('properties', () => {
  const errors = fc.double({ min: -20, max: 20, noNaN: true });
  const uncertainties = fc.double({ min: 0, max: 10, noNaN: true });
  const tolerances = fc.double({ min: 1e-3, max: 10, noNaN: true });
  const rules = fc.constantFrom(...DECISION_RULES);

  test('an error farther out is never judged better and never less likely outside', () => {
    fc.assert(
      fc.property(errors, uncertainties, tolerances, rules, (error, U, tolerance, rule) => {
        const at = (value: number) =>
          decide({ error: value, expandedUncertainty: U, coverageFactor: 2, tolerance, rule });
        const [near, far] = [at(error), at(error * 1.25)];
        expect(DECISION_OUTCOMES.indexOf(far.outcome)).toBeGreaterThanOrEqual(
          DECISION_OUTCOMES.indexOf(near.outcome),
        );
        expect(far.probabilityOutside).toBeGreaterThanOrEqual(near.probabilityOutside - 1e-12);
      }),
    );
  });

  test('the probability stays between 0 and 1 and does not depend on the sign of the error', () => {
    fc.assert(
      fc.property(errors, uncertainties, tolerances, (error, standardUncertainty, tolerance) => {
        const outside = probabilityOutside({ error, standardUncertainty, tolerance });
        expect(outside >= 0 && outside <= 1).toBe(true);
        expect(probabilityOutside({ error: -error, standardUncertainty, tolerance })).toBeCloseTo(
          outside,
          14,
        );
      }),
    );
  });

  test('no unit turns the decision: in µS/cm, mS/cm or parts per million it is the same', () => {
    const tenths = fc.integer({ min: -100, max: 100 });
    fc.assert(
      fc.property(tenths, tenths, rules, fc.constantFrom(1e-3, 0.1, 7, 1e4), (error, U, rule, unit) => {
        // Steps of a tenth land on the limits themselves, where rounding would show.
        const at = (scale: number) =>
          decide({
            error: (error / 10) * scale,
            expandedUncertainty: Math.abs(U / 10) * scale,
            coverageFactor: 2,
            tolerance: 3 * scale,
            rule,
          });
        expect(at(unit).outcome).toBe(at(1).outcome);
        expect(at(unit).probabilityOutside).toBeCloseTo(at(1).probabilityOutside, 10);
      }),
    );
  });
});

test('a result that sits on a limit stays there in every unit, though its digits round differently', () => {
  for (let tenths = 1; tenths < 30; tenths += 1) {
    for (const unit of [1, 1e-3, 0.1, 7, 1e4]) {
      const at = (error: number) =>
        decide({
          error: error * unit,
          expandedUncertainty: ((30 - tenths) / 10) * unit,
          coverageFactor: 2,
          tolerance: 3 * unit,
          rule: 'guarded-u',
        }).outcome;
      expect(at(tenths / 10)).toBe('within-clear');
      expect(at(tenths / 10 + 1e-6)).toBe('within-unsure');
    }
  }
});

describe('without uncertainty', () => {
  test('the limit itself is within, and beyond it the probability is 1', () => {
    expect(probabilityOutside({ error: 3, standardUncertainty: 0, tolerance: 3 })).toBe(0);
    expect(probabilityOutside({ error: -3.01, standardUncertainty: 0, tolerance: 3 })).toBe(1);
  });
});

describe('before travelling', () => {
  test('a method with U of 0.77 % decides 3 %, with room 3.9', () => {
    const method = assessMethod({ expandedUncertainty: 0.77, tolerance: 3, rule: 'guarded-u' });
    expect(method).toMatchObject({ canDecideWithin: true, acceptanceLimit: 2.23 });
    expect(method.toleranceToUncertainty).toBeCloseTo(3.9, 2);
  });

  test('a method with U of 2.5 % cannot decide 2 %', () => {
    expect(assessMethod({ expandedUncertainty: 2.5, tolerance: 2, rule: 'guarded-u' }).canDecideWithin).toBe(
      false,
    );
  });
});

describe('a live reading against a process limit', () => {
  test('at the limit it is as likely above as below', () => {
    expect(probabilityAboveLimit({ value: 100, standardUncertainty: 2, limit: 100 })).toBe(0.5);
  });
  test('without uncertainty the limit itself is not above', () => {
    expect(probabilityAboveLimit({ value: 100, standardUncertainty: 0, limit: 100 })).toBe(0);
    expect(probabilityAboveLimit({ value: 100.1, standardUncertainty: 0, limit: 100 })).toBe(1);
  });
});

const valid = {
  error: 1,
  expandedUncertainty: 1,
  coverageFactor: 2,
  tolerance: 3,
  rule: 'simple' as DecisionRule,
};
test.each([
  ['an error that is not a number', { error: NaN }],
  ['a negative uncertainty', { expandedUncertainty: -1 }],
  ['an infinite uncertainty', { expandedUncertainty: Infinity }],
  ['a coverage factor of 0', { coverageFactor: 0 }],
  ['a tolerance of 0', { tolerance: 0 }],
  ['a tolerance that is not a number', { tolerance: NaN }],
])('%s is refused', (_, part) => {
  expect(() => decide({ ...valid, ...part })).toThrow(OutOfDomainError);
});

test('a rule that is not known is refused and the known ones are named', () => {
  const call = () => decide({ ...valid, rule: 'shared-risk' as DecisionRule });
  expect(call).toThrow(InconsistentInputError);
  expect(call).toThrow(/guarded-u/);
});
