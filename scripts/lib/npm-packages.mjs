/** The npm packages: installed exactly as package-lock.json says, when anything differs. */
import { createHash } from 'node:crypto';
import { existsSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { findOnPath, lastLines, run } from './commands.mjs';
import { requireFreeSpace } from './disk-space.mjs';
import { logsFolder, root } from './paths.mjs';
import { Refusal, step } from './say.mjs';

const OLDEST_NODE = [20, 19];

export function requireNode(version = process.versions.node) {
  const [major, minor] = version.split('.').map(Number);
  if (major > OLDEST_NODE[0] || (major === OLDEST_NODE[0] && minor >= OLDEST_NODE[1])) return;
  throw new Refusal(
    `Saltmark needs Node ${OLDEST_NODE.join('.')} or newer, and this is ${version}.`,
    'Install a newer Node and start again.',
  );
}

function readLock(file) {
  try {
    return JSON.parse(readFileSync(file, 'utf8')).packages ?? {};
  } catch {
    return undefined;
  }
}

/**
 * True when every package of the lock is installed in that version. npm writes what it has installed to
 * node_modules/.package-lock.json at the very end, so an interrupted install is seen too.
 */
export function areInstalled(wanted, installed) {
  if (!wanted || !installed) return false;
  return Object.entries(wanted).every(
    ([path, { version, optional, extraneous, peer, devOptional }]) =>
      path === '' ||
      optional ||
      devOptional ||
      (peer && !installed[path]) ||
      installed[path]?.version === version,
  );
}

/** After our own install: the lock it was made from. The packages come and go with the folder, and so does this. */
const stampFile = (folder) => join(folder, 'node_modules/.saltmark-lock');
const lockHash = (folder) =>
  createHash('sha256')
    .update(readFileSync(join(folder, 'package-lock.json')))
    .digest('hex');

function isUpToDate(folder) {
  const installed = readLock(join(folder, 'node_modules/.package-lock.json'));
  if (!installed) return false;
  const stamp = stampFile(folder);
  if (existsSync(stamp) && readFileSync(stamp, 'utf8') === lockHash(folder)) return true;
  return areInstalled(readLock(join(folder, 'package-lock.json')), installed);
}

/** npm beside this Node, so that a shell without it on the PATH works too. */
const npm = () => {
  const beside = join(dirname(process.execPath), 'npm');
  return existsSync(beside) ? beside : findOnPath('npm');
};

export async function ensureNpmPackages({ folder = root, onStart } = {}) {
  if (isUpToDate(folder)) return;

  const program = npm();
  if (!program)
    throw new Refusal('npm is missing beside Node.', 'Install npm (apt-get install npm) and start again.');
  requireFreeSpace(folder, { needed: 1_200 });
  const log = join(logsFolder, 'npm.log');
  rmSync(log, { force: true });
  // Development packages too, whatever NODE_ENV says: the client is built here.
  const args = ['ci', '--include=dev', '--no-audit', '--no-fund', '--loglevel=error'];
  const code = await step('Installing npm packages (about a minute, once)', () =>
    run(program, args, {
      cwd: folder,
      log,
      onStart,
      env: { ...process.env, PATH: `${dirname(process.execPath)}:${process.env.PATH}` },
    }),
  );
  if (code === 0) {
    writeFileSync(stampFile(folder), lockHash(folder));
    return;
  }
  throw new Refusal(
    'The npm packages could not be installed.',
    `See ${log}; check the network connection and start again.`,
    {
      details: lastLines(log, 8),
    },
  );
}
