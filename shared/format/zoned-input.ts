import { zoneOffsetMinutes } from './dates.ts';

const MINUTE_MS = 60_000;

/**
 * The instant of a date-and-time field (`2026-12-01T13:22`) filled in with the wall clock of a zone. In the hour that
 * happens twice in autumn the later one is meant, as the offset before the change is no longer in force after it.
 */
export function zonedInputToInstant(text: string, timeZone: string): string {
  const civil = Date.parse(`${text}Z`);
  const first = civil - zoneOffsetMinutes(civil, { timeZone }) * MINUTE_MS;
  // The offset belongs to the instant, not to the civil time read as UTC; one correction settles it.
  return new Date(civil - zoneOffsetMinutes(first, { timeZone }) * MINUTE_MS).toISOString();
}

/** The text of such a field for an instant, by the wall clock of a zone. */
export function instantToZonedInput(instant: string | number, timeZone: string): string {
  const at = new Date(instant).getTime();
  return new Date(at + zoneOffsetMinutes(at, { timeZone }) * MINUTE_MS).toISOString().slice(0, 16);
}
