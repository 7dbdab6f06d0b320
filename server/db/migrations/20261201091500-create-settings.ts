import type { Migration } from './migration.ts';

export const createSettings: Migration = {
  name: '20261201091500-create-settings',
  up: `
    create table settings (
      key text primary key check (length(key) between 1 and 120),
      value jsonb not null,
      updated_at timestamptz not null default now(),
      version integer not null default 0
    );
  `,
  down: `
    drop table settings;
  `,
};
