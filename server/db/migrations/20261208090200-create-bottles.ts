import type { Migration } from './migration.ts';

export const createBottles: Migration = {
  name: '20261208090200-create-bottles',
  up: `
    create table bottles (
      id integer generated always as identity primary key,
      code text not null check (length(code) between 1 and 90 and code = btrim(code)),
      volume_ml double precision not null check (volume_ml > 0 and volume_ml <= 20000),
      remaining_ml double precision not null check (remaining_ml >= 0),
      opened_at timestamptz,
      use_by_on date,
      discarded_at timestamptz,
      discarded_reason text check (length(btrim(discarded_reason)) between 3 and 1000),
      created_at timestamptz not null default now(),
      version integer not null default 0,
      standard_id integer not null references standards,
      site_id integer references sites,
      opened_by integer references users,
      constraint bottles_code_key unique (code),
      constraint bottles_remaining_within_volume check (remaining_ml <= volume_ml),
      constraint bottles_opened_by_somebody check ((opened_at is null) = (opened_by is null)),
      constraint bottles_discarded_has_reason check ((discarded_at is null) = (discarded_reason is null))
    );
    create unique index bottles_code_lower_key on bottles (lower(code));
    create index bottles_standard_id on bottles (standard_id);
    create index bottles_site_id on bottles (site_id);
  `,
  down: `
    drop table bottles;
  `,
};
