import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { InconsistentInputError, OutOfDomainError } from '../../shared/science/errors.ts';
import { flatLine, gap, neighbourCreep, noise, spike, step } from '../../shared/science/live-health.ts';
import { alignDelay, whichMoved } from '../../shared/science/neighbours.ts';
import {
  compensationMismatch,
  grossRange,
  isBelowPureWater,
  temperatureFault,
} from '../../shared/science/physical-checks.ts';
import { median, noiseSd, welchT } from '../../shared/science/robust-statistics.ts';

/** Repeatable noise, roughly normal with standard deviation 1: sums of a small linear congruential generator. */
function whiteNoise(count: number, start = 1): number[] {
  let state = start;
  const uniform = () => {
    state = (state * 48271) % 2147483647;
    return state / 2147483647;
  };
  return Array.from({ length: count }, () => {
    let sum = 0;
    for (let term = 0; term < 12; term += 1) sum += uniform();
    return sum - 6;
  });
}
const around = (level: number, sd: number, count = 60, start = 1) =>
  whiteNoise(count, start).map((value) => level + sd * value);
const flat = (level: number, count = 60) => Array.from({ length: count }, () => level);

describe('flat line', () => {
  test('readings that stand still while the temperature moves are suspect', () => {
    const temperatures = { values: around(18, 0.5), resolution: 0.01 };
    expect(flatLine({ values: flat(1061), resolution: 1, companion: temperatures }).isSuspect).toBe(true);
  });

  test('a water that stands still in every sense is not held against the probe', () => {
    const still = { values: flat(18), resolution: 0.01 };
    const answer = flatLine({ values: flat(1061), resolution: 1, companion: still });
    expect(answer).toMatchObject({ isSuspect: false, isAssessed: false });
  });

  test('readings that flicker by one step are as flat as those that do not', () => {
    const flicker = Array.from({ length: 20 }, (_, index) => 10.1 + (index % 2) * 0.1);
    expect(flatLine({ values: flicker, resolution: 0.1, usualSd: 0.5 }).isSuspect).toBe(true);
  });

  test('a probe whose noise is below its resolution is not judged by its noise', () => {
    expect(flatLine({ values: flat(84), resolution: 1, usualSd: 0.2 }).isAssessed).toBe(false);
  });

  test('a living signal is not flat', () => {
    expect(flatLine({ values: around(1061, 2), resolution: 1 }).isSuspect).toBe(false);
  });
});

describe('noise', () => {
  test.each([
    ['five times the usual: noisy', 5, 'noisy'],
    ['the usual: steady', 1, 'steady'],
    ['a tenth of the usual: collapsed', 0.1, 'collapsed'],
  ])('%s', (_, sd, reading) => {
    expect(noise({ values: around(1061, sd, 120), usualSd: 1 }).reading).toBe(reading);
  });

  test('a steep but smooth change of the water is not noise', () => {
    const slope = around(0, 1, 120).map((value, index) => value + index * 20);
    expect(noise({ values: slope, usualSd: 1 }).reading).toBe('steady');
  });

  test('three spikes do not make a probe noisy; an ordinary standard deviation would say so', () => {
    const values = around(1000, 1, 120);
    for (const index of [20, 60, 90]) values[index] = 1500;
    expect(noise({ values, usualSd: 1 }).reading).toBe('steady');
  });

  test('a signal that jumps to and fro is noisy, although its jumps are nearly all of one size', () => {
    const values = Array.from({ length: 40 }, (_, index) => 1000 + (index % 2) * 9);
    expect(noise({ values, usualSd: 1 }).reading).toBe('noisy');
  });

  test('noise lost in the resolution is no collapse', () => {
    expect(noise({ values: flat(84), usualSd: 0.2, resolution: 1 }).reading).toBe('steady');
  });
});

describe('spike', () => {
  test('one wild reading among sixty is found, and only that one', () => {
    const values = around(1061, 1);
    values[30] = 1200;
    expect(spike({ values, threshold: 10 }).indices).toEqual([30]);
  });

  test('two wild readings in a row are both found', () => {
    const values = around(1061, 1);
    values[30] = 1200;
    values[31] = 1210;
    expect(spike({ values, threshold: 10 }).indices).toEqual([30, 31]);
  });

  test('a step is not a spike', () => {
    const values = [...around(1061, 1, 30), ...around(1200, 1, 30, 7)];
    expect(spike({ values, threshold: 10 }).indices).toEqual([]);
  });

  test('a flicker of one resolution step on a flat signal is not a spike', () => {
    const values = flat(84, 30);
    values[12] = 85;
    expect(spike({ values, resolution: 1 }).isSuspect).toBe(false);
  });
});

