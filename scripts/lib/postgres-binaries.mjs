/** Finds PostgreSQL's programs where Debian or a person has put them. */
import { accessSync, constants, existsSync, readdirSync, readFileSync, realpathSync } from 'node:fs';
import { execFileSync } from 'node:child_process';
import { dirname, join } from 'node:path';
import { findOnPath } from './commands.mjs';

const OLDEST_SUPPORTED = 13;
const DEBIAN_FOLDER = '/usr/lib/postgresql';

function hasServer(folder) {
  return ['initdb', 'postgres'].every((name) => {
    try {
      accessSync(join(folder, name), constants.X_OK);
      return true;
    } catch {
      return false;
    }
  });
}

function majorVersion(folder) {
  const answer = execFileSync(join(folder, 'postgres'), ['--version'], { encoding: 'utf8' });
  return Number(/(\d+)(?:\.|devel|beta|rc|\s|$)/.exec(answer.replace(/^[^0-9]*/, ''))?.[1] ?? 0);
}

/** Every usable installation, newest first: `{ folder, major }`. */
export function installedPostgres({ debianFolder = DEBIAN_FOLDER, path = process.env.PATH } = {}) {
  const folders = existsSync(debianFolder)
    ? readdirSync(debianFolder).map((v) => join(debianFolder, v, 'bin'))
    : [];
  const onPath = findOnPath('initdb', `${path ?? ''}:/usr/local/bin:/usr/local/pgsql/bin`);
  if (onPath) folders.push(dirname(realpathSync(onPath)));
  return [...new Set(folders)]
    .filter(hasServer)
    .map((folder) => ({ folder, major: majorVersion(folder) }))
    .filter(({ major }) => major >= OLDEST_SUPPORTED)
    .sort((a, b) => b.major - a.major);
}

/** The major version a data folder was made by, or undefined when there is none yet. */
export function dataVersion(pgdata) {
  try {
    return Number.parseInt(readFileSync(join(pgdata, 'PG_VERSION'), 'utf8'), 10);
  } catch {
    return undefined;
  }
}
