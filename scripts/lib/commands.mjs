/** Running other programs to their end, with their output kept in a log. */
import { spawn } from 'node:child_process';
import { accessSync, closeSync, constants, openSync, readFileSync } from 'node:fs';
import { delimiter, join } from 'node:path';
import { root } from './paths.mjs';

/** Full path of a program on the PATH, or undefined. */
export function findOnPath(name, path = process.env.PATH ?? '') {
  for (const folder of path.split(delimiter).filter(Boolean)) {
    const candidate = join(folder, name);
    try {
      accessSync(candidate, constants.X_OK);
      return candidate;
    } catch {
      // not in this folder
    }
  }
  return undefined;
}

/** The last lines of a log, so that a failure can show why. */
export function lastLines(file, count = 12) {
  try {
    return readFileSync(file, 'utf8').trimEnd().split('\n').slice(-count);
  } catch {
    return [];
  }
}

/**
 * Runs a program to its end and answers its exit code (a signal counts as 1).
 * `log`: file that receives its output; without it the program writes to our terminal.
 * `onStart` receives the child, for those who must be able to stop it.
 */
export function run(command, args, { log, env = process.env, cwd = root, onStart, ...options } = {}) {
  const output = log ? openSync(log, 'a') : 'inherit';
  return new Promise((resolve, reject) => {
    const child = spawn(command, args, {
      cwd,
      env,
      stdio: [log ? 'ignore' : 'inherit', output, output],
      ...options,
    });
    if (log) closeSync(output);
    onStart?.(child);
    child.once('error', reject);
    child.once('exit', (code) => resolve(code ?? 1));
  });
}

/** Arguments for Node to run one of our TypeScript entry points. */
export const typescript = (file, ...args) => ['--import', 'tsx', file, ...args];
