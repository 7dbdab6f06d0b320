import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { aMessage, aReading, at, boot, eventually, publish, startPlant, type Plant } from './plant.ts';

let plant: Plant;

beforeAll(async () => {
  plant = await startPlant();
});
afterAll(() => plant.stop());
beforeEach(() => {
  plant.events.length = 0;
  plant.points.length = 0;
});

const storedOf = (deviceId: number) =>
  plant.rows<{ n: string; conductivity_us_cm: number; is_late: boolean; at: Date }>(
    'select n, at, conductivity_us_cm, is_late from readings where device_id = $1 order by n',
    [deviceId],
  );
const noticesOf = (deviceId: number) =>
  plant.rows<{ kind: string; detail: Record<string, unknown> }>(
    'select * from notices where device_id = $1',
    [deviceId],
  );

describe('a good message', () => {
  it('is acknowledged with every reading stored, the live view moved on and the page told', async () => {
    const station = await plant.station({ point: { compensationCoefficientPercentPerK: 2 } });
    const client = await plant.connect(station);
    await publish(
      client,
      station.name,
      'readings',
      aMessage([aReading(1), aReading(2, { conductivity_us_cm: 1062.5 })]),
    );

    const stored = await storedOf(station.device.id);
    expect(stored.map((row) => [Number(row.n), row.conductivity_us_cm, row.is_late])).toEqual([
      [1, 1061, false],
      [2, 1062.5, false],
    ]);
    const [live] = await plant.rows('select * from live_readings where probe_id = $1', [station.probe.id]);
    expect(live).toMatchObject({ boot, n: 2, conductivity_us_cm: 1062.5, context: 'process' });
    expect(plant.points.map((point) => [point.probeId, point.siteId, point.conductivityUsCm])).toEqual([
      [station.probe.id, station.site.id, 1061],
      [station.probe.id, station.site.id, 1062.5],
    ]);
    // 1061/(1 + 0.02 × (13.02 − 25)): the straight line's definition.
    expect(plant.points[0]?.valueUsCm).toBeCloseTo(1061 / (1 + 0.02 * (13.02 - 25)), 9);
  });

  it('keeps fields that nobody knows, raw', async () => {
    const station = await plant.station();
    const client = await plant.connect(station);
    await publish(
      client,
      station.name,
      'readings',
      aMessage([aReading(1, { rinse_valve: 'open' }), aReading(2)], { site_note: { shift: 3 } }),
    );
    const rows = await plant.rows('select n, extra from readings where device_id = $1 order by n', [
      station.device.id,
    ]);
    expect(rows.map((row) => row.extra as unknown)).toEqual([
      { rinse_valve: 'open', message: { site_note: { shift: 3 } } },
      null,
    ]);
  });

  it('tells when the device was last heard and how far its clock is off', async () => {
    const station = await plant.station();
    const client = await plant.connect(station);
    await publish(client, station.name, 'readings', aMessage([aReading(1)], { sent: at(-7) }));
    await eventually(async () => {
      const [row] = await plant.rows('select * from devices where id = $1', [station.device.id]);
      expect(row).toMatchObject({ clock_offset_ms: 7000, clock_source: 'ntp' });
      expect(row?.last_seen_at).toEqual(new Date(at(0)));
    });
  });
});

describe('the same reading twice', () => {
  it('is stored once and counted when it says the same', async () => {
    const station = await plant.station();
    const client = await plant.connect(station);
    const message = aMessage([aReading(1), aReading(2)]);
    await publish(client, station.name, 'readings', message);
    await publish(client, station.name, 'readings', message);
    await Promise.all([
      publish(client, station.name, 'readings', aMessage([aReading(3)])),
      publish(client, station.name, 'readings', aMessage([aReading(3)])),
    ]);
    expect(await storedOf(station.device.id)).toHaveLength(3);
    expect(await noticesOf(station.device.id)).toEqual([]);
    await eventually(async () => {
      const [row] = await plant.rows('select duplicate_count from devices where id = $1', [
        station.device.id,
      ]);
      expect(Number(row?.duplicate_count)).toBe(3);
    });
  });

  it.each([
    ['another value', { conductivity_us_cm: 999 }],
    ['another time, in another month', { at: at(-40 * 86_400) }],
  ])('with %s keeps the first and raises one notice', async (_says, change) => {
    const station = await plant.station();
    const client = await plant.connect(station);
    await publish(client, station.name, 'readings', aMessage([aReading(5)]));
    await publish(client, station.name, 'readings', aMessage([aReading(5, change)]));
    await publish(client, station.name, 'readings', aMessage([aReading(5, change)]));

    const stored = await storedOf(station.device.id);
    expect(stored.map((row) => row.conductivity_us_cm)).toEqual([1061]);
    const notices = await noticesOf(station.device.id);
    expect(notices.map(({ kind, detail }) => [kind, detail.boot, detail.n])).toEqual([
      ['reading-content-differs', boot, 5],
    ]);
    expect(plant.events).toContainEqual(
      expect.objectContaining({ slice: 'notices', kind: 'created', siteId: station.site.id }),
    );
  });

  it('is recognised after a restart of the server', async () => {
    const station = await plant.station();
    const before = await plant.connect(station);
    await publish(before, station.name, 'readings', aMessage([aReading(1), aReading(2)]));
    await plant.restartIngest();
    const after = await plant.connect(station);
    await publish(after, station.name, 'readings', aMessage([aReading(1), aReading(2), aReading(3)]));
    expect((await storedOf(station.device.id)).map((row) => Number(row.n))).toEqual([1, 2, 3]);
    expect(await noticesOf(station.device.id)).toEqual([]);
  });
});

