/**
 * The ordinary readings message, checked by hand. The schema costs 10 to 30 µs for each message, several times
 * what parsing its JSON costs, and at thousands of messages a second that is the larger part of the work. What is
 * accepted here the schema accepts too, with the same values (tests compare them on generated messages); at the
 * first doubt the answer is null and the schema decides, and explains.
 */
import { maxReadingsPerMessage, payloadVersion } from '../../shared/contracts/mqtt.ts';
import {
  readingContexts,
  readingFlags,
  readingQualities,
  type ReadingContext,
  type ReadingFlag,
  type ReadingQuality,
} from '../../shared/contracts/vocabulary.ts';
import type { IncomingReading, ReadingsContent } from './message.ts';

type Fields = Record<string, unknown>;

const contexts = new Set<unknown>(readingContexts);
const qualities = new Set<unknown>(readingQualities);
const flagNames = new Set<unknown>(readingFlags);
const messageKeys = new Set(['v', 'boot', 'sent', 'clock', 'settings', 'readings']);
const readingKeys = new Set([
  'n',
  'at',
  'context',
  'conductivity_us_cm',
  'temperature_c',
  'conductance_us',
  'solution',
  'quality',
  'flags',
]);
const bootShape = /^[0-9A-Za-z]{4,40}$/;
// Days beyond the 28th are left to the schema, which knows the months.
const instantShape = /^\d{4}-(0[1-9]|1[0-2])-(0[1-9]|1\d|2[0-8])T([01]\d|2[0-3]):[0-5]\d:[0-5]\d(\.\d+)?Z$/;
const noFlags: readonly ReadingFlag[] = [];

const isObject = (value: unknown): value is Fields =>
  typeof value === 'object' && value !== null && !Array.isArray(value);
const isNumberWithin = (value: unknown, low: number, high: number): value is number =>
  typeof value === 'number' && value >= low && value <= high;
const hasOnly = (fields: Fields, known: ReadonlySet<string>): boolean => {
  for (const key in fields) if (!known.has(key)) return false;
  return true;
};

function instantMs(value: unknown): number | null {
  return typeof value === 'string' && instantShape.test(value) ? Date.parse(value) : null;
}

/** Undefined = in doubt. */
function optionalNumber(value: unknown, low: number, high: number): number | null | undefined {
  if (value === null) return null;
  return isNumberWithin(value, low, high) ? value : undefined;
}

function plainFlags(value: unknown): readonly ReadingFlag[] | null {
  if (value === undefined) return noFlags;
  if (!Array.isArray(value) || value.length > readingFlags.length) return null;
  if (value.length === 0) return noFlags;
  return value.every((flag) => flagNames.has(flag)) ? (value as ReadingFlag[]) : null;
}

function plainReading(value: unknown): IncomingReading | null {
  if (!isObject(value) || !hasOnly(value, readingKeys)) return null;
  const atMs = instantMs(value.at);
  const conductivityUsCm = optionalNumber(value.conductivity_us_cm, 0, 5_000_000);
  const temperatureC = optionalNumber(value.temperature_c, -50, 300);
  const conductanceUs = optionalNumber(value.conductance_us ?? null, 0, 50_000_000);
  const solution = value.solution ?? null;
  const flags = plainFlags(value.flags);
  if (!Number.isSafeInteger(value.n) || (value.n as number) < 0 || atMs === null || flags === null)
    return null;
  if (conductivityUsCm === undefined || temperatureC === undefined || conductanceUs === undefined)
    return null;
  if (solution !== null && (typeof solution !== 'string' || solution.length > 80)) return null;
  if (!contexts.has(value.context) || !qualities.has(value.quality)) return null;
  return {
    n: value.n as number,
    atMs,
    context: value.context as ReadingContext,
    conductivityUsCm,
    temperatureC,
    conductanceUs,
    solution,
    quality: value.quality as ReadingQuality,
    flags,
    extraJson: null,
  };
}

function plainClock(value: unknown): string | null | undefined {
  if (value === undefined) return null;
  if (!isObject(value) || typeof value.source !== 'string' || value.source.length > 20) return undefined;
  return Number.isFinite(value.offset_ms) ? value.source : undefined;
}

function plainSettings(value: unknown): string | null | undefined {
  if (value === undefined) return null;
  return typeof value === 'string' && value.length >= 8 && value.length <= 80 ? value : undefined;
}

/** Null when the message is not of the ordinary kind. */
export function decodePlainReadings(value: unknown, isBuffered: boolean): ReadingsContent | null {
  if (!isObject(value) || value.v !== payloadVersion || !hasOnly(value, messageKeys)) return null;
  if (typeof value.boot !== 'string' || !bootShape.test(value.boot)) return null;
  const sentMs = instantMs(value.sent);
  const clockSource = plainClock(value.clock);
  const settingsHash = plainSettings(value.settings);
  if (sentMs === null || clockSource === undefined || settingsHash === undefined) return null;
  const list = value.readings;
  if (!Array.isArray(list) || list.length === 0 || list.length > maxReadingsPerMessage) return null;
  const readings: IncomingReading[] = [];
  for (const item of list) {
    const reading = plainReading(item);
    if (reading === null) return null;
    readings.push(reading);
  }
  return { kind: 'readings', isBuffered, boot: value.boot, sentMs, clockSource, settingsHash, readings };
}
