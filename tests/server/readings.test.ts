import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import {
  Hold,
  ReadingRollup,
  Setting,
  type Device,
  type Point,
  type Probe,
  type Site,
  type Standard,
} from '../../server/db/models/index.ts';
import type { LiveBoard, Series } from '../../shared/contracts/readings.ts';
import { startTestApp, type TestApp } from '../support/app.ts';
import { refusals } from '../support/refusals.ts';
import {
  aCheck,
  aDevice,
  aLiveReading,
  anArea,
  aPoint,
  aProbe,
  aSite,
  aStandard,
  installed,
  someReadings,
} from '../support/rows.ts';

let app: TestApp;
let site: Site;
let other: Site;
let lot: Standard;
let technicianId: number;

interface Standing {
  point: Point;
  probe: Probe;
  device: Device;
}

/** A point with a probe that reads 1000 µS/cm at 25 °C, and its last comparison if it has one. */
async function standing(
  siteId: number,
  more: {
    point?: Partial<Point>;
    check?: Parameters<typeof aCheck>[1];
    reading?: Parameters<typeof aLiveReading>[2];
    device?: Partial<Device>;
  } = {},
): Promise<Standing> {
  const point = await aPoint(siteId, more.point);
  const probe = await aProbe(siteId);
  await installed(probe, point, technicianId);
  const device = await aDevice(probe.id, more.device);
  await aLiveReading(probe.id, device.id, more.reading);
  if (more.check) await aCheck({ probeId: probe.id, pointId: point.id, standardId: lot.id }, more.check);
  return { point, probe, device };
}

const minute = 60_000;
const noon = Date.parse('2026-12-01T12:00:00Z');

beforeAll(async () => {
  app = await startTestApp();
  site = await aSite({ code: 'LWR', name: 'Lower Weir' });
  other = await aSite({ code: 'QBK', name: 'Quarrybank' });
  lot = await aStandard();
  technicianId = (await app.person('technician')).id;
});
afterAll(() => app.stop());
beforeEach(() => {
  app.clock.set(new Date(noon));
});

async function board(query = ''): Promise<LiveBoard> {
  const agent = await app.as('operator');
  return (await agent.get(`/api/readings/live${query}`).expect(200)).body as LiveBoard;
}

async function series(probeId: number, from: string, to: string): Promise<Series> {
  const agent = await app.as('operator');
  return (await agent.get(`/api/readings?probeId=${probeId}&from=${from}&to=${to}`).expect(200))
    .body as Series;
}

describe('refusals', () => {
  let somewhere: Standing;
  beforeAll(async () => {
    somewhere = await standing(site.id);
  });
  const day = 'from=2026-11-30T00:00:00Z&to=2026-12-01T00:00:00Z';
  const elsewhere = () => ({ role: 'manager' as const, siteId: other.id });

  refusals(
    () => app,
    [
      {
        says: 'no session',
        who: null,
        ask: () => ['get', '/api/readings/live'],
        code: 'sessions.required',
        status: 401,
      },
      {
        says: 'board of another site',
        who: elsewhere,
        ask: () => ['get', `/api/readings/live?siteId=${site.id}`],
        code: 'sites.not-found',
        status: 404,
      },
      {
        says: 'series of another site',
        who: elsewhere,
        ask: () => ['get', `/api/readings?probeId=${somewhere.probe.id}&${day}`],
        code: 'probes.not-found',
        status: 404,
      },
      {
        says: 'series of an unknown probe',
        who: 'operator',
        ask: () => ['get', `/api/readings?probeId=99999&${day}`],
        code: 'probes.not-found',
        status: 404,
      },
      {
        says: 'a window that ends before it starts',
        who: 'operator',
        ask: () => [
          'get',
          `/api/readings?probeId=${somewhere.probe.id}&from=2026-12-01T00:00:00Z&to=2026-11-30T00:00:00Z`,
        ],
        code: 'readings.window-invalid',
        status: 422,
      },
      {
        says: 'a window of a century',
        who: 'operator',
        ask: () => [
          'get',
          `/api/readings?probeId=${somewhere.probe.id}&from=1926-12-01T00:00:00Z&to=2026-11-30T00:00:00Z`,
        ],
        code: 'readings.window-invalid',
        status: 422,
      },
      {
        says: 'a time that is none',
        who: 'operator',
        ask: () => [
          'get',
          `/api/readings?probeId=${somewhere.probe.id}&from=yesterday&to=2026-11-30T00:00:00Z`,
        ],
        code: 'request.invalid',
        status: 422,
        issue: 'query.from',
      },
      {
        says: 'no probe',
        who: 'operator',
        ask: () => ['get', `/api/readings?${day}`],
        code: 'request.invalid',
        status: 422,
        issue: 'query.probeId',
      },
    ],
  );
});

