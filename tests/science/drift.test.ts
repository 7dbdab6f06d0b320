import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { driftRate, driftStep, forecastDue, probabilityInTolerance } from '../../shared/science/drift.ts';
import type { DriftSegment, ErrorForecast } from '../../shared/science/drift.ts';
import { driftRateWithPrior, pooledDriftPrior } from '../../shared/science/drift-prior.ts';
import { dueForecast } from '../../shared/science/due-forecast.ts';
import { InconsistentInputError, OutOfDomainError } from '../../shared/science/errors.ts';
import { fitLine } from '../../shared/science/regression.ts';

const segment = (part: Partial<DriftSegment> = {}): DriftSegment => ({
  days: 90,
  asLeftError: 0,
  asFoundError: 0.5,
  uAsLeft: 0.4,
  uAsFound: 0.4,
  ...part,
});

describe('a probe that drifts -0.35 % in 90 days and is adjusted whenever it reaches -1.05 %', () => {
  const perYear = 365.25;
  /** Nine visits: error as found, then error as left. */
  const found = [0, -0.35, -0.7, -1.05, -0.35, -0.7, -1.05, -0.35, -0.7];
  const left = found.map((error) => (error === -1.05 ? 0 : error));

  test('steps from as-left to as-found give the true -1.420 % a year', () => {
    const segments = found
      .slice(1)
      .map((asFoundError, index) =>
        segment({ asLeftError: left[index]!, asFoundError, uAsLeft: 0.2, uAsFound: 0.2 }),
      );
    const rate = driftRate({ segments });
    expect(rate.ratePerDay * perYear).toBeCloseTo(-1.42, 3);
    expect(rate.isSignificant).toBe(true);
    expect(rate.chiSquare).toBeCloseTo(0, 12);
  });

  test('a line through the as-found errors alone hides it: -0.213 % a year', () => {
    const line = fitLine({ x: found.map((_, index) => index * 90), y: found });
    expect(line.slope * perYear).toBeCloseTo(-0.213, 3);
  });
});

describe('one step', () => {
  test('the same lot and thermometer at both visits make the step better known', () => {
    const apart = driftStep(segment());
    const alike = driftStep(segment({ correlation: 0.5 }));
    expect(apart.standardUncertainty * 90).toBeCloseTo(0.4 * Math.SQRT2, 12);
    expect(alike.standardUncertainty * 90).toBeCloseTo(0.4, 12);
  });

  test('one step alone is reported with its stated uncertainty, and as consistent with itself', () => {
    const rate = driftRate({ segments: [segment()] });
    expect(rate).toMatchObject({
      chiSquare: 0,
      degreesOfFreedom: 0,
      birgeRatio: 1,
      consistencyProbability: 1,
    });
    expect(rate.standardUncertainty).toBeCloseTo((0.4 * Math.SQRT2) / 90, 12);
  });

  test('0.5 % in one interval with a field uncertainty of 0.4 % is not yet drift', () => {
    expect(driftRate({ segments: [segment()] }).isSignificant).toBe(false);
  });
});

