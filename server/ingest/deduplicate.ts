/**
 * (device, boot, n) names one reading. At-least-once delivery repeats them, which is normal: a repeat is counted and
 * ignored. The same name with other content is not: somebody cloned a device or changed history, and it is noticed.
 */
import { canonicalJson } from '../lib/hashing.ts';
import type { IncomingReading } from './message.ts';
import { selectStoredReadings, type Db, type StoredReading } from './queries.ts';
import type { BootMark } from './session-book.ts';

export interface Candidate {
  reading: IncomingReading;
  deviceId: number;
  mark: BootMark;
}

export interface Sorted<T extends Candidate> {
  /** Never seen before, in order of arrival. */
  fresh: T[];
  repeated: T[];
  differing: { candidate: T; stored: StoredReading }[];
}

const keyOf = (bootId: number, n: number): string => `${bootId}/${n}`;

/**
 * Above the highest number of its boot a reading is new without asking. At or below it (a gap filled later, a
 * repeat) the database is asked once for all of them. `alwaysAsk` is for several servers sharing one broker, where
 * another one may have stored it.
 */
export async function sortOutRepeats<T extends Candidate>(
  db: Db,
  candidates: readonly T[],
  alwaysAsk: boolean,
): Promise<Sorted<T>> {
  const sorted: Sorted<T> = { fresh: [], repeated: [], differing: [] };
  const doubtful: T[] = [];
  for (const candidate of candidates) {
    const { reading, mark } = candidate;
    if (alwaysAsk || reading.n <= mark.highestN) doubtful.push(candidate);
    else sorted.fresh.push(candidate);
    if (reading.n > mark.highestN) mark.highestN = reading.n;
  }
  if (doubtful.length === 0) return sorted;

  const known = new Map<string, StoredReading>();
  for (const candidate of sorted.fresh) {
    known.set(keyOf(candidate.mark.id, candidate.reading.n), asStored(candidate));
  }
  const keys = doubtful.map(({ deviceId, mark, reading }) => ({ deviceId, bootId: mark.id, n: reading.n }));
  for (const stored of await selectStoredReadings(db, keys))
    known.set(keyOf(stored.bootId, stored.n), stored);
  for (const candidate of doubtful) {
    const key = keyOf(candidate.mark.id, candidate.reading.n);
    const stored = known.get(key);
    if (stored === undefined) {
      sorted.fresh.push(candidate);
      known.set(key, asStored(candidate));
    } else if (isSameContent(candidate.reading, stored)) sorted.repeated.push(candidate);
    else sorted.differing.push({ candidate, stored });
  }
  return sorted;
}

function asStored({ reading, mark }: Candidate): StoredReading {
  const { extraJson, flags, ...rest } = reading;
  return {
    ...rest,
    flags: [...flags],
    bootId: mark.id,
    extra: extraJson === null ? null : JSON.parse(extraJson),
  };
}

export function isSameContent(reading: IncomingReading, stored: StoredReading): boolean {
  const isSame =
    reading.atMs === stored.atMs &&
    reading.context === stored.context &&
    reading.conductivityUsCm === stored.conductivityUsCm &&
    reading.temperatureC === stored.temperatureC &&
    reading.conductanceUs === stored.conductanceUs &&
    reading.solution === stored.solution &&
    reading.quality === stored.quality;
  if (!isSame || [...reading.flags].sort().join() !== [...stored.flags].sort().join()) return false;
  const extra: unknown = reading.extraJson === null ? null : JSON.parse(reading.extraJson);
  return canonicalJson(extra) === canonicalJson(stored.extra ?? null);
}
