import { describe, expect, it } from 'vitest';
import { cellConstantGeometry } from '../../client/src/components/charts/cell-constant-geometry.ts';
import { cellConstantWords } from '../../client/src/components/charts/cell-constant-words.ts';
import {
  nearestDatum,
  newerThan,
  seriesWords,
  valueExtent,
} from '../../client/src/components/charts/series-model.ts';
import { timeTicks } from '../../client/src/components/charts/time-axis.ts';
import { traceRuns } from '../../client/src/components/charts/trace.tsx';
import { valueTicks } from '../../client/src/components/charts/value-axis.ts';

const utc = (text: string) => Date.parse(text);
const texts = (from: string, to: string, most: number, timeZone?: string) =>
  timeTicks(utc(from), utc(to), most, timeZone).map((tick) => tick.text);

describe('ticks of time', () => {
  it('stand on round times of the zone, not of the browser', () => {
    expect(texts('2026-12-01T07:22:00Z', '2026-12-01T13:22:00Z', 4)).toEqual(['08:00', '10:00', '12:00']);
    // Kathmandu is UTC+05:45: round hours there are at a quarter past here.
    const there = timeTicks(utc('2026-12-01T07:00:00Z'), utc('2026-12-01T10:00:00Z'), 3, 'Asia/Kathmandu');
    expect(there.map((tick) => [tick.text, new Date(tick.t).toISOString().slice(11, 16)])).toEqual([
      ['13:00', '07:15'],
      ['14:00', '08:15'],
      ['15:00', '09:15'],
    ]);
  });

  it('name the day at midnight', () => {
    expect(texts('2026-11-30T12:00:00Z', '2026-12-01T12:00:00Z', 4)).toEqual([
      '12:00',
      '18:00',
      '1 Dec',
      '06:00',
      '12:00',
    ]);
  });

  it('stay on local midnights over the change to summer time', () => {
    const days = timeTicks(utc('2026-03-27T12:00:00Z'), utc('2026-03-31T12:00:00Z'), 5, 'Europe/Oslo');
    expect(days.map((tick) => new Date(tick.t).toISOString().slice(5, 16))).toEqual([
      '03-27T23:00',
      '03-28T23:00',
      '03-29T22:00',
      '03-30T22:00',
    ]);
  });

  it('walk by months over years, with the year at January', () => {
    expect(texts('2024-12-03T00:00:00Z', '2027-01-24T00:00:00Z', 6)).toEqual([
      'Jan 2025',
      'Jul',
      'Jan 2026',
      'Jul',
      'Jan 2027',
    ]);
  });

  it('are none for a range that has no length', () => {
    expect(timeTicks(5, 5, 4)).toEqual([]);
  });
});

it('puts values on steps of 1, 2 or 5', () => {
  expect(valueTicks(50.2, 53.1, 4)).toEqual({ ticks: [51, 52, 53], decimals: 0 });
  const fine = valueTicks(0.4835, 0.5385, 6);
  expect(fine.decimals).toBe(2);
  expect(fine.ticks).toHaveLength(5);
});

describe('a series', () => {
  const points = [
    { t: 10, mean: 5, min: 4, max: 7 },
    { t: 20, mean: null },
    { t: 30, mean: 6, expandedUncertainty: 2 },
  ];

  it('finds the datum nearest in time', () => {
    expect([0, 14, 16, 99].map((t) => nearestDatum(points, t)?.t)).toEqual([10, 10, 20, 30]);
    expect(nearestDatum([], 5)).toBeNull();
  });

  it('draws no live point twice', () => {
    const live = [
      { t: 20, mean: 1 },
      { t: 30, mean: 2 },
      { t: 40, mean: 3 },
    ];
    expect(newerThan(points, live).map((one) => one.t)).toEqual([40]);
    expect(newerThan([], live)).toHaveLength(3);
  });

  it('makes room for bands and for limits nearby, not for a limit far away', () => {
    const near = valueExtent(points, [{ value: 9, label: 'high limit' }]);
    expect(near?.low).toBeLessThan(4);
    expect(near?.high).toBeGreaterThan(9);
    expect(valueExtent(points, [{ value: 900, label: 'high limit' }])?.high).toBeLessThan(20);
    expect(valueExtent([{ t: 1, mean: null }], [])).toBeNull();
  });

  it('is told in a sentence', () => {
    const words = seriesWords({
      label: 'Reading of Feed, train A',
      unit: 'mS/cm',
      decimals: 1,
      points,
      from: utc('2026-12-01T07:22:00Z'),
      to: utc('2026-12-01T13:22:00Z'),
      timeZone: 'UTC',
      limits: [{ value: 9, label: 'High limit' }],
    });
    expect(words.replaceAll('\u00a0', ' ')).toBe(
      'Reading of Feed, train A, 1 Dec 2026 07:22 to 1 Dec 2026 13:22: between 4.0 mS/cm and 7.0 mS/cm, last 6.0 mS/cm. High limit 9.0 mS/cm.',
    );
  });
});