describe('several steps', () => {
  test('about four steps of 0.17 % a month show what no single one does', () => {
    const month = 365.25 / 12;
    // Quarterly visits with u 0.43 % and a shared lot (r 0.3).
    const quarter = { days: 3 * month, asFoundError: 0.51, uAsLeft: 0.43, uAsFound: 0.43, correlation: 0.3 };
    const ratio = (count: number) => {
      const rate = driftRate({ segments: Array.from({ length: count }, () => segment(quarter)) });
      return rate.ratePerDay / rate.standardUncertainty;
    };
    expect(ratio(1)).toBeLessThan(1.1);
    expect(ratio(3)).toBeLessThan(2);
    // Worked example: 1.95 after four, with inputs rounded to two figures.
    expect(Math.abs(ratio(4) - 1.95)).toBeLessThan(0.1);
  });

  test('steps that scatter more than stated widen the answer by the Birge ratio', () => {
    const rate = driftRate({
      segments: [segment({ asFoundError: 3 }), segment({ asFoundError: -3 }), segment({ asFoundError: 0 })],
    });
    expect(rate.birgeRatio).toBeCloseTo(Math.sqrt(rate.chiSquare / 2), 12);
    expect(rate.standardUncertainty).toBeCloseTo(
      ((0.4 * Math.SQRT2) / 90 / Math.sqrt(3)) * rate.birgeRatio,
      12,
    );
    expect(rate.consistencyProbability).toBeLessThan(0.001);
  });

  test('steps that agree by luck never make it narrower than their own uncertainties allow', () => {
    const rate = driftRate({ segments: [segment(), segment(), segment()] });
    expect(rate.birgeRatio).toBe(1);
    expect(rate.standardUncertainty).toBeCloseTo((0.4 * Math.SQRT2) / 90 / Math.sqrt(3), 12);
  });

  test('a long step counts for more than a short one', () => {
    const rate = driftRate({
      segments: [segment({ days: 180, asFoundError: 1.8 }), segment({ days: 18, asFoundError: 0 })],
    });
    expect(rate.ratePerDay).toBeGreaterThan(0.0098);
  });

  const anySegment = fc.record({
    days: fc.double({ min: 1, max: 1000, noNaN: true }),
    asLeftError: fc.double({ min: -5, max: 5, noNaN: true }),
    asFoundError: fc.double({ min: -5, max: 5, noNaN: true }),
    uAsLeft: fc.double({ min: 0.01, max: 3, noNaN: true }),
    uAsFound: fc.double({ min: 0.01, max: 3, noNaN: true }),
    correlation: fc.double({ min: -0.95, max: 0.95, noNaN: true }),
  });
  const segments = fc.array(anySegment, { minLength: 1, maxLength: 10 });

  test('the uncertainty is above 0 and the mean lies among the steps', () => {
    fc.assert(
      fc.property(segments, (list) => {
        const rate = driftRate({ segments: list });
        const rates = rate.steps.map((step) => step.ratePerDay);
        expect(rate.standardUncertainty).toBeGreaterThan(0);
        expect(rate.ratePerDay).toBeGreaterThanOrEqual(Math.min(...rates) - 1e-9);
        expect(rate.ratePerDay).toBeLessThanOrEqual(Math.max(...rates) + 1e-9);
      }),
    );
  });

  test('the unit of the errors scales rate and uncertainty and leaves chi-square alone', () => {
    fc.assert(
      fc.property(segments, fc.constantFrom(1e-6, 0.01, 14.08), (list, unit) => {
        const here = driftRate({ segments: list });
        const there = driftRate({
          segments: list.map((item) => ({
            ...item,
            asLeftError: item.asLeftError * unit,
            asFoundError: item.asFoundError * unit,
            uAsLeft: item.uAsLeft * unit,
            uAsFound: item.uAsFound * unit,
          })),
        });
        expect(there.ratePerDay / unit).toBeCloseTo(here.ratePerDay, 9);
        expect(there.standardUncertainty / unit / here.standardUncertainty).toBeCloseTo(1, 9);
        expect(there.chiSquare / Math.max(1, here.chiSquare)).toBeCloseTo(
          here.chiSquare / Math.max(1, here.chiSquare),
          7,
        );
      }),
    );
  });

  test('the same steps seen again make it better known', () => {
    fc.assert(
      fc.property(anySegment, fc.integer({ min: 1, max: 20 }), (item, count) => {
        const u = (n: number) =>
          driftRate({ segments: Array.from({ length: n }, () => item) }).standardUncertainty;
        expect(u(count + 1)).toBeLessThan(u(count));
      }),
    );
  });
});

