import { useQueryClient } from '@tanstack/react-query';
import { useEffect, useSyncExternalStore } from 'react';
import type { QueryClient } from '@tanstack/react-query';
import { http, listenToServerDates } from '../../../lib/http.ts';
import { socket } from '../../../lib/socket.ts';
import type { OffsetBounds } from './clock-offset.ts';
import { narrowOffset, offsetOf } from './clock-offset.ts';
import type { QueueSnapshot } from './deed-queue.ts';
import { createDeedQueue } from './deed-queue.ts';
import { phoneStore } from './deed-store.ts';
import { sendDeed } from './send-deed.ts';

/** Set by the page that lets the queue run; the queue itself outlives every page. */
let session: { userId: number; queryClient: QueryClient } | null = null;
let bounds: OffsetBounds | null = null;

/** The one queue of this phone. */
export const phoneQueue = createDeedQueue({
  store: phoneStore,
  send: (deed) =>
    session
      ? sendDeed(deed, session.userId, session.queryClient)
      : Promise.resolve({ kind: 'unreachable' as const }),
  now: () => new Date().toISOString(),
  later: (callback, delayMs) => {
    const timer = setTimeout(callback, delayMs);
    return () => clearTimeout(timer);
  },
});

listenToServerDates((sample) => {
  bounds = narrowOffset(bounds, sample);
});

/** This phone's clock less the server's, ms; null before the first answer. */
export const clockOffsetMs = (): number | null => offsetOf(bounds);

/** Sends what lies on this phone while somebody is signed in, and again whenever the network may be back. */
export function usePhoneQueue(userId: number): void {
  const queryClient = useQueryClient();
  useEffect(() => {
    session = { userId, queryClient };
    const stop = phoneQueue.start(userId);
    const wake = () => phoneQueue.wake();
    window.addEventListener('online', wake);
    socket.on('connect', wake);
    return () => {
      window.removeEventListener('online', wake);
      socket.off('connect', wake);
      stop();
      session = null;
    };
  }, [userId, queryClient]);
}

/** A few answers in a row narrow the clock offset to a fraction of a second. */
export function useMeasuredClock(): void {
  useEffect(() => {
    const asking = new AbortController();
    const ask = async () => {
      for (let i = 0; i < 3; i += 1) await http.get('/api/health', { signal: asking.signal });
    };
    // Without network there is nothing to measure; the last offset stays in force.
    ask().catch(() => undefined);
    return () => asking.abort();
  }, []);
}

export function useQueue(): QueueSnapshot {
  return useSyncExternalStore(phoneQueue.subscribe, phoneQueue.snapshot);
}
