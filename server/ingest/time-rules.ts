/**
 * A reading is dated by its device. Too far off, it is set apart; the other readings of the same message are good
 * and are kept, because a device that jumps by an hour at one sample must not lose the fifty-nine around it. The
 * raw message goes to quarantine whole, so that the set-apart readings can be read there.
 */
import { futureAfterMs, lateAfterMs } from '../../shared/contracts/mqtt.ts';
import type { IncomingReading, Refusal } from './message.ts';

/** A device without a clock counts from 1970 or 2000; ten years is far beyond any buffer and safely after both. */
export const tooOldAfterMs = 10 * 365.25 * 86_400_000;

export type AgeVerdict = 'live' | 'late' | 'time-in-future' | 'time-too-old';

export function judgeAge(atMs: number, receivedAtMs: number): AgeVerdict {
  const ageMs = receivedAtMs - atMs;
  if (ageMs < -futureAfterMs) return 'time-in-future';
  if (ageMs > tooOldAfterMs) return 'time-too-old';
  return ageMs > lateAfterMs ? 'late' : 'live';
}

const says = {
  'time-in-future': 'more than 2 minutes in the future',
  'time-too-old': 'more than 10 years ago',
} as const;

/** Splits readings into those to keep and, per code, one refusal that names the rest. */
export function splitByTime(
  readings: IncomingReading[],
  receivedAtMs: number,
): { kept: IncomingReading[]; refusals: Refusal[] } {
  const apart = { 'time-in-future': [] as IncomingReading[], 'time-too-old': [] as IncomingReading[] };
  const kept: IncomingReading[] = [];
  for (const reading of readings) {
    const verdict = judgeAge(reading.atMs, receivedAtMs);
    if (verdict === 'live' || verdict === 'late') kept.push(reading);
    else apart[verdict].push(reading);
  }
  const refusals: Refusal[] = [];
  for (const code of ['time-in-future', 'time-too-old'] as const) {
    const [first, ...more] = apart[code];
    if (!first) continue;
    const others = more.length > 0 ? ` and ${more.length} more` : '';
    const rest = kept.length > 0 ? ` The other ${kept.length} of this message are stored.` : '';
    const at = new Date(first.atMs).toISOString();
    refusals.push({ code, reason: `Reading ${first.n}${others}, dated ${at}, lies ${says[code]}.${rest}` });
  }
  return { kept, refusals };
}
