import { describe, expect, it } from 'vitest';
import {
  judgeSettling,
  silenceLimitMs,
  timeoutLeftS,
} from '../../client/src/features/calibrations/bench/stability.ts';
import { settleLimits } from '../../client/src/features/calibrations/bench/capture-model.ts';
import { settleDrawing } from '../../client/src/features/calibrations/bench/settle-geometry.ts';
import type { LivePoint } from '../../shared/contracts/realtime.ts';
import { aRun, at } from './calibration-runs.ts';

const { criteria } = aRun('as-found').procedure;

const aPoint = (
  second: number,
  conductivityUsCm: number | null,
  temperatureC: number | null = 13,
): LivePoint => ({
  at: at(second),
  conductivityUsCm,
  temperatureC,
  valueUsCm: null,
  context: 'calibration',
  quality: 'good',
  flags: [],
});

/** One reading a second over `seconds`, value and temperature as functions of the second. */
const stream = (
  seconds: number,
  value: (s: number) => number,
  temperature: (s: number) => number = () => 13,
) => Array.from({ length: seconds + 1 }, (_, s) => aPoint(s, value(s), temperature(s)));

describe('settling', () => {
  it('is stable when a full window stays within range, slope and temperature range', () => {
    const settled = judgeSettling(
      stream(60, (s) => 1000 + (s % 2)),
      criteria,
    );
    expect(settled.state).toBe('stable');
    expect(settled.exceeded).toEqual([]);
    // Values 1000 and 1001 in turn: range 1 of a mean of 1000.49.
    expect(settled.conductivity?.rangePercent).toBeCloseTo(0.09995, 4);
    expect(settled.filledS).toBe(60);
  });

  it('still gathers while the window is not full, however steady the readings are', () => {
    const settled = judgeSettling(
      stream(40, () => 1000),
      criteria,
    );
    expect(settled.state).toBe('gathering');
    expect(settled.filledS).toBe(40);
  });

  it('sees a drift that stays inside the range by its slope', () => {
    // 0.2 %/min over one minute: inside 0.3 % of range, beyond 0.1 %/min.
    const settled = judgeSettling(
      stream(60, (s) => 1000 + s / 30),
      criteria,
    );
    expect(settled.exceeded).toEqual(['conductivity-slope']);
    expect(settled.conductivity?.slopePercentPerMin).toBeCloseTo(0.1998, 3);
    expect(settled.state).toBe('unsettled');
  });

  it('finds the slope whichever way it runs', () => {
    const falling = judgeSettling(
      stream(60, (s) => 1000 - s / 30),
      criteria,
    );
    expect(falling.conductivity?.slopePercentPerMin).toBeCloseTo(-0.2002, 3);
    expect(falling.exceeded).toEqual(['conductivity-slope']);
  });

  it('waits for a temperature that still moves', () => {
    const settled = judgeSettling(
      stream(
        60,
        () => 1000,
        (s) => 13 + 0.003 * s,
      ),
      criteria,
    );
    expect(settled.exceeded).toEqual(['temperature-range']);
    expect(settled.temperature?.range).toBeCloseTo(0.18, 9);
    expect(settled.temperature?.slopePerMin).toBeCloseTo(0.18, 9);
  });

  it('forgets what lies before the window', () => {
    const settled = judgeSettling(
      stream(120, (s) => (s < 55 ? 400 : 1000)),
      criteria,
    );
    expect(settled.state).toBe('stable');
  });

  it('takes nothing from before the step began, when the probe stood in another bottle', () => {
    const settled = judgeSettling(
      stream(60, () => 1000),
      criteria,
      Date.parse(at(45)),
    );
    expect(settled.filledS).toBe(15);
    expect(settled.state).toBe('gathering');
  });

  it('begins anew after a gap of half a window', () => {
    const points = [...stream(60, () => 1000), ...[95, 96, 97, 98].map((s) => aPoint(s, 1000))];
    const settled = judgeSettling(points, criteria);
    expect(settled.filledS).toBe(3);
    expect(settled.state).toBe('gathering');
  });

  it('counts nothing from before a reading without value or of bad quality', () => {
    const points = stream(60, () => 1000);
    points[50] = aPoint(50, null);
    expect(judgeSettling(points, criteria).filledS).toBe(9);
    points[50] = { ...aPoint(50, 1000), quality: 'bad' };
    expect(judgeSettling(points, criteria).filledS).toBe(9);
  });

  it('judges few readings of a slow device only when there are five of them', () => {
    const four = [0, 20, 40, 60].map((s) => aPoint(s, 1000));
    expect(judgeSettling(four, criteria).state).toBe('gathering');
    const five = [0, 15, 30, 45, 60].map((s) => aPoint(s, 1000));
    expect(judgeSettling(five, criteria).state).toBe('stable');
  });

  it('takes the zero in air against a base, not against a mean near zero', () => {
    const air = stream(60, (s) => 0.1 + 0.05 * (s % 2));
    expect(judgeSettling(air, criteria).state).toBe('unsettled');
    expect(judgeSettling(air, settleLimits('zero-in-air', criteria)).state).toBe('stable');
  });

  it('says nothing of an empty stream', () => {
    expect(judgeSettling([], criteria)).toMatchObject({ state: 'gathering', conductivity: null });
  });
});

describe('waiting', () => {
  it('counts the time-out down to "not stable" and no further', () => {
    expect(timeoutLeftS(1_000_000, 1_000_000, 600)).toBe(600);
    expect(timeoutLeftS(1_000_000, 1_250_000, 600)).toBe(350);
    expect(timeoutLeftS(1_000_000, 9_000_000, 600)).toBe(0);
  });

  it('calls a stream silent after several of its own intervals', () => {
    expect(silenceLimitMs([])).toBe(10_000);
    expect(silenceLimitMs(stream(10, () => 1))).toBe(10_000);
    expect(silenceLimitMs([0, 15, 30].map((s) => aPoint(s, 1)))).toBe(47_000);
  });
});

describe('the settling trace', () => {
  const window = { endMs: 60_000, lengthMs: 60_000, middle: 1000, limitRange: 3 };

  it('fills the channel with exactly the range limit', () => {
    const { line, channel } = settleDrawing(
      [
        { atMs: 0, value: 1001.5 },
        { atMs: 60_000, value: 998.5 },
      ],
      window,
      358,
    );
    expect(channel).toEqual({ y: 36, height: 24 });
    expect(line).toBe('M2 36L356 60');
  });

  it('runs along the edge while readings are far away', () => {
    const { line } = settleDrawing(
      [
        { atMs: 0, value: 400 },
        { atMs: 60_000, value: 1900 },
      ],
      window,
      358,
    );
    expect(line).toBe('M2 93L356 3');
  });
});
