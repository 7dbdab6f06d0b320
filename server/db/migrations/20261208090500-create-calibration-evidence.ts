import type { Migration } from './migration.ts';

// What happened during a run, as it happened. Rows are added, never changed or taken away: a reading that should not
// count gets an exclusion beside it. captures.cell_constant_per_cm is what the device multiplied with at that moment;
// a new constant is judged from the same raw reading.
export const createCalibrationEvidence: Migration = {
  name: '20261208090500-create-calibration-evidence',
  up: `
    create table calibration_steps (
      id integer generated always as identity primary key,
      key uuid not null,
      step text not null check (step in ('identify', 'pre-checks', 'hold', 'as-found-process', 'as-found', 'clean',
        'zero-in-air', 'as-found-cleaned', 'decide', 'second-point', 'temperature-sensor', 'as-left', 'reinstall',
        'review', 'sign')),
      data jsonb not null check (jsonb_typeof(data) = 'object'),
      captured_at timestamptz not null,
      received_at timestamptz not null,
      calibration_id integer not null references calibrations,
      user_id integer not null references users,
      constraint calibration_steps_key_key unique (key),
      constraint calibration_steps_once unique (calibration_id, step)
    );

    create table captures (
      id integer generated always as identity primary key,
      key uuid not null,
      step text not null check (step in ('as-found-process', 'as-found', 'zero-in-air', 'as-found-cleaned',
        'second-point', 'temperature-sensor', 'as-left')),
      position integer not null check (position >= 1),
      source text not null check (source in ('stream', 'typed')),
      conductivity_us_cm double precision not null
        check (conductivity_us_cm >= 0 and conductivity_us_cm < 'Infinity'),
      temperature_c double precision not null check (temperature_c between -273.15 and 1000),
      reference_temperature_c double precision check (reference_temperature_c between -273.15 and 1000),
      reference_conductivity_us_cm double precision
        check (reference_conductivity_us_cm > 0 and reference_conductivity_us_cm < 'Infinity'),
      cell_constant_per_cm double precision not null
        check (cell_constant_per_cm > 0 and cell_constant_per_cm <= 1000),
      is_stable boolean not null,
      is_confirmed boolean not null default false,
      boot text check (length(boot) between 1 and 40),
      n bigint check (n >= 0),
      captured_at timestamptz not null,
      received_at timestamptz not null,
      clock_offset_ms double precision check (clock_offset_ms > '-Infinity' and clock_offset_ms < 'Infinity'),
      calibration_id integer not null references calibrations,
      device_id integer references devices,
      user_id integer not null references users,
      constraint captures_key_key unique (key),
      constraint captures_position_key unique (calibration_id, step, position),
      constraint captures_stream_names_reading
        check (source <> 'stream' or num_nulls(boot, n, device_id) = 0)
    );
    create unique index captures_one_per_reading on captures (calibration_id, step, device_id, boot, n)
      where device_id is not null;

    create table capture_exclusions (
      id integer generated always as identity primary key,
      key uuid not null,
      code text not null check (code in ('bubble', 'not-immersed', 'disturbed', 'wrong-solution', 'typing-slip',
        'instrument-fault')),
      note text check (length(note) <= 4000),
      at timestamptz not null,
      received_at timestamptz not null,
      capture_id integer not null references captures,
      user_id integer not null references users,
      constraint capture_exclusions_key_key unique (key),
      constraint capture_exclusions_once unique (capture_id)
    );

    create table signatures (
      id integer generated always as identity primary key,
      name text not null check (length(name) between 1 and 254),
      role text not null check (length(role) between 1 and 40),
      meaning text not null check (meaning in ('performed', 'approved', 'returned')),
      statement text not null check (length(statement) between 1 and 1000),
      method text not null check (length(method) between 1 and 200),
      record_hash char(64) not null check (record_hash ~ '^[0-9a-f]{64}$'),
      note text check (length(note) <= 4000),
      signed_at timestamptz not null,
      captured_at timestamptz not null,
      calibration_id integer not null references calibrations,
      user_id integer not null references users
    );
    create index signatures_calibration_id on signatures (calibration_id, signed_at);

    create trigger calibration_steps_append_only before update or delete or truncate on calibration_steps
      for each statement execute function refuse_change();
    create trigger captures_append_only before update or delete or truncate on captures
      for each statement execute function refuse_change();
    create trigger capture_exclusions_append_only before update or delete or truncate on capture_exclusions
      for each statement execute function refuse_change();
    create trigger signatures_append_only before update or delete or truncate on signatures
      for each statement execute function refuse_change();
  `,
  down: `
    drop table signatures;
    drop table capture_exclusions;
    drop table captures;
    drop table calibration_steps;
  `,
};
