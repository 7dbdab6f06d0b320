import type { Migration } from './migration.ts';

// site_id null stands for all sites. An auditor is a guest: the grant always has a last day.
export const createMemberships: Migration = {
  name: '20261201090300-create-memberships',
  up: `
    create table memberships (
      id integer generated always as identity primary key,
      role text not null check (role in ('technician', 'manager', 'operator', 'auditor', 'administrator')),
      created_at timestamptz not null default now(),
      ends_on date,
      ended_at timestamptz,
      user_id integer not null references users,
      site_id integer references sites,
      constraint memberships_auditor_ends check (role <> 'auditor' or ends_on is not null)
    );
    create unique index memberships_one_role_per_site
      on memberships (user_id, coalesce(site_id, 0)) where ended_at is null;
    create index memberships_site_id on memberships (site_id);
  `,
  down: `
    drop table memberships;
  `,
};
