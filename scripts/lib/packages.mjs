/** Everything a command needs that is not there yet. */
import { ensureDebianPackages } from './debian-packages.mjs';
import { ensureNpmPackages, requireNode } from './npm-packages.mjs';
import { makeDataFolder } from './paths.mjs';

export async function ensurePackages({ debian = [], onStart } = {}) {
  requireNode();
  makeDataFolder();
  // The quick ones first: whoever may not install them is told before a long download.
  await ensureDebianPackages(debian, { onStart });
  await ensureNpmPackages({ onStart });
}
