/** Makes a new cluster: its files, its three roles and its database. Each stage can be repeated after a break. */
import { randomBytes } from 'node:crypto';
import { chownSync, existsSync, mkdtempSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { run } from './commands.mjs';
import { makePrivateFolder } from './cluster-folder.mjs';
import { startFailure } from './cluster-failures.mjs';

export const roles = { superuser: 'saltmark_root', owner: 'saltmark_owner', app: 'saltmark_app' };
export const database = 'saltmark';

const newPassword = () => randomBytes(24).toString('base64url');

export const newPasswords = () => ({ superuser: newPassword(), owner: newPassword(), app: newPassword() });

/** `initdb` into a folder beside the final one, moved into place when complete: a break leaves nothing half done. */
export async function initialiseFiles({ pgdata, account, binaries, superuserPassword, fsync, log }) {
  const unfinished = `${pgdata}.new`;
  rmSync(unfinished, { recursive: true, force: true });
  makePrivateFolder(unfinished, account);

  const secretFolder = mkdtempSync(join(tmpdir(), 'saltmark-'));
  const secretFile = join(secretFolder, 'password');
  writeFileSync(secretFile, superuserPassword, { mode: 0o600 });
  if (account.uid !== undefined)
    for (const path of [secretFolder, secretFile]) chownSync(path, account.uid, account.gid);
  try {
    const args = ['-D', unfinished, '-U', roles.superuser, '-A', 'scram-sha-256', `--pwfile=${secretFile}`];
    args.push('-E', 'UTF8', '--locale=C.UTF-8', '--no-instructions', ...(fsync ? [] : ['--no-sync']));
    const code = await run(join(binaries, 'initdb'), args, { ...account, log, cwd: '/', detached: true });
    if (code !== 0) throw startFailure({ pgdata, log });
  } finally {
    rmSync(secretFolder, { recursive: true, force: true });
  }
  if (existsSync(pgdata)) rmSync(pgdata, { recursive: true, force: true });
  renameSync(unfinished, pgdata);
}

/** The application's role owns nothing: what it may do in each table is granted by the migrations. */
export async function makeRoles(client, passwords) {
  for (const name of [roles.owner, roles.app]) {
    const { rowCount } = await client.query('select 1 from pg_roles where rolname = $1', [name]);
    if (!rowCount) await client.query(`create role ${name}`);
  }
  const rights = 'login nosuperuser nocreatedb nocreaterole noreplication nobypassrls';
  await client.query(`alter role ${roles.owner} with ${rights} password '${passwords.owner}'`);
  await client.query(`alter role ${roles.app} with ${rights} password '${passwords.app}'`);
}
