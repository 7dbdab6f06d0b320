/** Debian packages that are missing: installed by apt-get, as root or through sudo, and nothing beyond them. */
import { spawnSync } from 'node:child_process';
import { existsSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { findOnPath, lastLines, run } from './commands.mjs';
import { requireFreeSpace } from './disk-space.mjs';
import { logsFolder } from './paths.mjs';
import { installedPostgres } from './postgres-binaries.mjs';
import { Refusal, step } from './say.mjs';

export function findChromium() {
  const known = ['/usr/bin/chromium', '/usr/bin/chromium-browser', '/usr/bin/google-chrome'];
  return known.find((file) => existsSync(file)) ?? findOnPath('chromium');
}

const detectors = {
  postgresql: () => installedPostgres().length > 0,
  chromium: () => findChromium() !== undefined,
  'poppler-utils': () => findOnPath('pdftotext') !== undefined,
};

export const missingPackages = (names) => names.filter((name) => !detectors[name]());

/**
 * The script that runs as root. Debian's server package makes and starts a cluster of its own when it is first
 * installed; a drop-in file, removed at the end, tells it not to. A machine that has clusters keeps them as they are.
 */
export function installScript(names) {
  const lines = [
    'set -e',
    'export DEBIAN_FRONTEND=noninteractive',
    'apt-get update -qq || true',
    'install() { apt-get install -y -qq --no-install-recommends -o DPkg::Lock::Timeout=120 "$@"; }',
  ];
  if (names.includes('postgresql')) {
    lines.push(
      'install postgresql-common',
      'drop_ins=/etc/postgresql-common/createcluster.d',
      'mkdir -p "$drop_ins"',
      'trap \'rm -f "$drop_ins/saltmark.conf"; rmdir --ignore-fail-on-non-empty "$drop_ins"\' EXIT',
      'echo "create_main_cluster = false" > "$drop_ins/saltmark.conf"',
    );
  }
  lines.push(`install ${names.join(' ')}`);
  return lines.join('\n');
}

/** How to become root: nothing as root, sudo when it answers without asking or can ask the person, else undefined. */
function becomeRoot() {
  if (process.getuid?.() === 0) return [];
  const sudo = findOnPath('sudo');
  if (!sudo) return undefined;
  if (spawnSync(sudo, ['-n', 'true'], { stdio: 'ignore' }).status === 0) return [sudo, '-n'];
  // Ask once, on the terminal, before the output goes to a log; the answer is remembered for the next command.
  if (process.stdin.isTTY && spawnSync(sudo, ['-v'], { stdio: 'inherit' }).status === 0) return [sudo];
  return undefined;
}

const titles = { postgresql: 'PostgreSQL', chromium: 'Chromium', 'poppler-utils': 'the PDF tools' };
const inWords = (names) => names.map((name) => titles[name]).join(' and ');

export async function ensureDebianPackages(names, { onStart } = {}) {
  const missing = missingPackages(names);
  if (missing.length === 0) return;
  const command = `apt-get install --no-install-recommends ${missing.join(' ')}`;
  const again = 'then start again.';
  if (!findOnPath('apt-get')) {
    throw new Refusal(
      `${inWords(missing)} is missing, and this is not Debian.`,
      `Install it with this system's own tools, ${again}`,
    );
  }
  const prefix = becomeRoot();
  if (!prefix) {
    throw new Refusal(
      `${inWords(missing)} is missing, and installing it needs root or sudo.`,
      `Ask an administrator to run: ${command} — ${again}`,
    );
  }
  requireFreeSpace('/var', { needed: missing.includes('chromium') ? 1_200 : 500 });
  const log = join(logsFolder, 'apt.log');
  rmSync(log, { force: true });
  const [program, ...args] = [...prefix, 'sh', '-c', installScript(missing)];
  const code = await step(`Installing ${inWords(missing)} from Debian's packages (once)`, () =>
    run(program, args, { log, onStart }),
  );
  if (code === 0 && missingPackages(missing).length === 0) return;
  throw new Refusal(
    `${inWords(missing)} could not be installed.`,
    `See ${log}; check the network connection, or run it yourself: ${prefix.length ? 'sudo ' : ''}${command}`,
    { details: lastLines(log, 8) },
  );
}
