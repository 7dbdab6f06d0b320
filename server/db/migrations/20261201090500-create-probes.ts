import type { Migration } from './migration.ts';

// cell_constants and probe_events are history: the application may add rows, never change them
// (see grants.ts). probes.cell_constant_per_cm repeats the newest approved record for quick reading.
export const createProbes: Migration = {
  name: '20261201090500-create-probes',
  up: `
    create table probes (
      id integer generated always as identity primary key,
      serial text not null unique check (length(serial) between 1 and 60 and serial = btrim(serial)),
      tag text not null unique check (length(tag) between 1 and 60 and tag = btrim(tag)),
      kind text not null check (kind in ('two-electrode', 'four-electrode', 'inductive')),
      nominal_cell_constant_per_cm double precision not null
        check (nominal_cell_constant_per_cm > 0 and nominal_cell_constant_per_cm <= 1000),
      cell_constant_per_cm double precision not null
        check (cell_constant_per_cm > 0 and cell_constant_per_cm <= 1000),
      range_low_us_cm double precision not null check (range_low_us_cm >= 0),
      range_high_us_cm double precision not null check (range_high_us_cm < 'Infinity'),
      resolution_us_cm double precision check (resolution_us_cm > 0 and resolution_us_cm < 'Infinity'),
      temperature_sensor text not null check (temperature_sensor in ('pt100', 'pt1000', 'ntc', 'other')),
      device_compensation text not null
        check (device_compensation in ('none', 'linear', 'natural-water', 'unknown')),
      notes text not null default '' check (length(notes) <= 4000),
      status text not null check (status in ('in-service', 'spare', 'quarantined', 'retired')),
      created_at timestamptz not null default now(),
      retired_at timestamptz,
      retired_reason text check (length(btrim(retired_reason)) between 3 and 1000),
      version integer not null default 0,
      site_id integer not null references sites,
      constraint probes_range_low_below_high check (range_low_us_cm < range_high_us_cm),
      constraint probes_retired_has_reason check (
        (status = 'retired') = (retired_at is not null) and (status = 'retired') = (retired_reason is not null))
    );
    create unique index probes_serial_lower_key on probes (lower(serial));
    create unique index probes_tag_lower_key on probes (lower(tag));
    create index probes_site_id on probes (site_id);

    create table cell_constants (
      id integer generated always as identity primary key,
      cell_constant_per_cm double precision not null
        check (cell_constant_per_cm > 0 and cell_constant_per_cm <= 1000),
      from_at timestamptz not null,
      origin text not null check (origin in ('registered', 'calibration', 'device-reported')),
      reason text check (length(reason) <= 1000),
      recorded_at timestamptz not null default now(),
      probe_id integer not null references probes,
      user_id integer references users
    );
    create index cell_constants_probe_id on cell_constants (probe_id, from_at);

    create table probe_events (
      id integer generated always as identity primary key,
      kind text not null check (kind in ('registered', 'installed', 'moved', 'removed', 'cleaned', 'adjusted',
        'settings-changed', 'retired', 'credentials-issued', 'credentials-revoked', 'note', 'fault')),
      detail jsonb not null default '{}' check (jsonb_typeof(detail) = 'object'),
      at timestamptz not null,
      recorded_at timestamptz not null default now(),
      probe_id integer not null references probes,
      point_id integer references points,
      user_id integer references users
    );
    create index probe_events_probe_id on probe_events (probe_id, at);
    create index probe_events_point_id on probe_events (point_id, at);
  `,
  down: `
    drop table probe_events;
    drop table cell_constants;
    drop table probes;
  `,
};
