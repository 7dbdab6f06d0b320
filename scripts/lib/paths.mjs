/** Where things are in this clone, and where everything made at run time goes. */
import { mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { Refusal } from './say.mjs';

export const root = fileURLToPath(new URL('../..', import.meta.url)).replace(/\/$/, '');
export const dataFolder = join(root, '.data');
export const logsFolder = join(dataFolder, 'logs');
export const postgresFolder = join(dataFolder, 'postgres');
export const runLockFile = join(dataFolder, 'running.json');
export const simulatorFile = join(dataFolder, 'simulator.json');
export const simulatorStateFile = join(dataFolder, 'simulator-state.json');

export function makeDataFolder() {
  try {
    mkdirSync(logsFolder, { recursive: true });
  } catch (error) {
    if (error.code === 'EACCES' || error.code === 'EPERM') {
      throw new Refusal(
        `The folder ${dataFolder} belongs to another user.`,
        'Start Saltmark as the user who started it first, or give that folder to yourself with chown -R.',
      );
    }
    throw error;
  }
}
