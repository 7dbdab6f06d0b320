import { describe, expect, it } from 'vitest';
import {
  dataOf,
  periodFetched,
  periodShown,
  showsBandOfU,
  viewOf,
} from '../../client/src/features/readings/series.ts';
import type { Series, SeriesPoint } from '../../shared/contracts/readings.ts';

const HOUR = 3_600_000;
const NOW = Date.parse('2026-12-01T13:22:00Z');

const point = (minute: number, facts: Partial<SeriesPoint> = {}): SeriesPoint => ({
  at: new Date(NOW + minute * 60_000).toISOString(),
  conductivityUsCm: 38_000,
  minUsCm: 37_000,
  maxUsCm: 39_000,
  temperatureC: 12,
  valueUsCm: 50_000,
  count: 12,
  ...facts,
});
const series = (points: SeriesPoint[], bucketSeconds: number | null = 60): Series => ({
  probeId: 1,
  from: new Date(NOW).toISOString(),
  to: new Date(NOW + HOUR).toISOString(),
  bucketSeconds,
  referenceTemperatureC: 25,
  compensationModel: 'linear',
  points,
});

describe('the period of a reading chart', () => {
  it('follows the present when it is chosen up to now, and stands still otherwise', () => {
    expect(viewOf({ from: NOW - 6 * HOUR, to: NOW }, NOW)).toEqual({ kind: 'following', spanMs: 6 * HOUR });
    const past = { from: NOW - 9 * HOUR, to: NOW - 3 * HOUR };
    expect(viewOf(past, NOW)).toEqual({ kind: 'fixed', ...past });
    expect(periodShown(viewOf(past, NOW), NOW + HOUR)).toEqual(past);
  });

  it('is fetched in steps, each covering what is shown until the next one', () => {
    const view = { kind: 'following' as const, spanMs: 6 * HOUR };
    const keys = new Set<string>();
    for (let second = 0; second < 360; second += 1) {
      const now = NOW + second * 1000;
      const fetched = periodFetched(view, now);
      const shown = periodShown(view, now);
      expect(fetched.from).toBeLessThanOrEqual(shown.from);
      expect(fetched.to).toBeGreaterThanOrEqual(shown.to);
      keys.add(JSON.stringify(fetched));
    }
    expect(keys.size).toBeLessThanOrEqual(2);
  });
});

describe('the data of a reading chart', () => {
  it('carries U in proportion to the value while the present U is a fair band', () => {
    expect(showsBandOfU({ from: NOW - 6 * HOUR, to: NOW })).toBe(true);
    expect(showsBandOfU({ from: NOW - 30 * 24 * HOUR, to: NOW })).toBe(false);
    const [datum] = dataOf(series([point(0)]), { factor: 1000, relativeUncertainty: 0.02 });
    expect(datum).toMatchObject({ mean: 50, expandedUncertainty: 1 });
  });

  it('carries the extremes of its buckets at the reference temperature over longer periods', () => {
    const [datum] = dataOf(series([point(0)]), { factor: 1000, relativeUncertainty: null });
    expect(datum?.min).toBeCloseTo((37 / 38) * 50, 10);
    expect(datum?.max).toBeCloseTo((39 / 38) * 50, 10);
  });

  const gaps = (minutes: number[], bucketSeconds: number | null) =>
    dataOf(
      series(
        minutes.map((minute) => point(minute)),
        bucketSeconds,
      ),
      {
        factor: 1000,
        relativeUncertainty: null,
      },
    ).map((datum) => datum.mean);

  it('breaks the line where buckets are missing', () => {
    expect(gaps([0, 1, 7, 8], 60)).toEqual([50, 50, null, 50, 50]);
    expect(gaps([0, 1, 3, 4], 60)).toEqual([50, 50, 50, 50]);
  });

  it('takes a device for silent by its own steps, and a slow one for slow', () => {
    expect(gaps([0, 1, 2, 8, 9, 10], null)).toEqual([50, 50, 50, null, 50, 50, 50]);
    expect(gaps([0, 10, 20, 30], 60)).toEqual([50, 50, 50, 50]);
    expect(gaps([0, 10, 20, 21, 22], 60)).toEqual([50, 50, 50, 50, 50]);
  });
});