describe('similar probes', () => {
  const rates = [0.004, 0.006, 0.0055, 0.0075].map((ratePerDay) => ({
    ratePerDay,
    standardUncertainty: 0.001,
  }));

  test('rates that differ by more than their uncertainties spread the prior', () => {
    const prior = pooledDriftPrior({ rates });
    // By hand: mean 0.00575, Q = 6.25, tau^2 = (6.25 - 3)/3 x 1e-6.
    expect(prior.ratePerDay).toBeCloseTo(0.00575, 12);
    expect(prior.betweenProbeSd).toBeCloseTo(Math.sqrt(3.25 / 3) * 1e-3, 12);
    expect(prior.standardUncertainty).toBeGreaterThan(prior.betweenProbeSd);
  });

  test('rates that agree leave only the uncertainty of their mean', () => {
    const prior = pooledDriftPrior({ rates: rates.map((rate) => ({ ...rate, ratePerDay: 0.005 })) });
    expect(prior.betweenProbeSd).toBe(0);
    expect(prior.standardUncertainty).toBeCloseTo(0.0005, 12);
  });

  const prior = pooledDriftPrior({ rates });

  test('without a history the answer is that of similar probes', () => {
    const rate = driftRateWithPrior({ segments: [], prior });
    expect(rate).toMatchObject({ ratePerDay: prior.ratePerDay, basis: 'similar', priorShare: 1 });
  });

  test('with one or two steps both count, and the answer is better known than either', () => {
    const own = driftRate({ segments: [segment(), segment()] });
    const rate = driftRateWithPrior({ segments: [segment(), segment()], prior });
    expect(rate.basis).toBe('own-and-similar');
    expect(rate.standardUncertainty).toBeLessThan(
      Math.min(own.standardUncertainty, prior.standardUncertainty),
    );
    expect(rate.ratePerDay).toBeGreaterThanOrEqual(Math.min(own.ratePerDay, prior.ratePerDay));
    expect(rate.ratePerDay).toBeLessThanOrEqual(Math.max(own.ratePerDay, prior.ratePerDay));
  });

  test('with three steps the probe speaks for itself', () => {
    const segments = [segment(), segment(), segment()];
    const rate = driftRateWithPrior({ segments, prior });
    expect(rate).toMatchObject({
      basis: 'own',
      priorShare: 0,
      ratePerDay: driftRate({ segments }).ratePerDay,
    });
  });

  test('one probe alone is no group', () => {
    expect(() => pooledDriftPrior({ rates: rates.slice(0, 1) })).toThrow(InconsistentInputError);
  });
});

/** 0.1 % as left (U 0.77 %, k = 2), drifting 0.17 ± 0.09 % in a month of 30 days, tolerance 3 %. */
const worked: ErrorForecast = {
  asLeftError: 0.1,
  uAsLeft: 0.385,
  ratePerDay: 0.17 / 30,
  uRate: 0.09 / 30,
  tolerance: 3,
};

describe('the due day (worked example; its rates are rounded to two figures)', () => {
  test.each([
    [0.95, 261],
    [0.8, 348],
    [0.5, 508],
  ])('at %d it is day %d', (probability, day) => {
    const due = forecastDue({ ...worked, probability, maxDays: 3000 });
    // Half a unit in the last figure of 0.17 moves the day by 3 %; the example keeps within 1 %.
    expect(Math.abs(due / day - 1)).toBeLessThan(0.01);
  });

  test('in tolerance after 180 days with 0.998, after 365 with 0.76', () => {
    expect(probabilityInTolerance({ ...worked, days: 180 })).toBeCloseTo(0.998, 3);
    expect(Math.abs(probabilityInTolerance({ ...worked, days: 365 }) - 0.76)).toBeLessThan(0.005);
  });

  test('the line alone would allow 248 days more than a due day that is 95 % sure', () => {
    const at = (probability: number) => forecastDue({ ...worked, probability, maxDays: 3000 });
    expect(at(0.5) - at(0.95)).toBeGreaterThan(240);
  });

  test('0.1 % rising to 4.1 % in 100 days crosses 3 % on day 72.5', () => {
    const straight = { asLeftError: 0.1, uAsLeft: 0, ratePerDay: 0.04, uRate: 0, tolerance: 3 };
    expect(forecastDue({ ...straight, probability: 0.5, maxDays: 365 })).toBeCloseTo(72.5, 10);
  });
});

