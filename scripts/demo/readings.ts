import { once } from 'node:events';
import { finished } from 'node:stream/promises';
import pg from 'pg';
import { from as copyFrom } from 'pg-copy-streams';
import { LiveReading } from '../../server/db/models/index.ts';
import { writeWatermark } from '../../server/jobs/queries.ts';
import { watermarkKey } from '../../server/jobs/roll-up-readings.ts';
import { roundCellConstant } from '../../simulator/probe.ts';
import { probeReadings, type HistoryRow } from '../../simulator/scenario/history.ts';
import { cellConstantSteps } from './probes.ts';
import { need, type Loading } from './loading.ts';
import { silentSinceMs } from './present-day.ts';

const columns =
  'at, device_id, boot_id, n, probe_id, received_at, context, conductivity_us_cm, temperature_c, conductance_us, solution, quality, settings_id';
const networkDelayMs = 400;
const charactersPerWrite = 256 * 1024;

/** Which settings were in force: the row of `device_settings` by the cell constant at a moment. */
async function settingsReader(client: pg.Client, loading: Loading, key: string) {
  const timeline = loading.history.timelines.find((candidate) => candidate.probe.key === key)!;
  const device = need(loading.devices, key);
  const { rows } = await client.query<{ id: number; per_cm: number }>(
    'SELECT id, cell_constant_per_cm AS per_cm FROM device_settings WHERE device_id = $1',
    [device.id],
  );
  const steps = cellConstantSteps(timeline).map((step) => ({
    at: step.at,
    id: rows.find((row) => row.per_cm === roundCellConstant(step.perCm))?.id ?? null,
  }));
  let index = 0;
  return (at: number): number | null => {
    while (steps[index + 1] && steps[index + 1]!.at <= at) index += 1;
    return steps[index]!.id;
  };
}

/** Streams two years of readings by COPY; answers how many. */
export async function loadReadings(loading: Loading, url: string): Promise<number> {
  const client = new pg.Client({ connectionString: url });
  await client.connect();
  try {
    const { history } = loading;
    await client.query('SELECT ensure_reading_partitions(25, 2)');
    const newest = new Map<string, HistoryRow>();
    const settingsOfProbe = new Map<string, (at: number) => number | null>();
    for (const key of loading.devices.keys())
      settingsOfProbe.set(key, await settingsReader(client, loading, key));
    const stream = client.query(copyFrom(`COPY readings (${columns}) FROM STDIN`));
    let count = 0;
    let text = '';
    for (const timeline of history.timelines) {
      const device = loading.devices.get(timeline.probe.key);
      if (!device) continue;
      const probeId = need(loading.probes, timeline.probe.key);
      const settingsAt = need(settingsOfProbe, timeline.probe.key);
      const lastAt = history.endAt - silentSinceMs(timeline.probe.key);
      for (const row of probeReadings(timeline, history.lots, loading.seed)) {
        if (row.at > lastAt) break;
        const at = new Date(row.at).toISOString();
        const received = new Date(row.at + networkDelayMs).toISOString();
        text += `${at}\t${device.id}\t${device.bootId}\t${row.n}\t${probeId}\t${received}\t${row.context}\t${row.conductivityUsCm}\t${row.temperatureC}\t${row.conductanceUs}\t${row.solution ?? '\\N'}\t${row.quality}\t${settingsAt(row.at) ?? '\\N'}\n`;
        count += 1;
        newest.set(timeline.probe.key, row);
        if (text.length < charactersPerWrite) continue;
        if (!stream.write(text)) await once(stream, 'drain');
        text = '';
      }
    }
    stream.end(text);
    await finished(stream);
    await client.query(rollUp);
    // The roll-up job goes on from here instead of starting over.
    await writeWatermark(client, watermarkKey, new Date(history.endAt));
    await loadNewest(loading, newest);
    await client.query('ANALYZE readings, reading_rollups, checks').catch(() => undefined);
    return count;
  } finally {
    await client.end();
  }
}

const rollUp = `
  INSERT INTO reading_rollups (probe_id, bucket_at, reading_count, conductivity_min_us_cm, conductivity_max_us_cm, conductivity_mean_us_cm, temperature_mean_c)
  SELECT probe_id, date_bin('10 minutes', at, timestamptz '2000-01-01T00:00:00Z'), count(*),
         min(conductivity_us_cm), max(conductivity_us_cm), avg(conductivity_us_cm), avg(temperature_c)
  FROM readings WHERE context IN ('process', 'unknown') GROUP BY 1, 2`;

async function loadNewest(loading: Loading, newest: Map<string, HistoryRow>): Promise<void> {
  const inService = loading.history.timelines.filter((timeline) => timeline.probe.status === 'in-service');
  await LiveReading.bulkCreate(
    inService.flatMap(({ probe }) => {
      const row = newest.get(probe.key);
      if (!row) return [];
      return [
        {
          probeId: need(loading.probes, probe.key),
          deviceId: need(loading.devices, probe.key).id,
          boot: row.boot,
          n: row.n,
          at: new Date(row.at),
          receivedAt: new Date(row.at + networkDelayMs),
          context: row.context,
          conductivityUsCm: row.conductivityUsCm,
          temperatureC: row.temperatureC,
          quality: row.quality,
          flags: null,
          solution: row.solution,
        },
      ];
    }),
  );
}
