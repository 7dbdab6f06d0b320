import type { Migration } from './migration.ts';

// The columns connect-pg-simple reads and writes. `expire` carries its zone, so that a server whose
// clock setting differs from the client's ends no session early. The second index finds the sessions
// of one person: "sign out everywhere".
export const createSessions: Migration = {
  name: '20261201090100-create-sessions',
  up: `
    create table sessions (
      sid varchar primary key,
      sess json not null,
      expire timestamptz(6) not null
    );
    create index sessions_expire on sessions (expire);
    create index sessions_user on sessions ((sess -> 'passport' ->> 'user'));
  `,
  down: `
    drop table sessions;
  `,
};
