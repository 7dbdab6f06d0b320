import type { Migration } from './migration.ts';

// Certificate files are evidence: kept as received, found by their hash, never changed or taken away.
export const createCertificates: Migration = {
  name: '20261208090100-create-certificates',
  up: `
    create table certificates (
      id integer generated always as identity primary key,
      sha256 char(64) not null check (sha256 ~ '^[0-9a-f]{64}$'),
      media_type text not null check (media_type in ('application/pdf', 'image/png', 'image/jpeg')),
      byte_count integer not null check (byte_count between 1 and 10485760),
      file_name text not null check (length(btrim(file_name)) between 1 and 200),
      content bytea not null,
      uploaded_at timestamptz not null,
      uploaded_by integer not null references users,
      constraint certificates_sha256_key unique (sha256),
      constraint certificates_byte_count_is_true check (octet_length(content) = byte_count)
    );
    create trigger certificates_append_only before update or delete or truncate on certificates
      for each statement execute function refuse_change();
    alter table standards
      add column opened_life_days integer check (opened_life_days between 1 and 3660),
      add column certificate_id integer references certificates;
    create index standards_certificate_id on standards (certificate_id);
  `,
  down: `
    alter table standards drop column certificate_id, drop column opened_life_days;
    drop table certificates;
  `,
};
