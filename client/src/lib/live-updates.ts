import type { QueryClient } from '@tanstack/react-query';
import { useEffect, useSyncExternalStore } from 'react';
import type { Changed, WatchTarget } from '../../../shared/contracts/realtime.ts';
import type { Slice } from '../../../shared/contracts/vocabulary.ts';
import { clearLiveReadings, receiveReadings } from './live-readings.ts';
import { socket } from './socket.ts';

export type ConnectionState = 'connecting' | 'connected' | 'lost';

/** After a refusal; a lost network is retried by the client itself, with growing pauses. */
const RETRY_MS = 3000;

let connection: { state: ConnectionState; since: number } = { state: 'connecting', since: Date.now() };
const connectionListeners = new Set<() => void>();
/** How many parts of the page watch a room; it is left when the last one goes. */
const watched = new Map<string, { target: WatchTarget; count: number }>();

/**
 * Connect after sign-in. `changed` invalidates its slice, at most once per frame however many arrive; `readings` go
 * to the ring buffers. After a gap everything is fetched again, since nobody knows what was missed.
 * Returns the way to stop, at sign-out.
 */
export function startLiveUpdates(queryClient: QueryClient): () => void {
  const invalidate = invalidateBySlice(queryClient);
  const onChanged = ({ slice }: Changed) => invalidate(slice);
  let wasConnected = false;
  const onConnect = () => {
    setConnection('connected');
    for (const { target } of watched.values()) ask('watch', target);
    if (wasConnected) void queryClient.invalidateQueries();
    wasConnected = true;
  };
  let retry: ReturnType<typeof setTimeout> | null = null;
  const onLost = () => {
    setConnection('lost');
    if (socket.active || retry !== null) return;
    // The server ended or refused this connection, after which the client would not try again: rights have changed,
    // or the session is over, and the next answer about the session says which.
    invalidate('sessions');
    retry = setTimeout(() => {
      retry = null;
      socket.connect();
    }, RETRY_MS);
  };

  socket.on('connect', onConnect);
  socket.on('disconnect', onLost);
  socket.on('connect_error', onLost);
  socket.on('changed', onChanged);
  socket.on('readings', receiveReadings);
  socket.connect();
  return () => {
    if (retry !== null) clearTimeout(retry);
    socket.off('connect', onConnect);
    socket.off('disconnect', onLost);
    socket.off('connect_error', onLost);
    socket.off('changed', onChanged);
    socket.off('readings', receiveReadings);
    socket.disconnect();
    clearLiveReadings();
    setConnection('connecting');
  };
}

/** Watch every probe of a site; call the result to leave. */
export function watchSite(siteId: number): () => void {
  return watch({ site: siteId });
}

/** Watch one probe; call the result to leave. */
export function watchProbe(probeId: number): () => void {
  return watch({ probe: probeId });
}

/** Watch a site while a component is on screen. */
export function useWatchSite(siteId: number | null | undefined): void {
  useEffect(() => (siteId == null ? undefined : watchSite(siteId)), [siteId]);
}

/** Watch several sites while a component is on screen, for the page of all sites. */
export function useWatchSites(siteIds: readonly number[]): void {
  const key = siteIds.join(',');
  useEffect(() => {
    const leave = key === '' ? [] : key.split(',').map((id) => watchSite(Number(id)));
    return () => leave.forEach((stop) => stop());
  }, [key]);
}

/** Watch one probe while a component is on screen. */
export function useWatchProbe(probeId: number | null | undefined): void {
  useEffect(() => (probeId == null ? undefined : watchProbe(probeId)), [probeId]);
}

/** Whether live updates arrive, and since when (ms since 1970) that is so. */
export function useConnection(): { state: ConnectionState; since: number } {
  return useSyncExternalStore(
    (listener) => {
      connectionListeners.add(listener);
      return () => connectionListeners.delete(listener);
    },
    () => connection,
  );
}

/** Answers that show another slice inside: a probe's page names its device and its last check, the board its trust. */
const shownIn: Partial<Record<Slice, readonly Slice[]>> = {
  devices: ['probes'],
  checks: ['probes', 'readings'],
  probes: ['readings'],
  points: ['readings'],
};

/** Collects slices and invalidates each once with the next frame: a burst of changes is one refetch. */
export function invalidateBySlice(queryClient: QueryClient): (slice: Slice) => void {
  const slices = new Set<Slice>();
  let isScheduled = false;
  return (slice) => {
    for (const one of [slice, ...(shownIn[slice] ?? [])]) slices.add(one);
    if (isScheduled) return;
    isScheduled = true;
    requestAnimationFrame(() => {
      isScheduled = false;
      for (const one of slices) void queryClient.invalidateQueries({ queryKey: [one] });
      slices.clear();
    });
  };
}

function watch(target: WatchTarget): () => void {
  const key = JSON.stringify(target);
  const known = watched.get(key);
  if (known) known.count += 1;
  else {
    watched.set(key, { target, count: 1 });
    if (socket.connected) ask('watch', target);
  }
  let hasLeft = false;
  return () => {
    const entry = watched.get(key);
    if (hasLeft || !entry) return;
    hasLeft = true;
    entry.count -= 1;
    if (entry.count > 0) return;
    watched.delete(key);
    if (socket.connected) ask('unwatch', target);
  };
}

function ask(verb: 'watch' | 'unwatch', target: WatchTarget): void {
  // eslint-disable-next-line no-restricted-syntax -- the browser asks to join a room; only broadcasts are the server's alone
  socket.emit(verb, target);
}

function setConnection(state: ConnectionState): void {
  if (state === connection.state) return;
  connection = { state, since: Date.now() };
  for (const listener of connectionListeners) listener();
}
