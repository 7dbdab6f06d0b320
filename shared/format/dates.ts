/**
 * Dates and times as text. Stored times are UTC; what is shown is in the site's zone and says so. Months are words:
 * 03/04 is two different days in two countries.
 */

export type Moment = Date | string | number;

const PLACEHOLDER = '–';
const LOCALE = 'en-GB';
const formatters = new Map<string, Intl.DateTimeFormat>();

export interface ZoneOption {
  /** IANA zone such as `Europe/Oslo`; UTC when absent on a server, the browser's own zone is never assumed. */
  timeZone?: string;
}

/** `1 Dec 2026` */
export function formatDate(moment: Moment | null | undefined, { timeZone = 'UTC' }: ZoneOption = {}): string {
  const date = toDate(moment);
  if (!date) return PLACEHOLDER;
  const { day, month, year } = partsOf(date, timeZone);
  return `${day} ${month} ${year}`;
}

/** `1 Dec`, for a date whose year is plain from where it stands. */
export function formatDay(moment: Moment | null | undefined, { timeZone = 'UTC' }: ZoneOption = {}): string {
  const date = toDate(moment);
  if (!date) return PLACEHOLDER;
  const { day, month } = partsOf(date, timeZone);
  return `${day} ${month}`;
}

export interface TimeOptions extends ZoneOption {
  seconds?: boolean;
}

/** `13:22` or `13:22:07` */
export function formatTime(moment: Moment | null | undefined, options: TimeOptions = {}): string {
  const date = toDate(moment);
  if (!date) return PLACEHOLDER;
  const { hour, minute, second } = partsOf(date, options.timeZone ?? 'UTC');
  return options.seconds ? `${hour}:${minute}:${second}` : `${hour}:${minute}`;
}

export interface DateTimeOptions extends TimeOptions {
  /** Adds `UTC+01:00`: always on records, exports and mail. */
  offset?: boolean;
}

/** `1 Dec 2026 13:22`, with seconds and offset when asked. */
export function formatDateTime(moment: Moment | null | undefined, options: DateTimeOptions = {}): string {
  const date = toDate(moment);
  if (!date) return PLACEHOLDER;
  const offset = options.offset ? ` ${formatOffset(date, options)}` : '';
  return `${formatDate(date, options)} ${formatTime(date, options)}${offset}`;
}

/** `UTC+00:00`: the offset of a zone at that moment, summer time included. */
export function formatOffset(moment: Moment, { timeZone = 'UTC' }: ZoneOption = {}): string {
  const date = toDate(moment);
  if (!date) return PLACEHOLDER;
  const name = formatter(timeZone, 'offset', { timeZoneName: 'longOffset' })
    .formatToParts(date)
    .find((part) => part.type === 'timeZoneName')?.value;
  return !name || name === 'GMT' ? 'UTC+00:00' : name.replace('GMT', 'UTC').replace('-', '\u2212');
}

const AGE_STEPS: [limitS: number, unitS: number, name: string][] = [
  [90, 1, 's'],
  [90 * 60, 60, 'min'],
  [36 * 3600, 3600, 'h'],
  [60 * 86_400, 86_400, 'd'],
  [730 * 86_400, 30.44 * 86_400, 'months'],
];

/** The length of a span, in the largest unit that still says enough: `4 s`, `58 min`, `5 h`, `12 d`, `7 months`. */
export function formatDuration(seconds: number): string {
  const span = Math.max(0, seconds);
  const step = AGE_STEPS.find(([limit]) => span < limit);
  if (!step) return `${Math.floor(span / (365.25 * 86_400))} years`;
  return `${Math.floor(span / step[1])} ${step[2]}`;
}

/** How long ago: `4 min ago`; `in 12 d` for a time to come. */
export function formatAge(moment: Moment | null | undefined, now: Moment): string {
  const date = toDate(moment);
  const reference = toDate(now);
  if (!date || !reference) return PLACEHOLDER;
  const seconds = (reference.getTime() - date.getTime()) / 1000;
  // Two clocks never agree to the second; "in 1 s" for a reading just taken would only puzzle.
  if (seconds < -2) return `in ${formatDuration(-seconds)}`;
  return seconds < 1 ? 'now' : `${formatDuration(seconds)} ago`;
}

