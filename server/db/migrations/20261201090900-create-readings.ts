import type { Migration } from './migration.ts';

// No foreign keys here: thousands of rows a second arrive, and ingest took device, boot, probe and
// settings ids from its own look-up a moment before. Only the primary key guards against a repeat; it
// holds `at` because a unique key of a partitioned table must hold the partition column.
//
// Partitions are calendar months in UTC. readings_other catches every row whose month has no partition
// yet, so that nothing is ever lost; making the month moves those rows. The function runs as the owner of
// the tables, so that the server itself needs no right to create anything, and fixes search_path so that
// nobody can slip another table under it. Writers wait while months are made: one that had already chosen
// readings_other for its rows would find them refused there. Behind a long reader the function gives up after
// three seconds rather than hold up ingest; nothing is lost, and the job asks again.
export const createReadings: Migration = {
  name: '20261201090900-create-readings',
  up: `
    create table readings (
      at timestamptz not null,
      device_id integer not null,
      boot_id integer not null,
      n bigint not null check (n >= 0),
      probe_id integer not null,
      received_at timestamptz not null,
      context text not null check (context in ('process', 'check', 'calibration', 'maintenance', 'unknown')),
      conductivity_us_cm double precision check (conductivity_us_cm >= 0 and conductivity_us_cm < 'Infinity'),
      temperature_c double precision check (temperature_c between -273.15 and 1000),
      conductance_us double precision check (conductance_us >= 0 and conductance_us < 'Infinity'),
      solution text check (length(solution) <= 80),
      quality text not null check (quality in ('good', 'doubtful', 'bad')),
      flags text[] check (
        flags <@ array['t_open', 't_short', 'over', 'under', 'hold', 'simulated', 'warmup', 'dry']
        and array_position(flags, null) is null),
      is_late boolean not null default false,
      settings_id integer,
      extra jsonb,
      primary key (device_id, boot_id, n, at)
    ) partition by range (at);
    create index readings_probe_id on readings (probe_id, at);
    create table readings_other partition of readings default;

    create function ensure_reading_partitions(months_back integer, months_ahead integer) returns setof text
    language plpgsql security definer
    set search_path = pg_catalog, public, pg_temp set lock_timeout = '3s' as $$
    declare
      this_month constant timestamp := date_trunc('month', now() at time zone 'UTC');
      month_offset integer;
      month_start timestamp;
      lower_bound timestamptz;
      upper_bound timestamptz;
      partition_name text;
    begin
      if months_back not between 0 and 240 or months_ahead not between 0 and 24 then
        raise exception 'Ask for 0 to 240 months back and 0 to 24 ahead, not % and %.', months_back, months_ahead
          using errcode = 'invalid_parameter_value';
      end if;
      perform pg_advisory_xact_lock(hashtext('ensure_reading_partitions'));
      for month_offset in -months_back .. months_ahead loop
        month_start := this_month + make_interval(months => month_offset);
        partition_name := 'readings_' || to_char(month_start, 'YYYY_MM');
        continue when to_regclass('public.' || partition_name) is not null;
        lower_bound := month_start at time zone 'UTC';
        upper_bound := (month_start + interval '1 month') at time zone 'UTC';
        execute format('create table public.%I (like public.readings including defaults including constraints)',
          partition_name);
        lock table only public.readings in share row exclusive mode;
        lock table only public.readings_other in access exclusive mode;
        execute format(
          'with moved as (delete from only public.readings_other where at >= %L and at < %L returning *)
           insert into public.%I select * from moved', lower_bound, upper_bound, partition_name);
        execute format('alter table public.readings attach partition public.%I for values from (%L) to (%L)',
          partition_name, lower_bound, upper_bound);
        return next partition_name;
      end loop;
    end
    $$;
    revoke execute on function ensure_reading_partitions(integer, integer) from public;
  `,
  down: `
    drop function ensure_reading_partitions(integer, integer);
    drop table readings;
  `,
};
