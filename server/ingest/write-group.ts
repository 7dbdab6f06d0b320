/** The statements of one grouped commit. Rows that several servers may touch go in order of id, so that none waits for another in a ring. */
import { booleanColumn, numberColumn, textColumn, wordSetColumn } from './columns.ts';
import type { IncomingReading } from './message.ts';
import type { QuarantineRow } from './quarantine.ts';
import type { Db } from './queries.ts';

export interface ReadingRow {
  reading: IncomingReading;
  deviceId: number;
  bootId: number;
  probeId: number;
  receivedAtMs: number;
  isLate: boolean;
  settingsId: number | null;
}

/** The newest reading of a probe, as the live view shows it. */
export interface LiveRow {
  reading: IncomingReading;
  probeId: number;
  deviceId: number;
  boot: string;
  receivedAtMs: number;
}

export interface RollupMark {
  probeId: number;
  bucketAtMs: number;
}

// live_readings goes along in the same statement rather than once a second on its own: it costs one row per probe
// and group, no second round trip, and a crash can never leave the live view behind what was acknowledged.
const storeReadings = `
  with live as (
    insert into live_readings (probe_id, device_id, boot, n, at, received_at, context, conductivity_us_cm,
      temperature_c, quality, flags, solution)
    select l.probe_id, l.device_id, l.boot, l.n, to_timestamp(l.at_ms / 1000), to_timestamp(l.received_ms / 1000),
      l.context, l.conductivity_us_cm, l.temperature_c, l.quality, l.flags::text[], l.solution
    from unnest($17::int[], $18::int[], $19::text[], $20::bigint[], $21::float8[], $22::float8[], $23::text[],
        $24::float8[], $25::float8[], $26::text[], $27::text[], $28::text[])
      as l (probe_id, device_id, boot, n, at_ms, received_ms, context, conductivity_us_cm, temperature_c, quality,
        flags, solution)
    order by l.probe_id
    on conflict (probe_id) do update set device_id = excluded.device_id, boot = excluded.boot, n = excluded.n,
      at = excluded.at, received_at = excluded.received_at, context = excluded.context,
      conductivity_us_cm = excluded.conductivity_us_cm, temperature_c = excluded.temperature_c,
      quality = excluded.quality, flags = excluded.flags, solution = excluded.solution
    where case when live_readings.device_id = excluded.device_id
      then (live_readings.boot, live_readings.n) < (excluded.boot, excluded.n)
      else live_readings.at <= excluded.at end
  )
  insert into readings (at, device_id, boot_id, n, probe_id, received_at, context, conductivity_us_cm, temperature_c,
    conductance_us, solution, quality, flags, is_late, settings_id, extra)
  select to_timestamp(r.at_ms / 1000), r.device_id, r.boot_id, r.n, r.probe_id, to_timestamp(r.received_ms / 1000),
    r.context, r.conductivity_us_cm, r.temperature_c, r.conductance_us, r.solution, r.quality, r.flags::text[],
    r.is_late, r.settings_id, r.extra::jsonb
  from unnest($1::float8[], $2::int[], $3::int[], $4::bigint[], $5::int[], $6::float8[], $7::text[], $8::float8[],
      $9::float8[], $10::float8[], $11::text[], $12::text[], $13::text[], $14::boolean[], $15::int[], $16::text[])
    as r (at_ms, device_id, boot_id, n, probe_id, received_ms, context, conductivity_us_cm, temperature_c,
      conductance_us, solution, quality, flags, is_late, settings_id, extra)
  on conflict do nothing`;

/** Answers how many were new; fewer than given means that the primary key caught what the look-up did not. */
export async function insertReadings(
  db: Db,
  rows: readonly ReadingRow[],
  live: readonly LiveRow[],
): Promise<number> {
  const inOrder = [...live].sort((a, b) => a.probeId - b.probeId);
  const { rowCount } = await db.query({
    name: 'ingest-store-readings',
    text: storeReadings,
    values: [...readingColumns(rows), ...liveColumns(inOrder)],
  });
  return rowCount ?? 0;
}

