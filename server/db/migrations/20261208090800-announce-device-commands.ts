import type { Migration } from './migration.ts';

// The order is written by the server that took the signature and carried out by one that is connected to the broker:
// it hears of it at commit, and takes it by setting sent_at, so that two of them never send the same order.
export const announceDeviceCommands: Migration = {
  name: '20261208090800-announce-device-commands',
  up: `
    alter table device_commands add column sent_at timestamptz;
    create trigger device_commands_announce after insert on device_commands
      for each statement execute function announce_table_change();
  `,
  down: `
    drop trigger device_commands_announce on device_commands;
    alter table device_commands drop column sent_at;
  `,
};
