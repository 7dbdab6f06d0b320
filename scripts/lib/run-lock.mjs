/**
 * One file says which process holds something, and which children it has started. A second start sees a living
 * holder and refuses; after a crash the next start finds what was left running and ends exactly that.
 */
import { readFileSync, rmSync, writeFileSync } from 'node:fs';
import { endProcess, identify, isAlive } from './processes.mjs';

function read(file) {
  try {
    return JSON.parse(readFileSync(file, 'utf8'));
  } catch {
    return undefined;
  }
}

/** The living holder's entry, or undefined. */
export function holderOf(file) {
  const entry = read(file);
  return entry?.holder && isAlive(entry.holder) ? entry : undefined;
}

/**
 * Takes the lock, or answers `{ takenBy }` when a living process holds it.
 * Children left by a holder that is gone are ended first, the last started first.
 */
export async function takeLock(file, about = {}) {
  const takenBy = holderOf(file);
  if (takenBy) return { takenBy };
  const left = read(file);
  for (const child of [...(left?.children ?? [])].reverse()) {
    await endProcess(child, { first: child.stopSignal ?? 'SIGTERM' });
  }
  rmSync(file, { force: true });

  const entry = { holder: identify(process.pid), ...about, children: [] };
  const save = (flag = 'w') => writeFileSync(file, JSON.stringify(entry, null, 2), { flag, mode: 0o600 });
  try {
    save('wx');
  } catch (error) {
    // Another start was quicker between the two lines above.
    if (error.code === 'EEXIST') return { takenBy: read(file) ?? {} };
    throw error;
  }
  return {
    lock: {
      addChild(pid, stopSignal) {
        entry.children.push({ ...identify(pid), stopSignal });
        save();
      },
      removeChild(pid) {
        entry.children = entry.children.filter((child) => child.pid !== pid);
        save();
      },
      release: () => rmSync(file, { force: true }),
    },
  };
}
