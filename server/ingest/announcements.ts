/**
 * What open pages are told after a commit. Announcements that repeat themselves are held together: a flood of
 * malformed messages must not make every page ask for the quarantine list a thousand times a second.
 */
import type { Changed } from '../../shared/contracts/realtime.ts';
import type { Broadcast } from '../realtime/broadcast.ts';

/** At most twice a second for one thing: as fast as a person can take in. */
const quietMs = 500;

interface Held {
  update: Changed;
  siteId: number | null;
  timer: NodeJS.Timeout;
  isDue: boolean;
}

export interface Announcements {
  changed: (update: Changed, siteId: number | null) => void;
  /** Like `changed`, but together for all of a slice (and `key`): the first at once, the newest after a pause. */
  changedOften: (key: string, update: Changed, siteId: number | null) => void;
  stop: () => void;
}

export function createAnnouncements(broadcast: Broadcast): Announcements {
  const held = new Map<string, Held>();

  const release = (key: string): void => {
    const entry = held.get(key);
    if (!entry) return;
    held.delete(key);
    if (!entry.isDue) return;
    broadcast.changed(entry.update, entry.siteId);
    held.set(key, { ...entry, isDue: false, timer: setTimeout(() => release(key), quietMs) });
  };

  return {
    changed: (update, siteId) => broadcast.changed(update, siteId),
    changedOften: (key, update, siteId) => {
      const entry = held.get(key);
      if (entry) {
        Object.assign(entry, { update, siteId, isDue: true });
        return;
      }
      broadcast.changed(update, siteId);
      held.set(key, { update, siteId, isDue: false, timer: setTimeout(() => release(key), quietMs) });
    },
    stop: () => {
      for (const { timer } of held.values()) clearTimeout(timer);
      held.clear();
    },
  };
}
