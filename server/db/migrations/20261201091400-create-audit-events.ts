import type { Migration } from './migration.ts';

// The trail of who did what. sequence is given by the audit service, not by an identity column: identity
// numbers leave gaps when a transaction is undone, and here a gap means that a row was taken away. Two
// events can never follow the same one (previous_hash is unique), so the chain cannot fork.
// Instants keep milliseconds only, because the hash is computed over their text with milliseconds.
// The trigger is ENABLE ALWAYS: not even session_replication_role switches it off. No foreign keys: an
// event keeps the name and id of its actor whatever happens to the row.
export const createAuditEvents: Migration = {
  name: '20261201091400-create-audit-events',
  up: `
    create table audit_events (
      sequence bigint primary key check (sequence > 0),
      captured_at timestamptz(3) not null,
      received_at timestamptz(3) not null,
      actor_kind text not null check (actor_kind in ('user', 'device', 'system')),
      actor_id integer,
      actor_name text not null check (length(actor_name) between 1 and 254),
      acting_role text check (length(acting_role) between 1 and 40),
      action text not null check (length(action) between 1 and 120),
      object_kind text not null check (length(object_kind) between 1 and 80),
      object_id text check (length(object_id) between 1 and 200),
      object_version integer check (object_version >= 0),
      site_id integer,
      old_value jsonb,
      new_value jsonb,
      reason text check (length(reason) <= 4000),
      source jsonb not null default '{}' check (jsonb_typeof(source) = 'object'),
      previous_hash char(64) not null unique check (previous_hash ~ '^[0-9a-f]{64}$'),
      hash char(64) not null unique check (hash ~ '^[0-9a-f]{64}$')
    );
    create index audit_events_object on audit_events (object_kind, object_id);
    create index audit_events_captured_at on audit_events (captured_at);
    create index audit_events_actor_id on audit_events (actor_id);

    create function refuse_change() returns trigger language plpgsql as $$
    begin
      raise exception '% is append-only: % refused', tg_table_name, lower(tg_op)
        using errcode = 'insufficient_privilege';
    end
    $$;
    create trigger audit_events_append_only before update or delete or truncate on audit_events
      for each statement execute function refuse_change();
    alter table audit_events enable always trigger audit_events_append_only;
  `,
  down: `
    drop table audit_events;
    drop function refuse_change();
  `,
};
