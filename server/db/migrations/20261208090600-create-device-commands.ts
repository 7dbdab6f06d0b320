import type { Migration } from './migration.ts';

// An order to a device is open until the device has answered and announced the value itself. Silence and another
// value end in failed, with words: never in an assumption.
export const createDeviceCommands: Migration = {
  name: '20261208090600-create-device-commands',
  up: `
    create table device_commands (
      id integer generated always as identity primary key,
      what text not null check (what in ('apply-cell-constant')),
      cell_constant_per_cm double precision not null
        check (cell_constant_per_cm > 0 and cell_constant_per_cm <= 1000),
      state text not null check (state in ('waiting', 'confirmed', 'failed')),
      requested_at timestamptz not null,
      answered_at timestamptz,
      detail text check (length(detail) <= 1000),
      device_id integer not null references devices,
      calibration_id integer not null references calibrations,
      requested_by integer not null references users,
      constraint device_commands_answered_when_closed check ((state = 'waiting') = (answered_at is null))
    );
    create index device_commands_calibration_id on device_commands (calibration_id, requested_at);
    create index device_commands_device_id on device_commands (device_id, requested_at);
    create index device_commands_open on device_commands (requested_at) where state <> 'confirmed';
  `,
  down: `
    drop table device_commands;
  `,
};