describe('the live board of a site', () => {
  it('states each reading at the point’s temperature with its uncertainty and the reason to trust it', async () => {
    const here = await aSite();
    const { point, probe } = await standing(here.id, {
      reading: { conductivityUsCm: 1200, temperatureC: 35 },
      check: { errorPercent: 0.5, expandedUncertaintyPercent: 0.4, coverageFactor: 2 },
    });

    const { rows, sites } = await board(`?siteId=${here.id}`);

    expect(rows).toHaveLength(1);
    expect(rows[0]).toMatchObject({
      point: { id: point.id, code: point.code, displayUnit: 'uS/cm' },
      probe: { id: probe.id, tag: probe.tag },
      trust: { level: 'fit', reason: 'as-compared' },
      hold: null,
      can: { hold: true, release: false },
    });
    // 1200/(1 + 0.02 × 10 K) = 1000; U = 0.5 % + 2 √(0.2² + (100 × 0.02/1.2 × 0.05)²) % = 0.9333 %.
    expect(rows[0]!.reading).toMatchObject({
      conductivityUsCm: 1200,
      temperatureC: 35,
      valueUsCm: expect.closeTo(1000, 6),
    });
    expect(rows[0]!.reading!.expandedUncertaintyUsCm).toBeCloseTo(
      10 * (0.5 + 2 * Math.hypot(0.2, (2 / 1.2) * 0.05)),
      4,
    );
    expect(sites).toEqual([
      {
        id: here.id,
        code: here.code,
        name: here.name,
        timeZone: 'Europe/London',
        counts: { fit: 1, useWithCare: 0, doNotUse: 0, held: 0, noSignal: 0 },
      },
    ]);
  });

  it('draws the last comparison with three earlier errors, and leaves out what was not valid', async () => {
    const here = await aSite();
    const { probe, point } = await standing(here.id);
    const where = { probeId: probe.id, pointId: point.id, standardId: lot.id };
    for (const [month, errorPercent] of [
      [5, 0.1],
      [6, 0.2],
      [7, 0.3],
      [8, 0.4],
      [9, 0.6],
    ] as const)
      await aCheck(where, { at: new Date(Date.UTC(2026, month, 1)), errorPercent });
    await aCheck(where, {
      at: new Date('2026-11-01T00:00:00Z'),
      isValid: false,
      invalidReason: 'solution-recalled',
    });

    const { rows } = await board(`?siteId=${here.id}`);

    expect(rows[0]!.strip).toMatchObject({
      at: '2026-10-01T00:00:00.000Z',
      errorPercent: 0.6,
      tolerancePercent: 3,
      guardBandPercent: expect.closeTo(0.4, 9),
      earlierErrorPercent: [0.4, 0.3, 0.2],
    });
  });

  it('judges the last comparison by what the point asks for now', async () => {
    const here = await aSite();
    await standing(here.id, {
      point: { tolerancePercent: 1 },
      check: {
        errorPercent: 2,
        expandedUncertaintyPercent: 0.4,
        tolerancePercent: 3,
        outcome: 'within-clear',
      },
    });
    const { rows } = await board(`?siteId=${here.id}`);
    expect(rows[0]).toMatchObject({
      trust: { level: 'do-not-use', reason: 'outside-clear' },
      strip: { tolerancePercent: 1, outcome: 'outside-clear' },
    });
  });

  it('counts each kind once, a held point as held whatever its reading', async () => {
    const here = await aSite();
    await standing(here.id, { check: {} });
    await standing(here.id);
    await standing(here.id, { check: { errorPercent: 5, outcome: 'outside-clear' } });
    await standing(here.id, { reading: { at: new Date(noon - 10 * minute) } });
    await aPoint(here.id);
    const { point } = await standing(here.id, { check: { errorPercent: 5, outcome: 'outside-clear' } });
    await Hold.create({
      pointId: point.id,
      userId: technicianId,
      reason: 'electrode swap',
      fromAt: new Date(noon - minute),
      untilAt: new Date(noon + 60 * minute),
      endedAt: null,
    });

    const { rows, sites } = await board(`?siteId=${here.id}`);

    expect(sites[0]!.counts).toEqual({ fit: 1, useWithCare: 1, doNotUse: 1, held: 1, noSignal: 2 });
    const held = rows.find((row) => row.point.id === point.id)!;
    expect(held).toMatchObject({
      trust: { level: 'do-not-use', reason: 'held' },
      hold: { reason: 'electrode swap', userName: 'Test technician' },
      can: { hold: false, release: true },
    });
    expect(rows.find((row) => row.probe === null)).toMatchObject({
      trust: { level: 'no-signal', reason: 'no-probe' },
      reading: null,
      trace: [],
    });
  });

  it('is in order of area and code, without retired points', async () => {
    const here = await aSite();
    const second = await anArea(here.id, { name: 'A', position: 1 });
    const first = await anArea(here.id, { name: 'B', position: 0 });
    await aPoint(here.id, { areaId: second.id, code: 'X-1' });
    await aPoint(here.id, { areaId: first.id, code: 'X-3' });
    await aPoint(here.id, { areaId: first.id, code: 'X-2' });
    await aPoint(here.id, { areaId: first.id, code: 'X-0', retiredAt: new Date('2026-01-01T00:00:00Z') });
    const { rows } = await board(`?siteId=${here.id}`);
    expect(rows.map((row) => row.point.code)).toEqual(['X-2', 'X-3', 'X-1']);
  });

  it('traces two hours of the process in at most 60 steps and leaves bottles out', async () => {
    const here = await aSite();
    const { probe, device } = await standing(here.id);
    const everyHalfMinute = Array.from({ length: 300 }, (_, index) => ({
      at: new Date(noon - index * 30_000),
      conductivityUsCm: 500,
    }));
    await someReadings(probe.id, device.id, everyHalfMinute);
    await someReadings(probe.id, device.id, [
      { at: new Date(noon - minute), context: 'check', conductivityUsCm: 1413, solution: 'LOT' },
    ]);

    const { rows } = await board(`?siteId=${here.id}`);
    const { trace } = rows[0]!;

    expect(trace).toHaveLength(60);
    expect(trace.every(([, value]) => value === 500)).toBe(true);
    expect(trace.map(([at]) => at)).toEqual(
      Array.from({ length: 60 }, (_, index) => noon - (59 - index) * 2 * minute),
    );
  });

  it('follows the setting that says how long silence may last', async () => {
    const here = await aSite();
    await standing(here.id, { check: {}, reading: { at: new Date(noon - 2 * minute) } });
    expect((await board(`?siteId=${here.id}`)).rows[0]!.trust.reason).toBe('silent');

    await Setting.create({
      key: 'check-fitness',
      value: { overdueFactor: 1, silentIntervals: 50 },
      updatedAt: new Date(noon),
    });
    expect((await board(`?siteId=${here.id}`)).rows[0]!.trust.reason).toBe('as-compared');
    await Setting.destroy({ where: { key: 'check-fitness' } });
  });
});

