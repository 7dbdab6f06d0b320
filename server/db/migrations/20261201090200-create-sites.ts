import type { Migration } from './migration.ts';

export const createSites: Migration = {
  name: '20261201090200-create-sites',
  up: `
    create table sites (
      id integer generated always as identity primary key,
      code text not null unique check (length(code) between 1 and 40 and code = btrim(code)),
      name text not null check (length(btrim(name)) between 1 and 120),
      time_zone text not null check (length(time_zone) between 1 and 64),
      policy jsonb not null default '{}' check (jsonb_typeof(policy) = 'object'),
      created_at timestamptz not null default now(),
      retired_at timestamptz,
      version integer not null default 0
    );
    create unique index sites_code_lower_key on sites (lower(code));

    create table areas (
      id integer generated always as identity primary key,
      name text not null check (length(btrim(name)) between 1 and 120),
      position integer not null default 0 check (position >= 0),
      created_at timestamptz not null default now(),
      site_id integer not null references sites,
      unique (site_id, name)
    );
  `,
  down: `
    drop table areas;
    drop table sites;
  `,
};
