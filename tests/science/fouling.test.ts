import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { OutOfDomainError } from '../../shared/science/errors.ts';
import {
  adjustmentGuard,
  changeScore,
  secondPointAgreement,
  splitFouling,
} from '../../shared/science/fouling.ts';

const at = (error: number, standardUncertainty = 0.4) => ({ error, standardUncertainty });

describe('a probe found 2.4 % low that cleaning brings to 0.5 % low', () => {
  const visit = {
    uncleaned: at(-2.4),
    cleaned: at(-0.5),
    asLeft: at(0.1),
    correlation: 0.9,
    lastVisit: { asLeft: at(-0.1), days: 90 },
  };
  const split = splitFouling(visit);

  test('four fifths of it was dirt: -1.9 % by fouling, -0.4 % by drift, +0.6 % by adjusting', () => {
    expect(split.fouling.change).toBeCloseTo(-1.9, 12);
    expect(split.drift?.change).toBeCloseTo(-0.4, 12);
    expect(split.adjustment.change).toBeCloseTo(0.6, 12);
  });

  test('the bottle and the thermometer of one visit cancel in the fouling, and its uncertainty shows it', () => {
    expect(split.fouling.standardUncertainty).toBeCloseTo(0.4 * Math.sqrt(0.2), 12);
    expect(split.fouling.isSignificant).toBe(true);
    expect(splitFouling({ ...visit, correlation: 0 }).fouling.standardUncertainty).toBeCloseTo(
      0.4 * Math.SQRT2,
      12,
    );
  });

  test('the drift between the visits is within its noise; blaming the whole error on it would not have been', () => {
    expect(split.drift?.isSignificant).toBe(false);
    const blamed = splitFouling({ ...visit, cleaned: visit.uncleaned });
    expect(blamed.drift?.isSignificant).toBe(true);
  });

  test('the drift per day is its change over the days', () => {
    expect(split.drift?.ratePerDay).toBeCloseTo(-0.4 / 90, 12);
  });

  test('without an earlier visit nothing is said about drift', () => {
    const { uncleaned, cleaned, asLeft } = visit;
    expect(splitFouling({ uncleaned, cleaned, asLeft }).drift).toBeNull();
  });
});

describe('fouling seen in the running process', () => {
  test('what the water itself changed while the probe was out is taken off, with its uncertainty', () => {
    const base = { uncleaned: at(-3), cleaned: at(0), asLeft: at(0), correlation: 1 };
    const split = splitFouling({ ...base, waterChange: { change: -1, standardUncertainty: 0.3 } });
    expect(split.fouling.change).toBeCloseTo(-2, 12);
    expect(split.fouling.standardUncertainty).toBeCloseTo(0.3, 12);
  });
});

test('the parts add up: last as-left, drift and fouling give the error found; adjustment gives the error left', () => {
  const error = fc.double({ min: -10, max: 10, noNaN: true });
  fc.assert(
    fc.property(error, error, error, error, (before, uncleaned, cleaned, left) => {
      const split = splitFouling({
        uncleaned: at(uncleaned),
        cleaned: at(cleaned),
        asLeft: at(left),
        lastVisit: { asLeft: at(before), days: 30 },
      });
      expect(before + (split.drift?.change ?? NaN) + split.fouling.change).toBeCloseTo(uncleaned, 10);
      expect(cleaned + split.adjustment.change).toBeCloseTo(left, 10);
      expect(split.fouling.standardUncertainty).toBeGreaterThanOrEqual(0);
    }),
  );
});

describe('E_n of a change', () => {
  const point = (error: number, expandedUncertainty: number) => ({ error, expandedUncertainty });

  test('0.34 % against two uncertainties of 0.8 % scores 0.3', () => {
    expect(changeScore({ first: point(0.1, 0.8), second: point(0.44, 0.8) })).toBeCloseTo(0.3, 2);
  });

  test('it does not depend on the order or on the unit', () => {
    const value = fc.double({ min: -5, max: 5, noNaN: true });
    const u = fc.double({ min: 0.01, max: 3, noNaN: true });
    fc.assert(
      fc.property(value, value, u, u, (a, b, ua, ub) => {
        const score = changeScore({ first: point(a, ua), second: point(b, ub) });
        expect(changeScore({ first: point(b, ub), second: point(a, ua) })).toBeCloseTo(score, 10);
        const scaled = changeScore({
          first: point(a * 14.08, ua * 14.08),
          second: point(b * 14.08, ub * 14.08),
        });
        expect(scaled).toBeCloseTo(score, 7);
      }),
    );
  });

  test('no change scores 0 even without uncertainty, and any change then scores without limit', () => {
    expect(changeScore({ first: point(1, 0), second: point(1, 0) })).toBe(0);
    expect(changeScore({ first: point(1, 0), second: point(1.1, 0) })).toBe(Infinity);
  });
});