describe('the due day in general', () => {
  const forecast = fc.record({
    asLeftError: fc.double({ min: -2.9, max: 2.9, noNaN: true }),
    uAsLeft: fc.double({ min: 0, max: 1, noNaN: true }),
    ratePerDay: fc.double({ min: -0.05, max: 0.05, noNaN: true }),
    uRate: fc.double({ min: 0, max: 0.01, noNaN: true }),
    tolerance: fc.constant(3),
    randomWalkPerDay: fc.double({ min: 0, max: 0.01, noNaN: true }),
  });
  const probability = fc.double({ min: 0.5, max: 0.99, noNaN: true });
  const z: Record<string, number> = { '0.5': 0, '0.8': 0.8416212335729143, '0.95': 1.6448536269514722 };
  const reach = (f: ErrorForecast, days: number, deviate: number) =>
    Math.abs(f.asLeftError + f.ratePerDay * days) +
    deviate * Math.sqrt(f.uAsLeft ** 2 + (days * f.uRate) ** 2 + (f.randomWalkPerDay ?? 0) * days);

  test('the bound is inside the tolerance on every day before, and at it on the day itself', () => {
    fc.assert(
      fc.property(forecast, fc.constantFrom(0.5, 0.8, 0.95), (f, p) => {
        const due = forecastDue({ ...f, probability: p, maxDays: 2000 });
        const deviate = z[String(p)] as number;
        for (let part = 0; part < 40; part += 1) {
          if (due > 0) expect(reach(f, (due * part) / 40, deviate)).toBeLessThan(3 + 1e-6);
        }
        if (due > 0 && due < 2000) expect(reach(f, due, deviate)).toBeCloseTo(3, 5);
      }),
    );
  });

  test('asking to be surer never brings a later day', () => {
    fc.assert(
      fc.property(forecast, probability, probability, (f, p, q) => {
        const at = (value: number) => forecastDue({ ...f, probability: value, maxDays: 2000 });
        expect(at(Math.max(p, q))).toBeLessThanOrEqual(at(Math.min(p, q)) + 1e-6);
      }),
    );
  });

  test('knowing less never brings a later day', () => {
    fc.assert(
      fc.property(forecast, probability, (f, p) => {
        const vague = { ...f, uAsLeft: f.uAsLeft * 1.5, uRate: f.uRate * 1.5 };
        const at = (value: ErrorForecast) => forecastDue({ ...value, probability: p, maxDays: 2000 });
        expect(at(vague)).toBeLessThanOrEqual(at(f) + 1e-6);
      }),
    );
  });

  test('a mirrored probe is due on the same day', () => {
    fc.assert(
      fc.property(forecast, probability, (f, p) => {
        const mirrored = { ...f, asLeftError: -f.asLeftError, ratePerDay: -f.ratePerDay };
        expect(forecastDue({ ...mirrored, probability: p, maxDays: 2000 })).toBeCloseTo(
          forecastDue({ ...f, probability: p, maxDays: 2000 }),
          6,
        );
      }),
    );
  });

  test('a probe that neither drifts nor is in doubt is due at the longest interval', () => {
    const still = { asLeftError: 0, uAsLeft: 0, ratePerDay: 0, uRate: 0, tolerance: 3 };
    expect(forecastDue({ ...still, probability: 0.95, maxDays: 365 })).toBe(365);
  });

  test('a probe already outside, or whose bound is, is due now', () => {
    expect(forecastDue({ ...worked, asLeftError: 3.2, probability: 0.95, maxDays: 365 })).toBe(0);
    expect(forecastDue({ ...worked, asLeftError: 2.6, probability: 0.95, maxDays: 365 })).toBe(0);
  });

  test('the probability in tolerance is a probability on every day', () => {
    fc.assert(
      fc.property(forecast, fc.double({ min: 0, max: 1e5, noNaN: true }), (f, days) => {
        const inside = probabilityInTolerance({ ...f, days });
        expect(inside >= 0 && inside <= 1).toBe(true);
      }),
    );
  });
});