describe('order', () => {
  it('a gap is filled later, and the live view does not go back', async () => {
    const station = await plant.station();
    const client = await plant.connect(station);
    await publish(
      client,
      station.name,
      'readings',
      aMessage([aReading(1), aReading(9, { conductivity_us_cm: 1090 })]),
    );
    plant.points.length = 0;
    await publish(client, station.name, 'readings', aMessage([aReading(4), aReading(5)]));

    expect((await storedOf(station.device.id)).map((row) => Number(row.n))).toEqual([1, 4, 5, 9]);
    const [live] = await plant.rows('select n from live_readings where probe_id = $1', [station.probe.id]);
    expect(live).toEqual({ n: 9 });
    expect(plant.points).toEqual([]);
  });

  it('a reading of an earlier boot is stored and never shown', async () => {
    const station = await plant.station();
    const client = await plant.connect(station);
    await publish(client, station.name, 'readings', aMessage([aReading(1)], { boot: '01JE6M0T6Z' }));
    plant.points.length = 0;
    await publish(client, station.name, 'readings', aMessage([aReading(7000)], { boot: '01JE6M0T6Y' }));
    expect(await storedOf(station.device.id)).toHaveLength(2);
    const [live] = await plant.rows('select boot from live_readings where probe_id = $1', [station.probe.id]);
    expect(live).toEqual({ boot: '01JE6M0T6Z' });
    expect(plant.points).toEqual([]);
  });
});

describe('time', () => {
  it.each([
    ['older than a quarter of an hour', 'readings', -16 * 60],
    ['buffered, however young', 'late', -30],
  ] as const)('%s: stored as late, summary marked, never live', async (_says, kind, seconds) => {
    const station = await plant.station();
    const client = await plant.connect(station);
    await publish(client, station.name, kind, aMessage([aReading(1, { at: at(seconds) })]));
    expect((await storedOf(station.device.id)).map((row) => row.is_late)).toEqual([true]);
    expect(await plant.rows('select 1 from live_readings where probe_id = $1', [station.probe.id])).toEqual(
      [],
    );
    const marks = await plant.rows('select bucket_at from rollups_due where probe_id = $1', [
      station.probe.id,
    ]);
    const bucket = Math.floor(Date.parse(at(seconds)) / 600_000) * 600_000;
    expect(marks).toEqual([{ bucket_at: new Date(bucket) }]);
    expect(plant.points).toEqual([]);
    expect(plant.events).toContainEqual(expect.objectContaining({ slice: 'readings', id: station.probe.id }));
  });

  it.each([
    ['time-in-future', 3 * 60],
    ['time-too-old', -11 * 365.25 * 86_400],
  ])('%s: set apart, the good readings of the message kept', async (code, seconds) => {
    const station = await plant.station();
    const client = await plant.connect(station);
    const message = aMessage([aReading(1), aReading(2, { at: at(seconds) }), aReading(3)]);
    await publish(client, station.name, 'readings', message);
    expect((await storedOf(station.device.id)).map((row) => Number(row.n))).toEqual([1, 3]);
    const [quarantined] = await plant.rows<{ code: string; reason: string; payload: Buffer }>(
      'select * from quarantined_messages where device_name = $1',
      [station.name],
    );
    expect(quarantined).toMatchObject({ code });
    expect(quarantined?.reason).toContain('Reading 2');
    expect(JSON.parse(quarantined?.payload.toString() ?? '')).toEqual(message);
  });

  it('two minutes ahead are a clock, not the future', async () => {
    const station = await plant.station();
    const client = await plant.connect(station);
    await publish(client, station.name, 'readings', aMessage([aReading(1, { at: at(119) })]));
    expect(await storedOf(station.device.id)).toHaveLength(1);
  });
});
