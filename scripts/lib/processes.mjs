/** Knowing a process again: a pid alone may have been given to another program meanwhile. */
import { readFileSync } from 'node:fs';
import { setTimeout as delay } from 'node:timers/promises';

/** `{ pid, bornAt }`, where bornAt is the kernel's start tick (empty where /proc is missing). */
export function identify(pid) {
  return { pid, bornAt: startTick(pid) };
}

function startTick(pid) {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, 'utf8');
    // The command name, in brackets, may itself hold spaces and brackets: count after the last one.
    const fields = stat.slice(stat.lastIndexOf(')') + 2).split(' ');
    return fields[0] === 'Z' ? 'ended' : (fields[19] ?? '');
  } catch {
    return '';
  }
}

/** True while that very process is alive. */
export function isAlive({ pid, bornAt }) {
  if (!Number.isInteger(pid) || pid <= 0) return false;
  try {
    process.kill(pid, 0);
  } catch (error) {
    if (error.code !== 'EPERM') return false;
  }
  const now = startTick(pid);
  return now !== 'ended' && (bornAt === '' || bornAt === now);
}

export function signal(pid, name) {
  try {
    process.kill(pid, name);
  } catch {
    // already gone
  }
}

/** Waits until the process has ended; false when it is still there after `timeoutMs`. */
export async function waitForEnd(known, timeoutMs) {
  const deadline = Date.now() + timeoutMs;
  while (isAlive(known)) {
    if (Date.now() > deadline) return false;
    await delay(25);
  }
  return true;
}

/** Asks a process to end with the first signal, and insists with the second. */
export async function endProcess(known, { first = 'SIGTERM', timeoutMs = 10_000, second = 'SIGKILL' } = {}) {
  if (!isAlive(known)) return;
  signal(known.pid, first);
  if (await waitForEnd(known, timeoutMs)) return;
  signal(known.pid, second);
  await waitForEnd(known, 5_000);
}
