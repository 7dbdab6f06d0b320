import { formatDay, formatDate, formatTime, zoneOffsetMinutes } from '../../../../shared/format/dates.ts';

/**
 * Ticks of a time axis on round times of the site's zone. Chart.js's own time scale follows the browser's zone, which
 * is the wrong one for a person who looks at a site far away.
 */

const MINUTE = 60_000;
const HOUR = 60 * MINUTE;
const DAY = 24 * HOUR;
/** An average month; only used to choose a step, never to place a tick. */
const MONTH = 30.44 * DAY;

const STEPS = [
  1000,
  2000,
  5000,
  10_000,
  15_000,
  30_000,
  MINUTE,
  2 * MINUTE,
  5 * MINUTE,
  10 * MINUTE,
  15 * MINUTE,
  30 * MINUTE,
  HOUR,
  2 * HOUR,
  3 * HOUR,
  6 * HOUR,
  12 * HOUR,
  DAY,
  2 * DAY,
  7 * DAY,
  14 * DAY,
];
const MONTH_STEPS = [1, 2, 3, 6, 12, 24, 60];

export interface TimeTick {
  t: number;
  text: string;
}

/** At most `most` ticks between two times (ms), on round times of the zone. */
export function timeTicks(from: number, to: number, most: number, timeZone = 'UTC'): TimeTick[] {
  if (!(to > from) || most < 1) return [];
  const ideal = (to - from) / most;
  const step = STEPS.find((candidate) => candidate >= ideal);
  return step === undefined ? monthTicks(from, to, ideal, timeZone) : evenTicks(from, to, step, timeZone);
}

function evenTicks(from: number, to: number, step: number, timeZone: string): TimeTick[] {
  const ticks: TimeTick[] = [];
  const offset = (t: number) => zoneOffsetMinutes(t, { timeZone }) * MINUTE;
  // Weeks begin on a Monday: 5 January 1970 was one.
  const origin = step >= 7 * DAY ? 4 * DAY : 0;
  let local = Math.ceil((from + offset(from) - origin) / step) * step + origin;
  for (let t = local - offset(from); t <= to; local += step, t = local - offset(local)) {
    if (t >= from) ticks.push({ t, text: tickText(t, step, timeZone) });
  }
  return ticks;
}

function monthTicks(from: number, to: number, ideal: number, timeZone: string): TimeTick[] {
  const months = MONTH_STEPS.find((candidate) => candidate * MONTH >= ideal) ?? 120;
  const first = new Date(from + zoneOffsetMinutes(from, { timeZone }) * MINUTE);
  let month = first.getUTCFullYear() * 12 + first.getUTCMonth();
  month = Math.ceil(month / months) * months;
  const ticks: TimeTick[] = [];
  for (;;) {
    const civil = Date.UTC(Math.floor(month / 12), month % 12, 1);
    const t = civil - zoneOffsetMinutes(civil, { timeZone }) * MINUTE;
    if (t > to) return ticks;
    if (t >= from) ticks.push({ t, text: monthText(t, months, timeZone) });
    month += months;
  }
}

function tickText(t: number, step: number, timeZone: string): string {
  if (step < MINUTE) return formatTime(t, { timeZone, seconds: true });
  if (step >= DAY) return formatDay(t, { timeZone });
  const time = formatTime(t, { timeZone });
  return time === '00:00' ? formatDay(t, { timeZone }) : time;
}

function monthText(t: number, months: number, timeZone: string): string {
  const [, month = '', year = ''] = formatDate(t, { timeZone }).split(' ');
  if (months >= 12) return year;
  return month === 'Jan' ? `${month} ${year}` : month;
}