function readingColumns(rows: readonly ReadingRow[]): string[] {
  return [
    numberColumn(rows.map((row) => row.reading.atMs)),
    numberColumn(rows.map((row) => row.deviceId)),
    numberColumn(rows.map((row) => row.bootId)),
    numberColumn(rows.map((row) => row.reading.n)),
    numberColumn(rows.map((row) => row.probeId)),
    numberColumn(rows.map((row) => row.receivedAtMs)),
    textColumn(rows.map((row) => row.reading.context)),
    numberColumn(rows.map((row) => row.reading.conductivityUsCm)),
    numberColumn(rows.map((row) => row.reading.temperatureC)),
    numberColumn(rows.map((row) => row.reading.conductanceUs)),
    textColumn(rows.map((row) => row.reading.solution)),
    textColumn(rows.map((row) => row.reading.quality)),
    wordSetColumn(rows.map((row) => row.reading.flags)),
    booleanColumn(rows.map((row) => row.isLate)),
    numberColumn(rows.map((row) => row.settingsId)),
    textColumn(rows.map((row) => row.reading.extraJson)),
  ];
}

function liveColumns(rows: readonly LiveRow[]): string[] {
  return [
    numberColumn(rows.map((row) => row.probeId)),
    numberColumn(rows.map((row) => row.deviceId)),
    textColumn(rows.map((row) => row.boot)),
    numberColumn(rows.map((row) => row.reading.n)),
    numberColumn(rows.map((row) => row.reading.atMs)),
    numberColumn(rows.map((row) => row.receivedAtMs)),
    textColumn(rows.map((row) => row.reading.context)),
    numberColumn(rows.map((row) => row.reading.conductivityUsCm)),
    numberColumn(rows.map((row) => row.reading.temperatureC)),
    textColumn(rows.map((row) => row.reading.quality)),
    wordSetColumn(rows.map((row) => row.reading.flags)),
    textColumn(rows.map((row) => row.reading.solution)),
  ];
}

/**
 * Summaries that have to be made again. The row is written even when it is there: its lock keeps the job from
 * taking the mark away before this commit, which would leave these readings out of the summary for good.
 */
export async function markRollupsDue(db: Db, marks: readonly RollupMark[]): Promise<void> {
  await db.query(
    `insert into rollups_due (probe_id, bucket_at)
     select m.probe_id, to_timestamp(m.bucket_ms / 1000) from unnest($1::int[], $2::float8[]) as m (probe_id, bucket_ms)
     order by 1, 2
     on conflict (probe_id, bucket_at) do update set bucket_at = excluded.bucket_at`,
    [numberColumn(marks.map((mark) => mark.probeId)), numberColumn(marks.map((mark) => mark.bucketAtMs))],
  );
}

export async function insertQuarantined(db: Db, rows: readonly QuarantineRow[]): Promise<number[]> {
  const { rows: made } = await db.query<{ id: number }>(
    `insert into quarantined_messages (device_name, client_id, topic, code, reason, payload, payload_bytes, received_at)
     select q.device_name, q.client_id, q.topic, q.code, q.reason, decode(q.payload, 'base64'), q.payload_bytes,
       to_timestamp(q.received_ms / 1000)
     from unnest($1::text[], $2::text[], $3::text[], $4::text[], $5::text[], $6::text[], $7::int[], $8::float8[])
       as q (device_name, client_id, topic, code, reason, payload, payload_bytes, received_ms)
     returning id`,
    [
      textColumn(rows.map((row) => row.deviceName)),
      textColumn(rows.map((row) => row.clientId)),
      textColumn(rows.map((row) => row.topic)),
      textColumn(rows.map((row) => row.code)),
      textColumn(rows.map((row) => row.reason)),
      textColumn(rows.map((row) => row.payload.toString('base64'))),
      numberColumn(rows.map((row) => row.payloadBytes)),
      numberColumn(rows.map((row) => row.receivedAtMs)),
    ],
  );
  return made.map(({ id }) => id);
}
