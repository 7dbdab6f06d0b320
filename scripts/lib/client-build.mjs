/** The client, built when its sources have changed since the last build. */
import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { lastLines, run } from './commands.mjs';
import { dataFolder, logsFolder, root } from './paths.mjs';
import { Refusal, step } from './say.mjs';

const SOURCES = ['client', 'shared'];
const stampFile = join(dataFolder, 'client-build.txt');

function* filesUnder(folder) {
  const entries = readdirSync(folder, { withFileTypes: true }).sort((a, b) => (a.name < b.name ? -1 : 1));
  for (const entry of entries) {
    const path = join(folder, entry.name);
    if (!entry.isDirectory()) yield path;
    else if (entry.name !== 'dist' && entry.name !== 'node_modules') yield* filesUnder(path);
  }
}

/** One hash over the content of everything a build reads. */
export function sourceHash(folder = root) {
  const hash = createHash('sha256');
  for (const source of SOURCES) {
    for (const file of filesUnder(join(folder, source)))
      hash.update(file.slice(folder.length)).update(readFileSync(file));
  }
  hash.update(readFileSync(join(folder, 'package-lock.json')));
  return hash.digest('hex');
}

const lastBuilt = () => (existsSync(stampFile) ? readFileSync(stampFile, 'utf8').trim() : '');

export async function ensureClientBuilt({ onStart } = {}) {
  const wanted = sourceHash();
  if (lastBuilt() === wanted && existsSync(join(root, 'client/dist/index.html'))) return;
  const log = join(logsFolder, 'client-build.log');
  rmSync(log, { force: true });
  rmSync(stampFile, { force: true });
  const vite = join(root, 'node_modules/vite/bin/vite.js');
  const code = await step('Building the pages', () =>
    run(process.execPath, [vite, 'build', 'client'], {
      log,
      onStart,
      env: { ...process.env, NODE_ENV: 'production', NO_COLOR: '1' },
    }),
  );
  if (code !== 0) {
    throw new Refusal('The pages could not be built.', `See ${log}.`, { details: lastLines(log) });
  }
  writeFileSync(stampFile, `${wanted}\n`);
}
