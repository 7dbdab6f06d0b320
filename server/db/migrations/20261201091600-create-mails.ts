import type { Migration } from './migration.ts';

// The outbox: written in the transaction that causes the mail, sent by a job afterwards. dedupe_key lets a
// repeated cause send one mail.
export const createMails: Migration = {
  name: '20261201091600-create-mails',
  up: `
    create table mails (
      id integer generated always as identity primary key,
      kind text not null check (length(kind) between 1 and 80),
      to_address text not null check (length(to_address) between 3 and 254),
      subject text not null check (length(subject) between 1 and 400),
      text_body text not null,
      html_body text,
      dedupe_key text unique check (length(dedupe_key) between 1 and 200),
      attempts integer not null default 0 check (attempts >= 0),
      last_error text,
      created_at timestamptz not null default now(),
      send_after timestamptz not null default now(),
      sent_at timestamptz
    );
    create index mails_unsent on mails (send_after) where sent_at is null;
  `,
  down: `
    drop table mails;
  `,
};
