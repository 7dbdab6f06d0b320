import type { Migration } from './migration.ts';

export const createUsers: Migration = {
  name: '20261201090000-create-users',
  up: `
    create table users (
      id integer generated always as identity primary key,
      email text not null check (length(email) between 3 and 254 and email = btrim(email)),
      name text not null check (length(btrim(name)) between 1 and 120),
      password_hash text check (length(password_hash) between 1 and 400),
      failed_sign_ins integer not null default 0 check (failed_sign_ins >= 0),
      locked_until timestamptz,
      password_changed_at timestamptz,
      last_sign_in_at timestamptz,
      created_at timestamptz not null default now(),
      deactivated_at timestamptz,
      version integer not null default 0
    );
    create unique index users_email_key on users (lower(email));

    create table password_tokens (
      id integer generated always as identity primary key,
      token_hash text not null unique check (length(token_hash) between 1 and 400),
      purpose text not null check (purpose in ('set-password')),
      created_at timestamptz not null default now(),
      expires_at timestamptz not null,
      used_at timestamptz,
      user_id integer not null references users
    );
    create index password_tokens_user_id on password_tokens (user_id);
  `,
  down: `
    drop table password_tokens;
    drop table users;
  `,
};