describe('over-adjustment guard', () => {
  const guard = (now: number, acceptanceLimit = 2.2) =>
    adjustmentGuard({
      asLeftBefore: { error: 0.1, expandedUncertainty: 0.8 },
      cleanedNow: { error: now, expandedUncertainty: 0.8 },
      acceptanceLimit,
    });

  test('a change that the comparison cannot tell from noise is left alone', () => {
    expect(guard(0.44)).toMatchObject({ advice: 'leave', reason: 'not-significant' });
  });

  test('a change beyond its uncertainty may be adjusted', () => {
    expect(guard(1.4)).toMatchObject({ advice: 'adjust', reason: 'significant' });
  });

  test('an error beyond its acceptance limit is adjusted even when it has not changed', () => {
    const stuck = adjustmentGuard({
      asLeftBefore: { error: 2.3, expandedUncertainty: 0.8 },
      cleanedNow: { error: 2.4, expandedUncertainty: 0.8 },
      acceptanceLimit: 2.2,
    });
    expect(stuck).toMatchObject({ advice: 'adjust', reason: 'beyond-acceptance' });
  });

  test('chasing every visit puts the noise of the comparison into a probe that never drifted', () => {
    // Noise of twelve comparisons of a steady probe, fixed numbers with standard deviation about 0.4.
    const noise = [0.31, -0.52, 0.12, 0.44, -0.28, -0.61, 0.39, 0.05, -0.33, 0.58, -0.17, 0.22];
    let [chased, guarded] = [0, 0];
    const errorsOf = { chased: [] as number[], guarded: [] as number[] };
    for (const seen of noise) {
      chased -= chased + seen;
      const now = { error: guarded + seen, expandedUncertainty: 0.8 };
      const { advice } = adjustmentGuard({
        asLeftBefore: { error: guarded, expandedUncertainty: 0.8 },
        cleanedNow: now,
        acceptanceLimit: 2.2,
      });
      if (advice === 'adjust') guarded -= now.error;
      errorsOf.chased.push(chased);
      errorsOf.guarded.push(guarded);
    }
    const rms = (list: number[]) => Math.sqrt(list.reduce((sum, value) => sum + value ** 2, 0) / list.length);
    expect(rms(errorsOf.guarded)).toBe(0);
    expect(rms(errorsOf.chased)).toBeGreaterThan(0.3);
  });
});

describe('second point', () => {
  const cell = (cellConstantPerCm: number, relativeUncertainty: number) => ({
    cellConstantPerCm,
    relativeUncertainty,
  });

  test('half a per cent apart with 0.3 % and 0.4 % agrees', () => {
    const agreement = secondPointAgreement({ first: cell(1, 0.003), second: cell(1.005, 0.004) });
    expect(agreement.score).toBeCloseTo(0.5, 10);
    expect(agreement.agrees).toBe(true);
  });

  test('0.64 % from half an ohm of uncorrected leads is found when both points are known to 0.1 %', () => {
    // 12.8246 mS/cm, 78.4 ohm: 0.99904 corrected, 1.00545 not.
    const found = secondPointAgreement({ first: cell(0.99904, 0.001), second: cell(1.00545, 0.001) });
    expect(found.relativeDifference).toBeCloseTo(0.0064, 4);
    expect(found.agrees).toBe(false);
  });
});

test.each<[string, () => unknown]>([
  [
    'an error that is not a number',
    () => splitFouling({ uncleaned: at(NaN), cleaned: at(0), asLeft: at(0) }),
  ],
  ['a negative uncertainty', () => splitFouling({ uncleaned: at(0, -1), cleaned: at(0), asLeft: at(0) })],
  [
    'a correlation of 2',
    () => splitFouling({ uncleaned: at(0), cleaned: at(0), asLeft: at(0), correlation: 2 }),
  ],
  [
    'a cell constant of 0',
    () =>
      secondPointAgreement({
        first: { cellConstantPerCm: 0, relativeUncertainty: 0.1 },
        second: { cellConstantPerCm: 1, relativeUncertainty: 0.1 },
      }),
  ],
])('%s is refused', (_, call) => {
  expect(call).toThrow(OutOfDomainError);
});
