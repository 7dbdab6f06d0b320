import type { Migration } from './migration.ts';

export const createNotices: Migration = {
  name: '20261201091300-create-notices',
  up: `
    create table notices (
      id integer generated always as identity primary key,
      kind text not null
        check (kind in ('reading-content-differs', 'cell-constant-without-record', 'device-replaced')),
      detail jsonb not null default '{}' check (jsonb_typeof(detail) = 'object'),
      at timestamptz not null,
      closed_at timestamptz,
      device_id integer references devices,
      probe_id integer references probes,
      closed_by integer references users,
      constraint notices_closed_by_follows_close check (closed_by is null or closed_at is not null)
    );
    create index notices_open on notices (at desc) where closed_at is null;
    create index notices_probe_id on notices (probe_id, at desc);
    create index notices_device_id on notices (device_id, kind);
  `,
  down: `
    drop table notices;
  `,
};
