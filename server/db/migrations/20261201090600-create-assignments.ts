import type { Migration } from './migration.ts';

// A probe stands at one point at a time and a point holds one probe at a time: the exclusion constraints
// refuse overlaps whoever writes. btree_gist lets them compare ids beside time ranges; it may have been there
// before (only its owner may drop it), so that the way back leaves it.
export const createAssignments: Migration = {
  name: '20261201090600-create-assignments',
  up: `
    create extension if not exists btree_gist;

    create table assignments (
      id integer generated always as identity primary key,
      from_at timestamptz not null,
      to_at timestamptz,
      note text not null default '' check (length(note) <= 1000),
      probe_id integer not null references probes,
      point_id integer not null references points,
      installed_by integer not null references users,
      removed_by integer references users,
      constraint assignments_from_before_to check (from_at < to_at),
      constraint assignments_removed_has_end check (removed_by is null or to_at is not null),
      constraint assignments_probe_at_one_point
        exclude using gist (probe_id with =, tstzrange(from_at, to_at) with &&),
      constraint assignments_point_holds_one_probe
        exclude using gist (point_id with =, tstzrange(from_at, to_at) with &&)
    );
    create index assignments_probe_id on assignments (probe_id, from_at);
    create index assignments_point_id on assignments (point_id, from_at);
  `,
  down: `
    drop table assignments;
  `,
};
