import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { rollUpReadings } from '../../server/jobs/roll-up-readings.ts';
import { createReadingPartitions } from '../../server/jobs/create-reading-partitions.ts';
import type { Job } from '../../server/jobs/job.ts';
import { startJobs, type RunningJobs } from '../../server/jobs/runner.ts';
import { testNow } from '../support/app.ts';
import { someReadings } from '../support/rows.ts';
import { aMessage, aReading, at, eventually, publish, startPlant, type Plant } from './plant.ts';

let plant: Plant;
let jobs: RunningJobs;

/** Never by itself: tests say when. */
const onCommand = (job: Job): Job => ({ ...job, schedule: '0 0 0 29 2 *', runsAtStart: false });

beforeAll(async () => {
  plant = await startPlant();
  jobs = await startJobs(plant.parts, [onCommand(rollUpReadings), onCommand(createReadingPartitions)]);
});
afterAll(async () => {
  await jobs.stop();
  await plant.stop();
});

const rollUp = async (): Promise<void> => expect(await jobs.runNow('roll-up-readings')).toBe('done');
const summariesOf = (probeId: number) =>
  plant.rows(
    `select bucket_at, reading_count, conductivity_min_us_cm as low, conductivity_max_us_cm as high,
       conductivity_mean_us_cm as mean from reading_rollups where probe_id = $1 order by bucket_at`,
    [probeId],
  );

describe('summaries of readings', () => {
  it('hold count, least, greatest and mean of ten minutes of the process, without checks and bad readings', async () => {
    const { probe, device } = await plant.station();
    await someReadings(probe.id, device.id, [
      { at: new Date(at(-60)), conductivityUsCm: 100 },
      { at: new Date(at(-50)), conductivityUsCm: 130 },
      { at: new Date(at(-40)), conductivityUsCm: 1413, context: 'check' },
      { at: new Date(at(-30)), conductivityUsCm: 9, quality: 'bad' },
      { at: new Date(at(-700)), conductivityUsCm: 70 },
    ]);
    await rollUp();
    expect(await summariesOf(probe.id)).toEqual([
      { bucket_at: new Date('2026-12-01T11:40:00Z'), reading_count: 1, low: 70, high: 70, mean: 70 },
      { bucket_at: new Date('2026-12-01T11:50:00Z'), reading_count: 2, low: 100, high: 130, mean: 115 },
    ]);
  });

  it('are made again when readings of the last minutes have come', async () => {
    const station = await plant.station();
    const client = await plant.connect(station);
    await publish(client, station.name, 'readings', aMessage([aReading(1, { conductivity_us_cm: 100 })]));
    await rollUp();
    await publish(client, station.name, 'readings', aMessage([aReading(2, { conductivity_us_cm: 200 })]));
    await rollUp();
    expect(await summariesOf(station.probe.id)).toMatchObject([{ reading_count: 2, mean: 150 }]);
  });

  it('take in late readings of any age, and only once', async () => {
    const station = await plant.station();
    const client = await plant.connect(station);
    await rollUp();
    const at10Days = at(-10 * 86_400);
    await publish(
      client,
      station.name,
      'late',
      aMessage([aReading(1, { at: at10Days }), aReading(2, { at: at10Days })]),
    );
    expect(await summariesOf(station.probe.id)).toEqual([]);
    await rollUp();
    expect(await summariesOf(station.probe.id)).toMatchObject([{ reading_count: 2 }]);
    expect(await plant.rows('select 1 from rollups_due')).toEqual([]);
  });

  it('leave a mark that a running commit holds, so that its readings are not missed', async () => {
    const station = await plant.station();
    const bucket = '2026-11-20T10:00:00Z';
    await plant.rows('insert into rollups_due values ($1, $2)', [station.probe.id, bucket]);
    const commit = await plant.pool.connect();
    await commit.query('begin');
    await commit.query(
      `insert into rollups_due values ($1, $2) on conflict (probe_id, bucket_at) do update set bucket_at = excluded.bucket_at`,
      [station.probe.id, bucket],
    );
    await rollUp();
    await commit.query('commit');
    commit.release();
    expect(await plant.rows('select probe_id from rollups_due')).toEqual([{ probe_id: station.probe.id }]);
    await rollUp();
    expect(await plant.rows('select 1 from rollups_due')).toEqual([]);
  });

  it('catch up after three days of standstill', async () => {
    const { probe, device } = await plant.station();
    await rollUp();
    plant.clock.advance(3 * 86_400_000);
    const days = [0.1, 1.2, 2.3];
    await someReadings(
      probe.id,
      device.id,
      days.map((day) => ({ at: new Date(at(day * 86_400)) })),
    );
    await rollUp();
    expect(await summariesOf(probe.id)).toHaveLength(3);
    plant.clock.set(testNow);
  });
});

describe('months of readings', () => {
  it('are made ahead, and rows that came before their month are moved', async () => {
    const { probe, device } = await plant.station();
    await someReadings(probe.id, device.id, [{ at: new Date() }]);
    expect(await jobs.runNow('create-reading-partitions')).toBe('done');
    const [other] = await plant.rows<{ count: number }>(
      `select count(*) from readings_other where probe_id = $1`,
      [probe.id],
    );
    expect(Number(other?.count)).toBe(0);
    const partitions = await plant.rows(
      `select 1 from pg_inherits where inhparent = 'readings'::regclass and inhrelid::regclass::text <> 'readings_other'`,
    );
    expect(partitions.length).toBeGreaterThanOrEqual(5);
  });
});

describe('the runner', () => {
  it('runs a job in one instance at a time', async () => {
    let open: () => void = () => {};
    const gate = new Promise<void>((resolve) => (open = resolve));
    let entered = 0;
    const slow: Job = {
      ...onCommand(rollUpReadings),
      name: 'slow-job',
      run: async () => {
        entered += 1;
        await gate;
      },
    };
    const [here, there] = await Promise.all([startJobs(plant.parts, [slow]), startJobs(plant.parts, [slow])]);
    const first = here.runNow('slow-job');
    await eventually(() => expect(entered).toBe(1));
    expect(await there.runNow('slow-job')).toBe('elsewhere');
    open();
    expect(await first).toBe('done');
    expect(await there.runNow('slow-job')).toBe('done');
    await Promise.all([here.stop(), there.stop()]);
  });

  it('says in the health report which job keeps failing, until it succeeds', async () => {
    let isBroken = true;
    const shaky: Job = {
      ...onCommand(rollUpReadings),
      name: 'shaky-job',
      run: () => (isBroken ? Promise.reject(new Error('no')) : Promise.resolve()),
    };
    const runner = await startJobs(plant.parts, [shaky]);
    const health = plant.parts.health.at(-1);
    for (let turn = 0; turn < 2; turn += 1) await runner.runNow('shaky-job');
    expect(await health?.check()).toEqual({ up: true });
    await runner.runNow('shaky-job');
    expect(await health?.check()).toEqual({ up: false, detail: 'shaky-job keeps failing' });
    isBroken = false;
    await runner.runNow('shaky-job');
    expect(await health?.check()).toEqual({ up: true });
    await runner.stop();
  });

  it('runs a job when its time comes', async () => {
    let runs = 0;
    const everySecond: Job = {
      name: 'every-second',
      schedule: '* * * * * *',
      runsAtStart: false,
      run: async () => void (runs += 1),
    };
    const runner = await startJobs(plant.parts, [everySecond]);
    await eventually(() => expect(runs).toBeGreaterThan(0));
    await runner.stop();
  });
});