/** Days from now to a date, in words a plan uses: `today`, `tomorrow`, `in 17 days`, `3 days ago`. */
export function formatDaysAway(moment: Moment, now: Moment, { timeZone = 'UTC' }: ZoneOption = {}): string {
  const days = civilDay(moment, timeZone) - civilDay(now, timeZone);
  if (Number.isNaN(days)) return PLACEHOLDER;
  if (days === 0) return 'today';
  if (days === 1) return 'tomorrow';
  if (days === -1) return 'yesterday';
  return days > 0 ? `in ${days} days` : `${-days} days ago`;
}

/** ISO 8601 week number of a date (week 1 holds the first Thursday). */
export function isoWeek(moment: Moment, { timeZone = 'UTC' }: ZoneOption = {}): number {
  const day = civilDay(moment, timeZone);
  // Day 0 (1 January 1970) was a Thursday, so (day + 3) mod 7 is 0 on a Monday.
  const thursday = day - ((day + 3) % 7) + 3;
  const year = new Date(thursday * 86_400_000).getUTCFullYear();
  return 1 + Math.floor((thursday - Date.UTC(year, 0, 1) / 86_400_000) / 7);
}

/** `2026-12-01` in the zone given, as date fields want it. */
export function toDateInput(
  moment: Moment | null | undefined,
  { timeZone = 'UTC' }: ZoneOption = {},
): string {
  const date = toDate(moment);
  if (!date) return '';
  return new Date(civilDay(date, timeZone) * 86_400_000).toISOString().slice(0, 10);
}

function civilDay(moment: Moment, timeZone: string): number {
  const date = toDate(moment);
  if (!date) return Number.NaN;
  const parts = formatter(timeZone, 'civil', {
    year: 'numeric',
    month: 'numeric',
    day: 'numeric',
  }).formatToParts(date);
  const number = (type: string) => Number(parts.find((part) => part.type === type)?.value);
  return Date.UTC(number('year'), number('month') - 1, number('day')) / 86_400_000;
}

function toDate(moment: Moment | null | undefined): Date | null {
  if (moment == null) return null;
  const date = moment instanceof Date ? moment : new Date(moment);
  return Number.isNaN(date.getTime()) ? null : date;
}

function partsOf(
  date: Date,
  timeZone: string,
): Record<'day' | 'month' | 'year' | 'hour' | 'minute' | 'second', string> {
  const options: Intl.DateTimeFormatOptions = {
    day: 'numeric',
    month: 'short',
    year: 'numeric',
    hour: '2-digit',
    minute: '2-digit',
    second: '2-digit',
    hourCycle: 'h23',
  };
  const found = { day: '', month: '', year: '', hour: '', minute: '', second: '' };
  for (const { type, value } of formatter(timeZone, 'full', options).formatToParts(date)) {
    if (type in found) found[type as keyof typeof found] = value;
  }
  // en-GB abbreviates September to four letters; three keep columns in line.
  return { ...found, month: found.month.slice(0, 3) };
}

function formatter(timeZone: string, kind: string, options: Intl.DateTimeFormatOptions): Intl.DateTimeFormat {
  const key = `${timeZone}/${kind}`;
  const known = formatters.get(key);
  if (known) return known;
  const made = new Intl.DateTimeFormat(LOCALE, { ...options, timeZone });
  formatters.set(key, made);
  return made;
}

/** Minutes a zone is ahead of UTC at that moment, summer time included. */
export function zoneOffsetMinutes(moment: Moment, { timeZone = 'UTC' }: ZoneOption = {}): number {
  const found = /([+\u2212])(\d\d):(\d\d)/.exec(formatOffset(moment, { timeZone }));
  if (!found) return 0;
  const minutes = Number(found[2]) * 60 + Number(found[3]);
  return found[1] === '+' ? minutes : -minutes;
}
