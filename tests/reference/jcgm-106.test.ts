/**
 * Sources: JCGM 106:2012, The role of measurement uncertainty in conformity assessment; ILAC-G8:09/2019 for the decision rules.
 * Provenance: published rules; the two numerical examples of JCGM 106 chapter 7 are from memory, confidence high; the rest are worked
 * examples computed from the same formulas.
 */
import { describe, expect, test } from 'vitest';
import {
  assessMethod,
  decide,
  probabilityAboveLimit,
  probabilityOutside,
} from '../../shared/science/decision.ts';

describe('JCGM 106, chapter 7', () => {
  test('one-sided: a Zener diode measured at -5.47 V (u 0.05 V) conforms to "at most -5.40 V" with 0.92', () => {
    const above = probabilityAboveLimit({ value: -5.47, standardUncertainty: 0.05, limit: -5.4 });
    expect(1 - above).toBeCloseTo(0.92, 2);
  });

  test('two-sided: an oil of 13.6 mm²/s (u 1.8) lies between 12.5 and 16.3 with 0.66', () => {
    const middle = (12.5 + 16.3) / 2;
    const outside = probabilityOutside({
      error: 13.6 - middle,
      standardUncertainty: 1.8,
      tolerance: (16.3 - 12.5) / 2,
    });
    expect(1 - outside).toBeCloseTo(0.66, 2);
  });
});

describe('a reference value of 1413 µS/cm with a tolerance of 20 and u = 5', () => {
  const at = (indicated: number, rule: 'simple' | 'guarded-u') =>
    decide({ error: indicated - 1413, expandedUncertainty: 10, coverageFactor: 2, tolerance: 20, rule });

  test('1430 conforms with 0.7257, and is within but too close to be sure', () => {
    const decision = at(1430, 'guarded-u');
    expect(1 - decision.probabilityOutside).toBeCloseTo(0.7257, 4);
    expect(decision.outcome).toBe('within-unsure');
    expect(decision.acceptanceLimit).toBe(10);
  });

  test('1421 conforms with 0.9918, and is clearly within', () => {
    const decision = at(1421, 'guarded-u');
    expect(1 - decision.probabilityOutside).toBeCloseTo(0.9918, 4);
    expect(decision.outcome).toBe('within-clear');
  });

  test('the same 1430 is within under simple acceptance: the rule has to be kept with the outcome', () => {
    expect(at(1430, 'simple').outcome).toBe('within-clear');
    expect(at(1430, 'guarded-u').outcome).toBe('within-unsure');
  });
});

describe('tolerance 3 %, U = 0.77 % (k = 2)', () => {
  test.each([
    // error, probability outside: printed to two figures
    [2.23, 0.023, 0.0005],
    [2.4, 0.06, 0.005],
    [2.6, 0.15, 0.005],
    [3.0, 0.5, 0.0005],
  ])('an error of %d %% lies outside with %d', (error, probability, half) => {
    const { probabilityOutside: outside } = decide({
      error,
      expandedUncertainty: 0.77,
      coverageFactor: 2,
      tolerance: 3,
      rule: 'guarded-u',
    });
    expect(Math.abs(outside - probability)).toBeLessThan(half);
  });
});

describe('the risk that each guard band leaves', () => {
  const riskAtLimit = (rule: 'simple' | 'guarded-u' | 'guarded-0.83u') =>
    assessMethod({ expandedUncertainty: 0.4, tolerance: 3, rule }).probabilityOutsideAtLimit;

  test('simple acceptance: up to one half', () => expect(riskAtLimit('simple')).toBeCloseTo(0.5, 10));
  test('a guard band of U: at most 2.5 %', () => expect(riskAtLimit('guarded-u')).toBeLessThan(0.025));
  test('a guard band of 0.83 U: at most 5 %', () => {
    expect(riskAtLimit('guarded-0.83u')).toBeLessThan(0.05);
    expect(riskAtLimit('guarded-0.83u')).toBeGreaterThan(0.045);
  });
});