describe('the cell constant over time', () => {
  const now = utc('2026-12-01T12:00:00Z');
  const input = {
    points: [
      {
        at: utc('2025-12-02T10:20:00Z'),
        cellConstantPerCm: 0.5118,
        expandedUncertaintyPerCm: 0.0022,
        stage: 'as-left' as const,
      },
      { at: utc('2026-07-14T08:12:00Z'), cellConstantPerCm: 0.5221, stage: 'as-found' as const },
      {
        at: utc('2026-07-14T09:12:00Z'),
        cellConstantPerCm: 0.5178,
        expandedUncertaintyPerCm: 0.0022,
        stage: 'as-found-cleaned' as const,
      },
    ],
    constants: [
      { from: utc('2024-12-03T10:00:00Z'), cellConstantPerCm: 0.5012 },
      { from: utc('2025-12-02T10:20:00Z'), cellConstantPerCm: 0.5118 },
    ],
    tolerancePercent: 3,
    guardBandPercent: 0.85,
    due: utc('2026-12-18T00:00:00Z'),
    now,
  };
  const drawn = cellConstantGeometry(input, 872);

  it('steps the channel with the constant in use and ends it at the due date', () => {
    const [first, second] = drawn.channels;
    expect((first?.x ?? 0) + (first?.width ?? 0)).toBeCloseTo(second?.x ?? -1, 6);
    expect((second?.x ?? 0) + (second?.width ?? 0)).toBeCloseTo(drawn.dueX ?? -1, 6);
    expect(second?.top).toBeLessThan(first?.top ?? 0);
    expect(drawn.steps).toMatchObject([{ from: 0.5012, to: 0.5118 }]);
  });

  it('joins what was found with what cleaning made of it', () => {
    expect(drawn.joins).toHaveLength(1);
    expect(drawn.joins[0]?.y1).toBeLessThan(drawn.joins[0]?.y2 ?? 0);
  });

  it('is told in sentences', () => {
    expect(cellConstantWords(input).replaceAll('\u00a0', ' ')).toBe(
      'Cell constant in cm⁻¹. In use 0.5118 since 2 Dec 2025. Last determined 0.5178 with U 0.0022 on 14 Jul 2026. ' +
        'Tolerance ±3 % around the constant in use, guard band 0.85 %. Due 18 Dec 2026.',
    );
  });

  it('is drawn before anything was determined', () => {
    const empty = { ...input, points: [], constants: [], due: null };
    expect(cellConstantGeometry(empty, 360).channels).toEqual([]);
    expect(cellConstantWords(empty)).toContain('Not determined yet.');
  });
});

it('breaks a trace at a gap and leaves a flat one flat', () => {
  const runs = traceRuns(
    [
      [0, 100],
      [1, 100],
      [2, null],
      [3, 100],
    ],
    0,
    4,
  );
  expect(runs.map((run) => run.length)).toEqual([2, 1]);
  expect(new Set(runs.flat().map(([, y]) => y))).toEqual(new Set([13]));
  expect(traceRuns([], 0, 1)).toEqual([]);
});