describe('step', () => {
  test('a level that changes at once is found where it changes', () => {
    const values = [...around(100, 1, 35), ...around(110, 1, 25, 9)];
    const found = step({ values });
    expect(found.isSuspect).toBe(true);
    expect(found.index).toBe(35);
    expect(Math.abs(found.size - 10)).toBeLessThan(1);
  });

  test('a steady slope as large as that is no step, though its two halves differ', () => {
    const values = around(0, 0.2, 60).map((value, index) => 100 + value + index / 3);
    expect(step({ values }).isSuspect).toBe(false);
  });

  test('noise alone is no step', () => {
    for (const start of [1, 2, 3, 4, 5, 6, 7, 8]) {
      expect(step({ values: around(100, 1, 60, start) }).isSuspect).toBe(false);
    }
  });

  test('between two flat levels the size is exact and t is finite', () => {
    const found = step({ values: [...flat(5, 10), ...flat(7, 10)] });
    expect(found).toMatchObject({ isSuspect: true, index: 10, size: 2 });
    expect(Number.isFinite(found.t)).toBe(true);
  });

  test('a change of one resolution step on a flat signal is a step of one resolution only if it lasts', () => {
    expect(step({ values: [...flat(84, 10), 85, ...flat(84, 10)], resolution: 1 }).isSuspect).toBe(false);
  });
});

describe('gap', () => {
  const every10s = (count: number) => Array.from({ length: count }, (_, index) => index * 10_000);

  test('readings on time, numbered without a hole, are in order', () => {
    const answer = gap({ atMs: every10s(6), intervalS: 10, nowMs: 55_000, sequence: [1, 2, 3, 4, 5, 6] });
    expect(answer).toMatchObject({ isSuspect: false, isLate: false, ageS: 5, pauses: [], missing: [] });
  });

  test('more than three intervals without a reading is late; exactly three is not', () => {
    const at = (nowMs: number) => gap({ atMs: [0], intervalS: 10, nowMs }).isLate;
    expect(at(30_000)).toBe(false);
    expect(at(30_001)).toBe(true);
  });

  test('a pause and the missing numbers are named', () => {
    const answer = gap({ atMs: [0, 10_000, 80_000], intervalS: 10, nowMs: 81_000, sequence: [7, 8, 15] });
    expect(answer.pauses).toEqual([{ fromMs: 10_000, toMs: 80_000 }]);
    expect(answer.missing).toEqual([{ first: 9, last: 14 }]);
  });

  test('duplicates and numbers out of order are not gaps', () => {
    expect(gap({ atMs: [0], intervalS: 10, nowMs: 0, sequence: [3, 1, 2, 2, 1] }).missing).toEqual([]);
  });

  test('a probe that never spoke is late, with an age without end', () => {
    expect(gap({ atMs: [], intervalS: 10, nowMs: 0 })).toMatchObject({ isLate: true, ageS: Infinity });
  });

  test('times that go back are refused', () => {
    expect(() => gap({ atMs: [10, 5], intervalS: 10, nowMs: 20 })).toThrow(InconsistentInputError);
  });
});

