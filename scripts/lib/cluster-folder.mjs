/** Where a private cluster's files live, and as which user its server runs. */
import { createHash } from 'node:crypto';
import { execFileSync } from 'node:child_process';
import { chownSync, existsSync, mkdirSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import { basename, join } from 'node:path';
import { Refusal } from './say.mjs';

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

/**
 * Answers `{ folder, pgdata, account }`; `account` is empty for an ordinary user.
 * As root the server runs as `postgres`; where that user cannot reach `dir`, the files live under /var/lib/saltmark.
 */
export function clusterFolder(dir) {
  mkdirSync(dir, { recursive: true });
  if (!isRoot()) return { folder: dir, pgdata: join(dir, 'data'), account: {} };

  const account = postgresAccount();
  let folder = dir;
  if (!canReach(dir, account)) {
    const mark = createHash('sha256').update(dir).digest('hex').slice(0, 12);
    folder = join(ROOT_FOLDER, `${basename(dir)}-${mark}`);
    mkdirSync(folder, { recursive: true });
    writeFileSync(join(folder, 'made-for'), `${dir}\n`);
    writeFileSync(join(dir, 'moved-to'), `${folder}\n`);
  }
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
