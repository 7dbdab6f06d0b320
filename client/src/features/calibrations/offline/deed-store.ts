import type { DBSchema, IDBPDatabase } from 'idb';
import { openDB } from 'idb';
import type { Calibration } from '../../../../../shared/contracts/calibrations.ts';
import type { QueuedDeed } from './deeds.ts';
import type { DeedStore } from './deed-queue.ts';

interface BenchDatabase extends DBSchema {
  deeds: { key: number; value: QueuedDeed };
  /** Runs as the server last told them, so that a reload without network finds its place. */
  runs: { key: number; value: { id: number; userId: number; calibration: Calibration } };
}

let opened: Promise<IDBPDatabase<BenchDatabase>> | null = null;

function database(): Promise<IDBPDatabase<BenchDatabase>> {
  opened ??= openDB<BenchDatabase>('saltmark-bench', 1, {
    upgrade: (db) => {
      db.createObjectStore('deeds', { keyPath: 'order', autoIncrement: true });
      db.createObjectStore('runs', { keyPath: 'id' });
    },
    // Another page wants a newer form of the store; this one opens it again when it next needs it.
    blocking: (_current, _blocked, event) => {
      opened = null;
      (event.target as IDBDatabase).close();
    },
  });
  return opened;
}

/** Deeds on this phone: each one is on disk before the bench says "saved". */
export const phoneStore: DeedStore = {
  all: async () => (await database()).getAll('deeds'),
  add: async (entry) => {
    const db = await database();
    // The store gives the place; it is part of the value because it is the key path.
    const order = await db.add('deeds', entry as QueuedDeed);
    return { ...entry, order };
  },
  replace: async (entry) => {
    await (await database()).put('deeds', entry);
  },
  remove: async (order) => {
    await (await database()).delete('deeds', order);
  },
};

export async function keepRun(userId: number, calibration: Calibration): Promise<void> {
  const db = await database();
  if (calibration.status === 'running') await db.put('runs', { id: calibration.id, userId, calibration });
  else await db.delete('runs', calibration.id);
}

export async function keptRun(userId: number, id: number): Promise<Calibration | null> {
  const found = await (await database()).get('runs', id);
  return found && found.userId === userId ? found.calibration : null;
}
