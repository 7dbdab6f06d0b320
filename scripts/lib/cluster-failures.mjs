/** Turns what PostgreSQL wrote in its log into one sentence and a way out. */
import { lastLines } from './commands.mjs';
import { diskFullRefusal } from './disk-space.mjs';
import { Refusal } from './say.mjs';

const startAfresh = (pgdata) =>
  `To start afresh, move it away (mv ${pgdata} ${pgdata}.broken) and run npm start again; to keep its content, restore it from a copy first.`;

const causes = [
  {
    pattern: /No space left on device|could not (?:write|extend|create) .*: (?:Disk quota exceeded)/i,
    refusal: (pgdata) => diskFullRefusal(pgdata),
  },
  {
    pattern: /database files are incompatible with server/i,
    refusal: (pgdata) =>
      new Refusal(
        `The database in ${pgdata} was made by another version of PostgreSQL than the one installed here.`,
        `Install the version named above, or start afresh. ${startAfresh(pgdata)}`,
      ),
  },
  {
    pattern:
      /control file|pg_control|PANIC|invalid (?:primary )?checkpoint|could not (?:open|read|access|find) .*(?:file|directory)|invalid page|does not exist|not a valid data directory|is not a database cluster directory|could not locate/i,
    refusal: (pgdata) =>
      new Refusal(`The database in ${pgdata} is damaged and cannot be opened.`, startAfresh(pgdata)),
  },
  {
    pattern: /invalid permissions|wrong ownership|Permission denied/i,
    refusal: (pgdata) =>
      new Refusal(
        `The files of the database in ${pgdata} belong to another user.`,
        'Start Saltmark as the user who started it first (root, or the owner of the clone).',
      ),
  },
  {
    pattern: /could not map anonymous shared memory|Cannot allocate memory/i,
    refusal: () =>
      new Refusal(
        'There is not enough memory to start PostgreSQL (it asks for about 300 MB).',
        'Close other programs and start again.',
      ),
  },
];

export const isPortTaken = (log) => /Address already in use|could not bind/i.test(lastLines(log).join('\n'));
export const isStillEnding = (log) => /pre-existing shared memory block/i.test(lastLines(log).join('\n'));

export function startFailure({ pgdata, log }) {
  const details = lastLines(log, 8);
  const text = details.join('\n');
  const cause = causes.find(({ pattern }) => pattern.test(text));
  const refusal =
    cause?.refusal(pgdata) ??
    new Refusal(
      `PostgreSQL did not start with the data in ${pgdata}.`,
      `Its log ${log} says why. ${startAfresh(pgdata)}`,
    );
  refusal.details = details;
  return refusal;
}

export function versionMismatch({ pgdata, made, installed }) {
  return new Refusal(
    `The database in ${pgdata} was made by PostgreSQL ${made}, and this machine has ${installed.map(({ major }) => major).join(', ')}.`,
    `Install it (apt-get install postgresql-${made}), or start afresh. ${startAfresh(pgdata)}`,
  );
}

export const unreadableSettings = (file, pgdata) =>
  new Refusal(
    `The file ${file}, which holds the database's port and passwords, is missing or cannot be read.`,
    startAfresh(pgdata),
  );
