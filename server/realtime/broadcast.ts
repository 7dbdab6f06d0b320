/** The only file that emits. `changed` says what to refetch; `readings` is the one stream with data. */
import type { Server } from 'socket.io';
import type { Changed, ClientToServer, LivePoint, ServerToClient } from '../../shared/contracts/realtime.ts';

export type RealtimeServer = Server<ClientToServer, ServerToClient>;

export const rooms = {
  everyone: 'everyone',
  /** People with a role at all sites, also those that are still to come. */
  allSites: 'all-sites',
  site: (id: number) => `site:${id}`,
  siteReadings: (id: number) => `site-readings:${id}`,
  probe: (id: number) => `probe:${id}`,
  user: (id: number) => `user:${id}`,
};

/** About four frames a second per probe: smooth to the eye, bounded for a phone. */
const frameMs = 250;
/** A frame holds no more than this; a flood shows its newest points. */
const maxPointsPerFrame = 60;

interface Pending {
  siteId: number | null;
  points: LivePoint[];
  timer: NodeJS.Timeout | null;
}

export interface Broadcast {
  /** After commit: to everybody of one site, or (siteId null) to everybody signed in. */
  changed: (update: Changed, siteId: number | null) => void;
  readings: (probeId: number, siteId: number | null, point: LivePoint) => void;
  /** Ends the open pages' connections of one person, whose rights have changed. */
  disconnectUser: (userId: number) => void;
  stop: () => void;
}

export function createBroadcast(io: RealtimeServer | null): Broadcast {
  const pending = new Map<number, Pending>();

  const flush = (probeId: number, entry: Pending): void => {
    entry.timer = null;
    if (entry.points.length === 0) return void pending.delete(probeId);
    const points = entry.points.splice(0);
    entry.timer = setTimeout(() => flush(probeId, entry), frameMs);
    let to = io!.to(rooms.probe(probeId));
    if (entry.siteId !== null) to = to.to(rooms.siteReadings(entry.siteId));
    // Not volatile: that drops every frame but the first of a turn, also on a fast line. The gateway ends slow pages.
    to.emit('readings', { probe: probeId, points });
  };

  return {
    changed: (update, siteId) => {
      const to = siteId === null ? [rooms.everyone] : [rooms.site(siteId), rooms.allSites];
      io?.to(to).emit('changed', update);
    },
    readings: (probeId, siteId, point) => {
      if (!io) return;
      const entry = pending.get(probeId) ?? { siteId, points: [], timer: null };
      entry.siteId = siteId;
      pending.set(probeId, entry);
      entry.points.push(point);
      if (entry.points.length > maxPointsPerFrame) entry.points.shift();
      if (entry.timer === null) flush(probeId, entry);
    },
    disconnectUser: (userId) => {
      io?.in(rooms.user(userId)).disconnectSockets(true);
    },
    stop: () => {
      for (const entry of pending.values()) if (entry.timer) clearTimeout(entry.timer);
      pending.clear();
    },
  };
}
