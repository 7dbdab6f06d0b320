/** A database on a full disk stops in the middle: better not to begin. */
import { statfsSync } from 'node:fs';
import { Refusal } from './say.mjs';

const NEEDED_MEGABYTES = 500;

export function freeMegabytes(folder) {
  const { bavail, bsize } = statfsSync(folder);
  return Math.floor((Number(bavail) * Number(bsize)) / 1e6);
}

export function requireFreeSpace(folder, { needed = NEEDED_MEGABYTES, free = freeMegabytes(folder) } = {}) {
  if (free >= needed) return;
  throw new Refusal(
    `The disk that holds ${folder} is nearly full: ${free} MB are free and Saltmark needs ${needed} MB to start safely.`,
    'Free some space (large or old files, npm cache clean --force, apt-get clean) and start again.',
  );
}

export const diskFullRefusal = (folder) =>
  new Refusal(
    `The disk that holds ${folder} is full, so the database could not write.`,
    'Free some space and start again: nothing that was confirmed is lost.',
  );
