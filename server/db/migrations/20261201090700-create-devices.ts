import type { Migration } from './migration.ts';

// Boot ids are compared byte by byte, as devices make them: a language collation would put lower-case
// letters between upper-case ones and call an old boot new.
export const createDevices: Migration = {
  name: '20261201090700-create-devices',
  up: `
    create table devices (
      id integer generated always as identity primary key,
      name text not null unique check (name ~ '^[a-z0-9-]{4,40}$'),
      secret_hash text not null check (length(secret_hash) between 1 and 400),
      firmware text check (length(firmware) <= 60),
      settings_hash text check (length(settings_hash) <= 80),
      reported_cell_constant_per_cm double precision
        check (reported_cell_constant_per_cm > 0 and reported_cell_constant_per_cm <= 1000),
      reading_interval_s double precision check (reading_interval_s > 0 and reading_interval_s <= 86400),
      clock_offset_ms double precision check (clock_offset_ms > '-Infinity' and clock_offset_ms < 'Infinity'),
      clock_source text check (length(clock_source) <= 20),
      duplicate_count bigint not null default 0 check (duplicate_count >= 0),
      is_online boolean not null default false,
      online_why text check (online_why in ('start', 'planned', 'lost')),
      boot_text text collate "C" check (length(boot_text) between 1 and 40),
      state_at timestamptz,
      last_seen_at timestamptz,
      credentials_issued_at timestamptz not null,
      revoked_at timestamptz,
      created_at timestamptz not null default now(),
      version integer not null default 0,
      probe_id integer not null references probes
    );
    create unique index devices_one_active_per_probe on devices (probe_id) where revoked_at is null;
    create index devices_probe_id on devices (probe_id);

    create table device_boots (
      id integer generated always as identity primary key,
      boot text collate "C" not null check (length(boot) between 1 and 40),
      first_seen_at timestamptz not null default now(),
      device_id integer not null references devices,
      unique (device_id, boot)
    );

    create table device_settings (
      id integer generated always as identity primary key,
      settings_hash text not null check (length(settings_hash) between 1 and 80),
      cell_constant_per_cm double precision
        check (cell_constant_per_cm > 0 and cell_constant_per_cm <= 1000),
      birth jsonb,
      first_seen_at timestamptz not null default now(),
      device_id integer not null references devices,
      unique (device_id, settings_hash)
    );
  `,
  down: `
    drop table device_settings;
    drop table device_boots;
    drop table devices;
  `,
};
