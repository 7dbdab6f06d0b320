import type { Migration } from './migration.ts';

// Messages ingest could not use. Up to 64 KiB of each is kept; payload_bytes is the length it had.
export const createQuarantinedMessages: Migration = {
  name: '20261201091200-create-quarantined-messages',
  up: `
    create table quarantined_messages (
      id integer generated always as identity primary key,
      device_name text check (length(device_name) <= 200),
      client_id text check (length(client_id) <= 200),
      topic text not null check (length(topic) <= 1000),
      code text not null check (code in ('topic-unknown', 'device-unknown', 'device-wrong', 'too-large',
        'not-json', 'version-unknown', 'schema-invalid', 'time-in-future', 'time-too-old')),
      reason text not null check (length(reason) <= 4000),
      payload bytea not null check (octet_length(payload) <= 65536),
      payload_bytes integer not null,
      received_at timestamptz not null default now(),
      resolved_at timestamptz,
      resolution text check (length(btrim(resolution)) between 1 and 1000),
      resolved_by integer references users,
      constraint quarantined_messages_length_is_true check (payload_bytes >= octet_length(payload)),
      constraint quarantined_messages_resolved_whole check (num_nulls(resolved_at, resolution, resolved_by) in (0, 3))
    );
    create index quarantined_messages_received_at on quarantined_messages (received_at desc);
    create index quarantined_messages_open on quarantined_messages (received_at desc) where resolved_at is null;
  `,
  down: `
    drop table quarantined_messages;
  `,
};
