/** Where a private cluster's files live, and as which user its server runs. */
import { randomBytes } from 'node:crypto';
import { execFileSync } from 'node:child_process';
import {
  chownSync,
  existsSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  statSync,
  writeFileSync,
} from 'node:fs';
import { basename, join } from 'node:path';
import { Refusal, say } from './say.mjs';

const ROOT_FOLDER = '/var/lib/saltmark';

const isRoot = () => process.getuid?.() === 0;

/** uid and gid of the account `postgres`, from the account file (no dependency, no subprocess). */
function postgresAccount(passwd = readFileSync('/etc/passwd', 'utf8')) {
  const fields = passwd
    .split('\n')
    .map((line) => line.split(':'))
    .find(([name]) => name === 'postgres');
  if (!fields) {
    throw new Refusal(
      'PostgreSQL refuses to run as root, and this machine has no user named postgres to run it as.',
      'Create one (useradd --system --create-home postgres), or start Saltmark as an ordinary user.',
    );
  }
  return { uid: Number(fields[2]), gid: Number(fields[3]) };
}

/** True when that user can go through every folder down to this one. */
function canReach(folder, { uid, gid }) {
  try {
    execFileSync('/usr/bin/test', ['-x', folder], { uid, gid, cwd: '/', stdio: 'ignore' });
    return true;
  } catch {
    return false;
  }
}

const readLine = (file) => (existsSync(file) ? readFileSync(file, 'utf8').trim() : '');

/** Folders under /var/lib/saltmark that an earlier clone at the same place has left. */
function earlierFolders(dir, current) {
  const names = existsSync(ROOT_FOLDER) ? readdirSync(ROOT_FOLDER) : [];
  return names
    .map((name) => join(ROOT_FOLDER, name))
    .filter((folder) => folder !== current && readLine(join(folder, 'made-for')) === dir);
}

/** A folder that user postgres can reach; `moved-to` in `dir` remembers it, so a fresh clone gets a fresh one. */
function folderElsewhere(dir) {
  const pointer = join(dir, 'moved-to');
  const known = readLine(pointer);
  if (known && existsSync(known)) return known;
  const folder = join(ROOT_FOLDER, `${basename(dir)}-${randomBytes(6).toString('hex')}`);
  mkdirSync(folder, { recursive: true });
  writeFileSync(join(folder, 'made-for'), `${dir}\n`);
  writeFileSync(pointer, `${folder}\n`);
  for (const earlier of earlierFolders(dir, folder)) {
    say(
      `  An earlier clone at this place has left its database in ${earlier}; remove it if nobody needs it.`,
    );
  }
  return folder;
}

/**
 * Answers `{ folder, pgdata, account }`; `account` is empty for an ordinary user.
 * As root the server runs as `postgres`; where that user cannot reach `dir`, the files live under /var/lib/saltmark.
 */
export function clusterFolder(dir) {
  mkdirSync(dir, { recursive: true });
  if (!isRoot()) return { folder: dir, pgdata: join(dir, 'data'), account: {} };

  const account = postgresAccount();
  const folder = canReach(dir, account) ? dir : folderElsewhere(dir);
  const pgdata = join(folder, 'data');
  // Data made earlier by an ordinary user stays that user's: the server insists on owning its files.
  const owner = existsSync(pgdata) ? statSync(pgdata) : undefined;
  if (owner && owner.uid !== 0) return { folder, pgdata, account: { uid: owner.uid, gid: owner.gid } };
  return { folder, pgdata, account };
}

/** Makes a folder that belongs to the server's user and to nobody else. */
export function makePrivateFolder(folder, account) {
  mkdirSync(folder, { mode: 0o700 });
  if (account.uid !== undefined) chownSync(folder, account.uid, account.gid);
}
