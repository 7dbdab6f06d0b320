// `npm run check`: types, lint and format. All three run, so that one round shows everything.
import { run } from './lib/commands.mjs';
import { ensureNpmPackages, requireNode } from './lib/npm-packages.mjs';
import { makeDataFolder } from './lib/paths.mjs';
import { runEntryPoint, say } from './lib/say.mjs';

const checks = [
  { title: 'Types', args: ['node_modules/typescript/bin/tsc', '--noEmit', '-p', '.'] },
  { title: 'Lint', args: ['node_modules/eslint/bin/eslint.js', '.'] },
  { title: 'Format', args: ['node_modules/prettier/bin/prettier.cjs', '--check', '--log-level=warn', '.'] },
];

async function check() {
  requireNode();
  makeDataFolder();
  await ensureNpmPackages();
  const failed = [];
  for (const { title, args } of checks) {
    say(`· ${title}`);
    if ((await run(process.execPath, args)) !== 0) failed.push(title.toLowerCase());
  }
  say(failed.length === 0 ? 'Types, lint and format are in order.' : `To mend: ${failed.join(', ')}.`);
  return failed.length === 0 ? 0 : 1;
}

await runEntryPoint(check);
