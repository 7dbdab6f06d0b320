/** Keeps what a real device has in flash and what a real cell has in its metal, from one run to the next. */
import { existsSync, mkdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs';
import { dirname } from 'node:path';
import type { ProbeState } from './probe.ts';

interface Kept {
  /** End of the history the state grew from; a newly loaded demo has another and starts anew. */
  origin: number;
  state: ProbeState;
}

export class StateStore {
  private readonly path: string | null;
  private readonly kept: Map<string, Kept>;

  constructor(path: string | null) {
    this.path = path;
    this.kept = new Map(path && existsSync(path) ? Object.entries(readKept(path)) : []);
  }

  /** The state to start from: the kept one if it grew from this history. */
  startState(device: string, given: ProbeState): ProbeState {
    const kept = this.kept.get(device);
    return kept && kept.origin === given.at ? kept.state : given;
  }

  save(states: { device: string; origin: number; state: ProbeState }[]): void {
    if (!this.path) return;
    for (const { device, origin, state } of states) this.kept.set(device, { origin, state });
    mkdirSync(dirname(this.path), { recursive: true });
    // Written beside and moved over, so that a power cut leaves the old file or the new one.
    writeFileSync(`${this.path}.new`, JSON.stringify(Object.fromEntries(this.kept)));
    renameSync(`${this.path}.new`, this.path);
  }
}

function readKept(path: string): Record<string, Kept> {
  try {
    return JSON.parse(readFileSync(path, 'utf8')) as Record<string, Kept>;
  } catch (error) {
    throw new Error(
      `The probe states in ${path} cannot be read (${String(error)}). Delete the file to start from the end of the history.`,
    );
  }
}
