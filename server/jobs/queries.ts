/** The SQL of the jobs. */
import type { ClientBase, Pool } from 'pg';

type Db = Pool | ClientBase;

/** A lock of this connection; false when another instance holds it. */
export async function tryLockJob(db: Db, name: string): Promise<boolean> {
  const { rows } = await db.query<{ isMine: boolean }>(
    `select pg_try_advisory_lock(hashtext('saltmark job'), hashtext($1)) as "isMine"`,
    [name],
  );
  return rows[0]?.isMine ?? false;
}

export async function unlockJob(db: Db, name: string): Promise<void> {
  await db.query(`select pg_advisory_unlock(hashtext('saltmark job'), hashtext($1))`, [name]);
}

export async function ensureReadingPartitions(
  db: Db,
  monthsBack: number,
  monthsAhead: number,
): Promise<string[]> {
  const { rows } = await db.query<{ name: string }>('select ensure_reading_partitions($1, $2) as name', [
    monthsBack,
    monthsAhead,
  ]);
  return rows.map(({ name }) => name);
}

export async function selectOldestReadingAt(db: Db): Promise<Date | null> {
  const { rows } = await db.query<{ at: Date | null }>('select min(at) as at from readings');
  return rows[0]?.at ?? null;
}

export async function selectWatermark(db: Db, key: string): Promise<Date | null> {
  const { rows } = await db.query<{ at: Date | null }>(
    `select (value ->> 'rolledUpTo')::timestamptz as at from settings where key = $1`,
    [key],
  );
  return rows[0]?.at ?? null;
}

export async function writeWatermark(db: Db, key: string, at: Date): Promise<void> {
  await db.query(
    `insert into settings (key, value, updated_at) values ($1, jsonb_build_object('rolledUpTo', $2::text), now())
     on conflict (key) do update set value = excluded.value, updated_at = now()`,
    [key, at.toISOString()],
  );
}

// A summary describes the process: what the probe saw in a bottle of KCl or on a bench, and what the device itself
// calls bad, would make a spike of every check.
const summaries = `
  date_bin('10 minutes', r.at, timestamptz '2000-01-01T00:00:00Z') as bucket_at, count(*) as reading_count,
  min(r.conductivity_us_cm) as low, max(r.conductivity_us_cm) as high, avg(r.conductivity_us_cm) as mean,
  avg(r.temperature_c) as temperature
  from readings r where r.context in ('process', 'unknown') and r.quality <> 'bad'`;

const upsert = `
  insert into reading_rollups (probe_id, bucket_at, reading_count, conductivity_min_us_cm, conductivity_max_us_cm,
    conductivity_mean_us_cm, temperature_mean_c)`;

const onConflict = `
  on conflict (probe_id, bucket_at) do update set reading_count = excluded.reading_count,
    conductivity_min_us_cm = excluded.conductivity_min_us_cm, conductivity_max_us_cm = excluded.conductivity_max_us_cm,
    conductivity_mean_us_cm = excluded.conductivity_mean_us_cm, temperature_mean_c = excluded.temperature_mean_c`;

/** Probe by probe, because readings are indexed by probe and time and not by time alone. */
export async function rollUpSpan(db: Db, from: Date, to: Date): Promise<number> {
  const { rowCount } = await db.query(
    `${upsert}
     select p.id, b.bucket_at, b.reading_count, b.low, b.high, b.mean, b.temperature
     from probes p cross join lateral (
       select ${summaries} and r.probe_id = p.id and r.at >= $1 and r.at < $2 group by 1
     ) b
     ${onConflict}`,
    [from, to],
  );
  return rowCount ?? 0;
}

/**
 * Makes some of the marked summaries again and takes their marks away, in one statement. Marks that a running
 * commit holds are left for the next turn: its readings cannot be seen yet.
 */
export async function rollUpMarked(db: Db, limit: number): Promise<number> {
  const { rows } = await db.query<{ count: number }>(
    `with marked as (
       select probe_id, bucket_at from rollups_due order by bucket_at, probe_id limit $1 for update skip locked
     ), done as (
       delete from rollups_due d using marked m where d.probe_id = m.probe_id and d.bucket_at = m.bucket_at
     ), made as (
       ${upsert}
       select m.probe_id, b.bucket_at, b.reading_count, b.low, b.high, b.mean, b.temperature
       from marked m cross join lateral (
         select ${summaries} and r.probe_id = m.probe_id
           and r.at >= m.bucket_at and r.at < m.bucket_at + interval '10 minutes' group by 1
       ) b
       ${onConflict}
     )
     select count(*)::int as count from marked`,
    [limit],
  );
  return rows[0]?.count ?? 0;
}
