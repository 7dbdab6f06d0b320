import type { Migration } from './migration.ts';

// A run is written step by step and frozen by its signature. What it was started with never changes; what was
// signed (or stopped) never changes either, whoever asks. Only what the review decides may still be added: status,
// approval, effect and due date, each once. calibration_counters gives numbers without gaps: the row is counted up
// inside the transaction that signs, so that an undone signature gives its number back.
const frozenFromStart = [
  'id',
  'key',
  'probe_id',
  'point_id',
  'site_id',
  'procedure_id',
  'standard_id',
  'bottle_id',
  'second_standard_id',
  'thermometer_id',
  'tolerance_percent',
  'decision_rule',
  'cell_constant_before_per_cm',
  'override',
  'plan',
  'started_at',
  'amends_id',
];
const openAfterSigning = ['status', 'approved_at', 'effective_at', 'due_on', 'version'];
const listed = (names: readonly string[]): string => names.map((name) => `'${name}'`).join(', ');

export const createCalibrations: Migration = {
  name: '20261208090400-create-calibrations',
  up: `
    create table calibrations (
      id integer generated always as identity primary key,
      key uuid not null,
      number text check (number ~ '^[A-Z0-9]+-[0-9]{4}-[0-9]{4,}$'),
      status text not null
        check (status in ('running', 'stopped', 'signed', 'returned', 'approved', 'amended')),
      tolerance_percent double precision not null check (tolerance_percent > 0 and tolerance_percent <= 100),
      decision_rule text not null check (decision_rule in ('simple', 'guarded-u', 'guarded-0.83u')),
      cell_constant_before_per_cm double precision not null
        check (cell_constant_before_per_cm > 0 and cell_constant_before_per_cm <= 1000),
      cell_constant_after_per_cm double precision
        check (cell_constant_after_per_cm > 0 and cell_constant_after_per_cm <= 1000),
      permit_number text check (length(permit_number) <= 60),
      override jsonb check (jsonb_typeof(override) = 'object'),
      plan jsonb not null check (jsonb_typeof(plan) = 'object'),
      judgement jsonb not null check (jsonb_typeof(judgement) = 'object'),
      record jsonb check (jsonb_typeof(record) = 'object'),
      record_hash char(64) check (record_hash ~ '^[0-9a-f]{64}$'),
      started_at timestamptz not null,
      stopped_at timestamptz,
      stopped_reason text check (length(btrim(stopped_reason)) between 3 and 1000),
      signed_at timestamptz,
      approved_at timestamptz,
      effective_at timestamptz,
      due_on date,
      received_at timestamptz not null default now(),
      version integer not null default 0,
      probe_id integer not null references probes,
      point_id integer not null references points,
      site_id integer not null references sites,
      procedure_id integer not null references procedures,
      standard_id integer not null references standards,
      bottle_id integer references bottles,
      second_standard_id integer references standards,
      thermometer_id integer references instruments,
      hold_id integer references holds,
      performer_id integer not null references users,
      amends_id integer references calibrations,
      constraint calibrations_key_key unique (key),
      constraint calibrations_number_key unique (number),
      constraint calibrations_one_amendment_each unique (amends_id),
      constraint calibrations_record_is_whole
        check (num_nulls(record, record_hash, signed_at, number) in (0, 4)),
      constraint calibrations_signed_has_record
        check ((status in ('running', 'stopped')) = (record is null)),
      constraint calibrations_stopped_has_reason check (
        (status = 'stopped') = (stopped_at is not null) and (stopped_at is null) = (stopped_reason is null)),
      constraint calibrations_approved_has_time check (status <> 'approved' or approved_at is not null)
    );
    create unique index calibrations_one_running_per_probe on calibrations (probe_id) where status = 'running';
    create index calibrations_probe_id on calibrations (probe_id, started_at desc);
    create index calibrations_point_id on calibrations (point_id, started_at desc);
    create index calibrations_site_id on calibrations (site_id, started_at desc);
    create index calibrations_standard_id on calibrations (standard_id);
    create index calibrations_second_standard_id on calibrations (second_standard_id);
    create index calibrations_bottle_id on calibrations (bottle_id);
    create index calibrations_thermometer_id on calibrations (thermometer_id);
    create index calibrations_performer_id on calibrations (performer_id);
    create index calibrations_to_review on calibrations (site_id, signed_at) where status = 'signed';

    create function guard_calibration() returns trigger language plpgsql as $$
    declare
      before jsonb := to_jsonb(old);
      after jsonb;
      name text;
    begin
      if tg_op = 'DELETE' then
        raise exception 'calibrations keep every run: delete refused' using errcode = 'insufficient_privilege';
      end if;
      after := to_jsonb(new);
      foreach name in array array[${listed(frozenFromStart)}] loop
        if before -> name is distinct from after -> name then
          raise exception 'calibrations.% is fixed when the run starts', name
            using errcode = 'insufficient_privilege';
        end if;
      end loop;
      if old.status = 'running' then
        return new;
      end if;
      if before - array[${listed(openAfterSigning)}] <> after - array[${listed(openAfterSigning)}] then
        raise exception 'a finished calibration never changes: write an amendment'
          using errcode = 'insufficient_privilege';
      end if;
      if old.status <> new.status and not (
        (old.status = 'signed' and new.status in ('returned', 'approved', 'amended'))
        or (old.status in ('returned', 'approved') and new.status = 'amended')) then
        raise exception 'a calibration does not go from % to %', old.status, new.status
          using errcode = 'insufficient_privilege';
      end if;
      foreach name in array array['approved_at', 'effective_at', 'due_on'] loop
        if before ->> name is not null and before -> name <> after -> name then
          raise exception 'calibrations.% is set once', name using errcode = 'insufficient_privilege';
        end if;
      end loop;
      return new;
    end
    $$;
    create trigger calibrations_guard before update or delete on calibrations
      for each row execute function guard_calibration();

    create table calibration_counters (
      site_id integer not null references sites,
      year integer not null check (year between 2000 and 9999),
      last_number integer not null check (last_number >= 1),
      primary key (site_id, year)
    );
  `,
  down: `
    drop table calibration_counters;
    drop table calibrations;
    drop function guard_calibration();
  `,
};