describe('the live board of all sites', () => {
  it('counts every site and shows first what needs a person, untaken', async () => {
    const here = await aSite({ name: 'Skerry Point' });
    const agent = await app.as({ role: 'operator', siteId: here.id });
    await standing(here.id, { point: { code: 'SKP-FIT' }, check: {} });
    await standing(here.id, { point: { code: 'SKP-CARE' } });
    await standing(here.id, { point: { code: 'SKP-SILENT' }, reading: { at: new Date(noon - 60 * minute) } });
    await standing(here.id, {
      point: { code: 'SKP-BAD-LOW', criticality: 'low' },
      check: { errorPercent: 5, outcome: 'outside-clear' },
    });
    await standing(here.id, {
      point: { code: 'SKP-BAD-CRITICAL', criticality: 'critical' },
      check: { errorPercent: 5, outcome: 'outside-clear' },
    });
    const { point } = await standing(here.id, {
      point: { code: 'SKP-HELD' },
      check: { errorPercent: 5, outcome: 'outside-clear' },
    });
    await Hold.create({
      pointId: point.id,
      userId: technicianId,
      reason: 'electrode swap',
      fromAt: new Date(noon - minute),
      untilAt: new Date(noon + 60 * minute),
      endedAt: null,
    });

    const { body } = await agent.get('/api/readings/live').expect(200);

    expect((body as LiveBoard).rows.map((row) => row.point.code)).toEqual([
      'SKP-BAD-CRITICAL',
      'SKP-BAD-LOW',
      'SKP-SILENT',
      'SKP-CARE',
    ]);
    expect((body as LiveBoard).sites).toMatchObject([
      { name: 'Skerry Point', counts: { fit: 1, useWithCare: 1, doNotUse: 2, held: 1, noSignal: 1 } },
    ]);
  });

  it('shows at most 50 rows however many call', async () => {
    const here = await aSite();
    const area = await anArea(here.id);
    for (let index = 0; index < 60; index += 1) await aPoint(here.id, { areaId: area.id });
    const { rows, sites } = await board();
    expect(rows).toHaveLength(50);
    expect(sites.find(({ id }) => id === here.id)?.counts.noSignal).toBe(60);
  });
});