describe('the due day as a distribution', () => {
  const { early, median, late, curve } = dueForecast({ ...worked, maxDays: 1500 });

  test('early, median and late come in that order, and the early day is the 95 % due day', () => {
    expect(early.days).toBeLessThan(median.days);
    expect(median.days).toBeLessThanOrEqual(late.days);
    // One-sided against two-sided: the other side adds next to nothing to a probe that drifts this way.
    expect(early.days).toBeCloseTo(forecastDue({ ...worked, probability: 0.95, maxDays: 1500 }), 3);
  });

  test('on each day the chance is the one it stands for', () => {
    for (const day of [early, median]) {
      expect(1 - probabilityInTolerance({ ...worked, days: day.days })).toBeCloseTo(day.probability, 9);
    }
  });

  test('a late day beyond the horizon says so', () => {
    expect(late).toEqual({ probability: 0.95, days: 1500, isBeyondHorizon: true });
  });

  test('the curve runs from today to the horizon and starts in tolerance', () => {
    expect([curve[0]?.days, curve.at(-1)?.days]).toEqual([0, 1500]);
    expect(curve[0]?.probabilityInTolerance).toBeGreaterThan(0.999);
  });

  test('a probe already outside is due today, early and late', () => {
    const outside = dueForecast({
      ...worked,
      asLeftError: 5,
      uAsLeft: 0.1,
      ratePerDay: 0,
      uRate: 0,
      maxDays: 100,
    });
    expect([outside.early.days, outside.median.days, outside.late.days]).toEqual([0, 0, 0]);
  });
});

test.each<[string, () => unknown]>([
  ['a step of 0 days', () => driftStep(segment({ days: 0 }))],
  ['a step back in time', () => driftStep(segment({ days: -3 }))],
  ['a correlation above 1', () => driftStep(segment({ correlation: 1.1 }))],
  ['an error that is not a number', () => driftStep(segment({ asFoundError: NaN }))],
  ['a negative uncertainty', () => driftStep(segment({ uAsLeft: -0.1 }))],
  ['a due day surer than 99 %', () => forecastDue({ ...worked, probability: 0.999, maxDays: 365 })],
  ['a due day less sure than the line', () => forecastDue({ ...worked, probability: 0.4, maxDays: 365 })],
  ['95 for 95 %', () => forecastDue({ ...worked, probability: 95, maxDays: 365 })],
  ['no tolerance', () => forecastDue({ ...worked, tolerance: 0, probability: 0.9, maxDays: 365 })],
  [
    'a rate that is not a number',
    () => forecastDue({ ...worked, ratePerDay: NaN, probability: 0.9, maxDays: 365 }),
  ],
  ['a longest interval of 0', () => forecastDue({ ...worked, probability: 0.9, maxDays: 0 })],
  ['days before the as-left', () => probabilityInTolerance({ ...worked, days: -1 })],
  ['a negative random walk', () => probabilityInTolerance({ ...worked, days: 1, randomWalkPerDay: -1 })],
  ['a horizon of a century', () => dueForecast({ ...worked, maxDays: 36_525 })],
])('%s: refused', (_, call) => {
  expect(call).toThrow(OutOfDomainError);
});

test('a step whose uncertainty cancels altogether is refused: it would outweigh all others', () => {
  expect(() => driftStep(segment({ correlation: 1 }))).toThrow(InconsistentInputError);
  expect(() => driftRate({ segments: [] })).toThrow(InconsistentInputError);
});
