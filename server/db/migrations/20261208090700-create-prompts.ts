import type { Migration } from './migration.ts';

export const createPrompts: Migration = {
  name: '20261208090700-create-prompts',
  up: `
    create table prompts (
      id integer generated always as identity primary key,
      kind text not null check (kind in ('due-soon', 'overdue')),
      due_on date not null,
      raised_at timestamptz not null,
      closed_at timestamptz,
      probe_id integer not null references probes,
      point_id integer not null references points,
      site_id integer not null references sites,
      constraint prompts_raised_before_closed check (raised_at <= closed_at)
    );
    create unique index prompts_one_open_per_probe on prompts (probe_id, kind) where closed_at is null;
    create index prompts_site_id on prompts (site_id, raised_at desc);
    create index prompts_point_id on prompts (point_id);
  `,
  down: `
    drop table prompts;
  `,
};
