import type { Migration } from './migration.ts';

// Ingest keeps devices, placements, points and settings in memory, because a look-up per reading would cost
// more than storing it. These triggers tell every ingest process at commit what has changed, whoever changed
// it, so that a revoked credential or a moved probe counts at once. A device is named; for the rest the table
// is enough, they are small and rarely written. What ingest itself writes to devices (presence, last seen) is
// left out.
export const announceDirectoryChanges: Migration = {
  name: '20261201091700-announce-directory-changes',
  up: `
    create function announce_device_change() returns trigger language plpgsql as $$
    begin
      if tg_op <> 'INSERT' then
        perform pg_notify('saltmark_directory', 'devices/' || old.name);
      end if;
      if tg_op <> 'DELETE' then
        perform pg_notify('saltmark_directory', 'devices/' || new.name);
      end if;
      return null;
    end
    $$;
    create trigger devices_announce
      after insert or delete or update of name, secret_hash, revoked_at, probe_id on devices
      for each row execute function announce_device_change();

    create function announce_table_change() returns trigger language plpgsql as $$
    begin
      perform pg_notify('saltmark_directory', tg_table_name);
      return null;
    end
    $$;
    create trigger probes_announce after insert or update or delete on probes
      for each statement execute function announce_table_change();
    create trigger assignments_announce after insert or update or delete on assignments
      for each statement execute function announce_table_change();
    create trigger points_announce after insert or update or delete on points
      for each statement execute function announce_table_change();
    create trigger settings_announce after insert or update or delete on settings
      for each statement execute function announce_table_change();
  `,
  down: `
    drop trigger settings_announce on settings;
    drop trigger points_announce on points;
    drop trigger assignments_announce on assignments;
    drop trigger probes_announce on probes;
    drop function announce_table_change();
    drop trigger devices_announce on devices;
    drop function announce_device_change();
  `,
};