describe('series', () => {
  it('gives single readings while they fit, stated at the point’s temperature', async () => {
    const { probe, device } = await standing(site.id);
    await someReadings(probe.id, device.id, [
      { at: new Date('2026-11-30T10:00:00Z'), conductivityUsCm: 1200, temperatureC: 35 },
      { at: new Date('2026-11-30T10:01:00Z'), conductivityUsCm: null, temperatureC: 35, quality: 'bad' },
      { at: new Date('2026-11-30T10:02:00Z'), conductivityUsCm: 1413, context: 'check' },
    ]);

    const answer = await series(probe.id, '2026-11-30T00:00:00Z', '2026-12-01T00:00:00Z');

    expect(answer).toMatchObject({
      bucketSeconds: null,
      referenceTemperatureC: 25,
      compensationModel: 'linear',
    });
    expect(answer.points).toEqual([
      {
        at: '2026-11-30T10:00:00.000Z',
        conductivityUsCm: 1200,
        minUsCm: 1200,
        maxUsCm: 1200,
        temperatureC: 35,
        valueUsCm: expect.closeTo(1000, 9),
        count: 1,
      },
      {
        at: '2026-11-30T10:01:00.000Z',
        conductivityUsCm: null,
        minUsCm: null,
        maxUsCm: null,
        temperatureC: 35,
        valueUsCm: null,
        count: 1,
      },
    ]);
  });

  it('puts more than 1 000 readings into buckets with their extremes', async () => {
    const { probe, device } = await standing(site.id);
    const start = Date.parse('2026-11-29T00:00:00Z');
    await someReadings(
      probe.id,
      device.id,
      Array.from({ length: 1001 }, (_, index) => ({
        at: new Date(start + index * 1000),
        conductivityUsCm: index % 2 ? 990 : 1010,
      })),
    );

    const answer = await series(probe.id, '2026-11-29T00:00:00Z', '2026-11-29T01:00:00Z');

    // An hour in 1 000 points: 5 s is the shortest step of the ladder that fits.
    expect(answer.bucketSeconds).toBe(5);
    expect(answer.points).toHaveLength(201);
    expect(answer.points.reduce((sum, { count }) => sum + count, 0)).toBe(1001);
    expect(answer.points[0]).toMatchObject({
      at: '2026-11-29T00:00:00.000Z',
      minUsCm: 990,
      maxUsCm: 1010,
      conductivityUsCm: 1002,
      count: 5,
    });
  });

  it('takes long windows from the summaries and the rest from the readings', async () => {
    const { probe, device } = await standing(site.id);
    const start = Date.parse('2026-10-01T00:00:00Z');
    const bucketOf = (index: number) => new Date(start + index * 10 * minute);
    await ReadingRollup.bulkCreate(
      Array.from({ length: 3 }, (_, index) => ({
        probeId: probe.id,
        bucketAt: bucketOf(index),
        readingCount: index === 0 ? 100 : 300,
        conductivityMinUsCm: 900 - index,
        conductivityMaxUsCm: 1100 + index,
        conductivityMeanUsCm: index === 0 ? 1000 : 1040,
        temperatureMeanC: 25,
      })),
    );
    // Behind the summaries: already counted there, and must not be counted twice.
    await someReadings(
      probe.id,
      device.id,
      Array.from({ length: 700 }, (_, index) => ({
        at: new Date(start + index * 2000),
        conductivityUsCm: 1,
      })),
    );
    // After them: not summarised yet.
    await someReadings(
      probe.id,
      device.id,
      Array.from({ length: 400 }, (_, index) => ({
        at: new Date(start + 30 * minute + index * 1000),
        conductivityUsCm: 1200,
      })),
    );

    const answer = await series(probe.id, '2026-10-01T00:00:00Z', '2026-10-31T00:00:00Z');

    expect(answer.bucketSeconds).toBe(3600);
    // (100 × 1000 + 600 × 1040 + 400 × 1200)/1100
    expect(answer.points).toEqual([
      expect.objectContaining({
        at: '2026-10-01T00:00:00.000Z',
        count: 1100,
        minUsCm: 898,
        maxUsCm: 1200,
        conductivityUsCm: expect.closeTo(1_204_000 / 1100, 9),
      }),
    ]);
  });

  it('never gives more than 1 000 points, whatever the window', async () => {
    const { probe } = await standing(site.id);
    const start = Date.parse('2017-01-01T00:00:00Z');
    await ReadingRollup.bulkCreate(
      Array.from({ length: 3650 }, (_, day) => ({
        probeId: probe.id,
        bucketAt: new Date(start + day * 86_400_000),
        readingCount: 600,
        conductivityMinUsCm: 900,
        conductivityMaxUsCm: 1100,
        conductivityMeanUsCm: 1000,
        temperatureMeanC: 25,
      })),
    );
    const answer = await series(probe.id, '2017-01-01T00:00:30Z', '2026-12-30T00:00:00Z');

    expect(answer.points.length).toBeLessThanOrEqual(1000);
    expect(answer.bucketSeconds).toBe(345_600);
    expect(answer.points.reduce((sum, { count }) => sum + count, 0)).toBe(3650 * 600 - 600);
  });

  it('shows the summaries of a day whose single readings are gone', async () => {
    const { probe, device } = await standing(site.id);
    const bucketAt = new Date('2026-09-01T06:00:00Z');
    const summary = {
      conductivityMinUsCm: 1190,
      conductivityMaxUsCm: 1210,
      conductivityMeanUsCm: 1200,
      temperatureMeanC: 35,
    };
    await ReadingRollup.create({ probeId: probe.id, bucketAt, readingCount: 60, ...summary });
    await someReadings(probe.id, device.id, [{ at: new Date('2026-09-01T12:00:00Z') }]);

    const answer = await series(probe.id, '2026-09-01T00:00:00Z', '2026-09-02T00:00:00Z');

    expect(answer.bucketSeconds).toBe(600);
    expect(answer.points.map(({ at, count, valueUsCm }) => [at, count, Math.round(valueUsCm!)])).toEqual([
      ['2026-09-01T06:00:00.000Z', 60, 1000],
      ['2026-09-01T12:00:00.000Z', 1, 1000],
    ]);
  });

  it('states no value on the basis of another point after a move', async () => {
    const before = await aPoint(site.id, {
      compensationModel: 'natural-water',
      compensationCoefficientPercentPerK: null,
    });
    const after = await aPoint(site.id);
    const probe = await aProbe(site.id);
    const device = await aDevice(probe.id);
    await installed(probe, before, technicianId, { toAt: new Date('2026-11-01T00:00:00Z') });
    await installed(probe, after, technicianId, { fromAt: new Date('2026-11-01T00:00:00Z') });
    await someReadings(probe.id, device.id, [
      { at: new Date('2026-10-31T23:59:00Z') },
      { at: new Date('2026-11-01T00:00:00Z') },
    ]);

    const answer = await series(probe.id, '2026-10-31T00:00:00Z', '2026-11-02T00:00:00Z');

    expect(answer.compensationModel).toBe('linear');
    expect(answer.points.map(({ valueUsCm }) => valueUsCm)).toEqual([null, 1000]);
  });
});
