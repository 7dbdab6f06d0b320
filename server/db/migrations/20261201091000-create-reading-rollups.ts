import type { Migration } from './migration.ts';

// Ten-minute summaries, the buckets that late readings made stale, and the newest reading of each probe.
// Summaries are derived in bulk from readings and therefore, like them, have no foreign keys.
// No check that the mean lies between the ends: rounding puts the mean of equal values just outside.
export const createReadingRollups: Migration = {
  name: '20261201091000-create-reading-rollups',
  up: `
    create table reading_rollups (
      probe_id integer not null,
      bucket_at timestamptz not null
        check (bucket_at = date_bin('10 minutes', bucket_at, timestamptz '2000-01-01T00:00:00Z')),
      reading_count integer not null check (reading_count > 0),
      conductivity_min_us_cm double precision check (conductivity_min_us_cm >= 0),
      conductivity_max_us_cm double precision check (conductivity_max_us_cm < 'Infinity'),
      conductivity_mean_us_cm double precision check (conductivity_mean_us_cm >= 0 and conductivity_mean_us_cm < 'Infinity'),
      temperature_mean_c double precision check (temperature_mean_c between -273.15 and 1000),
      primary key (probe_id, bucket_at),
      constraint reading_rollups_min_below_max check (conductivity_min_us_cm <= conductivity_max_us_cm)
    );

    create table rollups_due (
      probe_id integer not null,
      bucket_at timestamptz not null
        check (bucket_at = date_bin('10 minutes', bucket_at, timestamptz '2000-01-01T00:00:00Z')),
      primary key (probe_id, bucket_at)
    );

    create table live_readings (
      probe_id integer primary key references probes,
      device_id integer not null references devices,
      boot text collate "C" not null check (length(boot) between 1 and 40),
      n bigint not null check (n >= 0),
      at timestamptz not null,
      received_at timestamptz not null,
      context text not null check (context in ('process', 'check', 'calibration', 'maintenance', 'unknown')),
      conductivity_us_cm double precision check (conductivity_us_cm >= 0 and conductivity_us_cm < 'Infinity'),
      temperature_c double precision check (temperature_c between -273.15 and 1000),
      quality text not null check (quality in ('good', 'doubtful', 'bad')),
      flags text[] check (
        flags <@ array['t_open', 't_short', 'over', 'under', 'hold', 'simulated', 'warmup', 'dry']
        and array_position(flags, null) is null),
      solution text check (length(solution) <= 80)
    );
    create index live_readings_device_id on live_readings (device_id);
  `,
  down: `
    drop table live_readings;
    drop table rollups_due;
    drop table reading_rollups;
  `,
};