describe('creep against a neighbour', () => {
  const water = around(900, 40, 80, 3);
  const pair = (creep: (index: number) => number) => ({
    own: water.map(
      (value, index) => value * (1 + creep(index)) * (1 + 0.004 * (whiteNoise(80, 11)[index] as number)),
    ),
    neighbour: water,
    baselineMean: 0,
    baselineSd: 0.004,
  });

  test('two per cent of slow creep, hidden in a process that moves by four, is found', () => {
    const answer = neighbourCreep(pair((index) => (0.02 * index) / 80));
    expect(answer.isSuspect).toBe(true);
    expect(Math.abs(answer.shift - 0.019)).toBeLessThan(0.004);
    expect(answer.firstOutside).toBeGreaterThan(5);
  });

  test('a pair that agrees stays within its baseline', () => {
    expect(neighbourCreep(pair(() => 0)).isSuspect).toBe(false);
  });

  test('a ratio is the same in any unit of both', () => {
    const here = pair((index) => index / 4000);
    const there = {
      ...here,
      own: here.own.map((v) => v / 1000),
      neighbour: here.neighbour.map((v) => v / 1000),
    };
    expect(neighbourCreep(there).shift).toBeCloseTo(neighbourCreep(here).shift, 12);
  });

  test('the delay of the water between the two is found, either way round', () => {
    const upstream = around(900, 10, 60, 5);
    const [early, late] = [upstream.slice(4, 44), upstream.slice(0, 40)];
    expect(alignDelay({ own: early, neighbour: late, maxLag: 8 })).toMatchObject({ lag: 4 });
    expect(alignDelay({ own: late, neighbour: early, maxLag: 8 })).toMatchObject({ lag: -4 });
  });

  test('two probes that do not move have no delay to find', () => {
    expect(alignDelay({ own: flat(5, 30), neighbour: flat(6, 30), maxLag: 5 })).toEqual({
      lag: 0,
      correlation: 0,
    });
  });
});

describe('which of three probes moved', () => {
  const shift = (value: number) => ({ shift: value, standardUncertainty: 0.003 });
  /** ln of each probe's own move. */
  const moved = (a: number, b: number, c: number) =>
    whichMoved({ ab: shift(a - b), bc: shift(b - c), ca: shift(c - a) });

  test.each([
    [0.02, 0, 0, 'a'],
    [0, 0.02, 0, 'b'],
    [0, 0, -0.02, 'c'],
    [0, 0, 0, 'none'],
    [0.02, 0.02, 0.02, 'none'],
    [0.03, -0.03, 0, 'cannot-tell'],
  ])('moves of %d, %d and %d: %s', (a, b, c, expected) => {
    expect(moved(a, b, c)).toBe(expected);
  });
});

describe('what is physically possible', () => {
  test('0.100 µS/cm at 40 °C is less than pure water there: impossible, not a clean water', () => {
    expect(isBelowPureWater({ conductivityUsCm: 0.1, temperatureC: 40 })).toBe(true);
    expect(isBelowPureWater({ conductivityUsCm: 0.1167, temperatureC: 40 })).toBe(false);
  });

  test('at 25 °C 0.0545 µS/cm passes and 0.053 does not: trace alkali can read slightly low', () => {
    expect(isBelowPureWater({ conductivityUsCm: 0.0545, temperatureC: 25 })).toBe(false);
    expect(isBelowPureWater({ conductivityUsCm: 0.053, temperatureC: 25 })).toBe(true);
  });

  test.each([
    [500, 20, 'inside'],
    [-1, 20, 'below'],
    [2001, 20, 'above'],
    [500, -40, 'temperature-impossible'],
    [500, 850, 'temperature-impossible'],
  ])('%d µS/cm at %d °C: %s', (conductivityUsCm, temperatureC, expected) => {
    expect(grossRange({ conductivityUsCm, temperatureC, lowestUsCm: 0, highestUsCm: 2000 })).toBe(expected);
  });

  test('compensated twice, 1273.03 at 20 °C reads 1557.8: ten per cent too high', () => {
    const settings = {
      rawUsCm: 1273.03,
      temperatureC: 20,
      coefficientPerK: 0.0192,
      referenceC: 25,
      resolutionUsCm: 0.1,
    };
    const twice = compensationMismatch({ ...settings, reportedUsCm: 1557.8 });
    expect(twice.isMismatch).toBe(true);
    expect(twice.relativeDifference).toBeCloseTo(0.106, 3);
    expect(compensationMismatch({ ...settings, reportedUsCm: 1408.2 }).isMismatch).toBe(false);
  });

  test.each([
    ['a jump of 25 °C in 5 s', [20, 20.1, 45], undefined, 'jump'],
    ['3 °C off its neighbour', [20, 20.1, 20.2], 23.3, 'differs-from-neighbour'],
    ['moving with its neighbour', [20, 20.1, 20.2], 20.4, 'none'],
  ])('a temperature %s', (_, temperaturesC, neighbourC, expected) => {
    const input = { temperaturesC, conductivitiesUsCm: [900, 905, 902], intervalS: 5 };
    expect(temperatureFault(neighbourC === undefined ? input : { ...input, neighbourC })).toBe(expected);
  });

  test('a temperature that stands still while the conductivity moves is frozen; with a still water it is not', () => {
    const temperaturesC = flat(20, 20);
    expect(temperatureFault({ temperaturesC, conductivitiesUsCm: around(900, 20, 20), intervalS: 5 })).toBe(
      'frozen',
    );
    expect(temperatureFault({ temperaturesC, conductivitiesUsCm: around(900, 1, 20), intervalS: 5 })).toBe(
      'none',
    );
  });
});

