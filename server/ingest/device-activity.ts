/**
 * When each device was last heard, how its clock stands and how often it repeated itself. These change with every
 * message and nobody waits for them, so they are collected and written once a second, outside the grouped commits:
 * a row locked by somebody issuing credentials must not hold up readings.
 */
import type { Pool } from 'pg';
import type { Logger } from '../lib/logger.ts';
import { ClockOffset } from './clock-offset.ts';
import { numberColumn, textColumn } from './columns.ts';

interface Activity {
  lastSeenMs: number;
  duplicates: number;
  clockSource: string | null;
}

export interface DeviceActivity {
  heard: (deviceId: number, receivedAtMs: number, sentMs: number | null, clockSource: string | null) => void;
  repeated: (deviceId: number, count: number) => void;
  stop: () => Promise<void>;
}

const flushMs = 1000;

export function recordDeviceActivity(pool: Pool, log: Logger): DeviceActivity {
  const offsets = new Map<number, ClockOffset>();
  let pending = new Map<number, Activity>();
  let flushing: Promise<void> | null = null;

  const activityOf = (deviceId: number): Activity => {
    const known = pending.get(deviceId);
    if (known) return known;
    const made: Activity = { lastSeenMs: 0, duplicates: 0, clockSource: null };
    pending.set(deviceId, made);
    return made;
  };

  const putBack = (taken: Map<number, Activity>): void => {
    for (const [deviceId, activity] of taken) {
      const now = activityOf(deviceId);
      now.lastSeenMs = Math.max(now.lastSeenMs, activity.lastSeenMs);
      now.duplicates += activity.duplicates;
      now.clockSource ??= activity.clockSource;
    }
  };

  const flush = async (): Promise<void> => {
    if (pending.size === 0) return;
    const taken = pending;
    pending = new Map();
    try {
      await writeActivity(pool, taken, (id) => offsets.get(id)?.medianMs() ?? null);
    } catch (error) {
      log.warn({ err: error }, 'what was heard of the devices could not be written; tried again shortly');
      putBack(taken);
    }
  };

  const timer = setInterval(() => {
    flushing ??= flush().finally(() => (flushing = null));
  }, flushMs);

  return {
    heard: (deviceId, receivedAtMs, sentMs, clockSource) => {
      const activity = activityOf(deviceId);
      activity.lastSeenMs = Math.max(activity.lastSeenMs, receivedAtMs);
      activity.clockSource = clockSource ?? activity.clockSource;
      if (sentMs === null) return;
      const offset = offsets.get(deviceId) ?? new ClockOffset();
      offsets.set(deviceId, offset);
      offset.add(receivedAtMs, sentMs);
    },
    repeated: (deviceId, count) => void (activityOf(deviceId).duplicates += count),
    stop: async () => {
      clearInterval(timer);
      await flushing;
      await flush();
    },
  };
}

/** Rows in order of id, so that two servers never wait for each other. */
async function writeActivity(
  pool: Pool,
  activities: Map<number, Activity>,
  offsetOf: (deviceId: number) => number | null,
): Promise<void> {
  const rows = [...activities].sort(([a], [b]) => a - b);
  await pool.query(
    `with heard as (
       select * from unnest($1::int[], $2::float8[], $3::int[], $4::float8[], $5::text[])
         as h (id, last_seen_ms, duplicates, offset_ms, clock_source)
     ), locked as (
       select d.id from devices d join heard h on h.id = d.id order by d.id for no key update of d
     )
     update devices d set
       last_seen_at = greatest(d.last_seen_at, case when h.last_seen_ms > 0 then to_timestamp(h.last_seen_ms / 1000) end),
       duplicate_count = d.duplicate_count + h.duplicates,
       clock_offset_ms = coalesce(h.offset_ms, d.clock_offset_ms),
       clock_source = coalesce(h.clock_source, d.clock_source)
     from heard h join locked on locked.id = h.id
     where d.id = h.id`,
    [
      numberColumn(rows.map(([id]) => id)),
      numberColumn(rows.map(([, activity]) => activity.lastSeenMs)),
      numberColumn(rows.map(([, activity]) => activity.duplicates)),
      numberColumn(rows.map(([id]) => offsetOf(id))),
      textColumn(rows.map(([, activity]) => activity.clockSource)),
    ],
  );
}
