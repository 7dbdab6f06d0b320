import { useState } from 'react';
import type { LivePoint } from '../../../../../shared/contracts/realtime.ts';
import { formatDuration } from '../../../../../shared/format/dates.ts';
import { useNow } from '../../../components/ui/time.tsx';
import { useLiveReadings } from '../../../lib/live-readings.ts';
import { useWatchProbe } from '../../../lib/live-updates.ts';
import { silenceLimitMs } from './stability.ts';

export interface Stream {
  points: readonly LivePoint[];
  /** The newest reading, or null when the stream is silent: then readings are typed. */
  reading: LivePoint | null;
  /** The page has only just begun to listen: too early to call the probe silent. */
  isWaiting: boolean;
  /** Why there is no reading, in words. */
  silence: string | null;
  nowMs: number;
  /** This phone's clock less the device's, as far as the way of a reading allows to tell, ms. */
  deviceLagMs: number;
}

/** Most devices send within this time. */
const PATIENCE_MS = 15_000;

/** The probe's own readings as they come. Silence is judged by this phone's clock: the device's may be wrong. */
export function useStream(probeId: number): Stream {
  useWatchProbe(probeId);
  const points = useLiveReadings(probeId);
  const nowMs = useNow();
  const last = points.at(-1) ?? null;
  const [heard, setHeard] = useState<{ at: string | null; atMs: number }>({ at: null, atMs: nowMs });
  if (last && last.at !== heard.at) {
    // What lay in the buffer before the bench was opened is as old as it says.
    const atMs = heard.at === null ? Math.min(nowMs, Date.parse(last.at)) : nowMs;
    setHeard({ at: last.at, atMs });
  }
  const silentMs = nowMs - heard.atMs;
  if (!last) {
    const isWaiting = silentMs < PATIENCE_MS;
    const silence = isWaiting ? 'waiting for the probe' : 'no reading comes';
    return { points, reading: null, isWaiting, silence, nowMs, deviceLagMs: 0 };
  }
  const isSilent = silentMs > silenceLimitMs(points);
  return {
    points,
    reading: isSilent ? null : last,
    isWaiting: false,
    silence: isSilent ? `no reading for ${formatDuration(silentMs / 1000)}` : null,
    nowMs,
    deviceLagMs: heard.atMs - Date.parse(last.at),
  };
}