describe('robust statistics', () => {
  const sample = fc.array(
    fc.integer({ min: -8000, max: 8000 }).map((n) => n / 8),
    { minLength: 3, maxLength: 40 },
  );

  test('half of the values lie at or below the median, half at or above', () => {
    fc.assert(
      fc.property(sample, (values) => {
        const middle = median(values);
        expect(values.filter((value) => value <= middle).length * 2).toBeGreaterThanOrEqual(values.length);
        expect(values.filter((value) => value >= middle).length * 2).toBeGreaterThanOrEqual(values.length);
      }),
    );
  });

  test('sorting is by number: the median of 9, 10, 100 is 10', () => {
    expect(median([100, 9, 10])).toBe(10);
  });

  test('noise depends neither on the level nor on a steady slope, and scales with the unit', () => {
    fc.assert(
      fc.property(sample, (values) => {
        const sd = noiseSd(values);
        expect(noiseSd(values.map((value, index) => value + 500 + 25 * index))).toBeCloseTo(sd, 9);
        expect(noiseSd(values.map((value) => value * 8))).toBeCloseTo(sd * 8, 9);
      }),
    );
  });

  test('the noise of white noise is its standard deviation', () => {
    expect(Math.abs(noiseSd(around(50, 2, 2000)) / 2 - 1)).toBeLessThan(0.08);
  });

  test('equal samples differ by nothing, not by NaN', () => {
    expect(welchT([1, 1, 1], [1, 1, 1])).toEqual({ difference: 0, t: 0 });
  });
});

describe('every test of a window', () => {
  const window = fc.array(fc.double({ min: 0.1, max: 1e5, noNaN: true }), { maxLength: 40 });

  test('is silent when the window is too short, and never answers NaN', () => {
    fc.assert(
      fc.property(window, (values) => {
        const answers = [
          flatLine({ values, resolution: 0.1 }),
          noise({ values, usualSd: 1 }),
          spike({ values }),
          step({ values }),
          neighbourCreep({ own: values, neighbour: values.map(() => 7), baselineMean: 0, baselineSd: 0.01 }),
        ];
        for (const answer of answers) {
          if (values.length < 10) expect(answer).toMatchObject({ isAssessed: false, isSuspect: false });
          for (const value of Object.values(answer)) expect(value).not.toBeNaN();
        }
      }),
    );
  });

  test.each<[string, () => unknown]>([
    ['a reading that is not a number', () => flatLine({ values: [1, NaN], resolution: 1 })],
    ['a negative resolution', () => flatLine({ values: [1], resolution: -1 })],
    ['no usual noise', () => noise({ values: [1], usualSd: 0 })],
    ['a spike threshold of 0', () => spike({ values: [1], threshold: 0 })],
    ['an infinite reading', () => step({ values: [Infinity] })],
    ['an interval of 0', () => gap({ atMs: [0], intervalS: 0, nowMs: 0 })],
    [
      'a reading of 0 in a ratio',
      () => neighbourCreep({ own: [0], neighbour: [1], baselineMean: 0, baselineSd: 1 }),
    ],
    [
      'a temperature coefficient of 2 for 2 %/K',
      () =>
        compensationMismatch({
          rawUsCm: 1,
          reportedUsCm: 1,
          temperatureC: 20,
          coefficientPerK: 2,
          referenceC: 25,
          resolutionUsCm: 0,
        }),
    ],
  ])('refuses %s', (_, call) => {
    expect(call).toThrow(OutOfDomainError);
  });
});
