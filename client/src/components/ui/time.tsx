import { useSyncExternalStore } from 'react';
import {
  formatAge,
  formatDate,
  formatDateTime,
  formatOffset,
  formatTime,
} from '../../../../shared/format/dates.ts';

let now = Date.now();
const listeners = new Set<() => void>();
let timer: ReturnType<typeof setInterval> | null = null;

function subscribe(listener: () => void): () => void {
  listeners.add(listener);
  timer ??= setInterval(() => {
    now = Date.now();
    for (const one of listeners) one();
  }, 1000);
  return () => {
    listeners.delete(listener);
    if (listeners.size > 0 || !timer) return;
    clearInterval(timer);
    timer = null;
  };
}

/** The time now in ms, once a second, from one clock for the whole page. */
export function useNow(): number {
  return useSyncExternalStore(subscribe, () => now);
}

export interface TimeProps {
  at: string | null | undefined;
  /** IANA zone of the site; UTC when absent. */
  timeZone?: string;
  /** date: 1 Dec 2026 · date-time: 1 Dec 2026 13:22 · time: 13:22:07. Default date-time. */
  show?: 'date' | 'date-time' | 'time';
}

/** A moment as text, with the whole of it and its offset as title. */
export function Time({ at, timeZone = 'UTC', show = 'date-time' }: TimeProps) {
  if (!at) return <span>–</span>;
  const text = {
    date: () => formatDate(at, { timeZone }),
    'date-time': () => formatDateTime(at, { timeZone }),
    time: () => formatTime(at, { timeZone, seconds: true }),
  }[show]();
  return (
    <time dateTime={at} title={formatDateTime(at, { timeZone, seconds: true, offset: true })}>
      {text}
    </time>
  );
}

/** How long ago, kept up to date; the moment itself as title. */
export function Age({ at, timeZone = 'UTC' }: { at: string | null | undefined; timeZone?: string }) {
  const moment = useNow();
  if (!at) return <span>–</span>;
  return (
    <time dateTime={at} title={formatDateTime(at, { timeZone, seconds: true, offset: true })}>
      {formatAge(at, moment)}
    </time>
  );
}

/** The page head's clock in the site's zone. */
export function Clock({ timeZone = 'UTC' }: { timeZone?: string }) {
  const moment = useNow();
  return (
    <p className="page-clock" aria-hidden="true">
      <span>{formatDate(moment, { timeZone })}</span>
      <b>{formatTime(moment, { timeZone, seconds: true })}</b>
      <small>{formatOffset(moment, { timeZone })}</small>
    </p>
  );
}
