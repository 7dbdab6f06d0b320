import { describe, expect, it } from 'vitest';
import {
  formatAge,
  formatDate,
  formatDateTime,
  formatDay,
  formatDaysAway,
  formatDuration,
  formatOffset,
  isoWeek,
  toDateInput,
  zoneOffsetMinutes,
} from '../../shared/format/dates.ts';

const at = '2026-12-01T23:22:07.120Z';

describe('a moment in text', () => {
  it('names the month, in UTC unless a zone is given', () => {
    expect(formatDate(at)).toBe('1 Dec 2026');
    expect(formatDay('2026-09-08T10:41:00Z')).toBe('8 Sep');
    expect(formatDateTime(at)).toBe('1 Dec 2026 23:22');
  });

  it('is written in the zone of the site, with the offset when asked', () => {
    const timeZone = 'Europe/Oslo';
    expect(formatDateTime(at, { timeZone, seconds: true, offset: true })).toBe(
      '2 Dec 2026 00:22:07 UTC+01:00',
    );
    expect(toDateInput(at, { timeZone })).toBe('2026-12-02');
  });

  it('knows summer time and zones west of Greenwich', () => {
    expect(formatOffset('2026-07-01T12:00:00Z', { timeZone: 'Europe/Oslo' })).toBe('UTC+02:00');
    expect(formatOffset(at, { timeZone: 'America/St_Johns' })).toBe('UTC\u221203:30');
    expect(zoneOffsetMinutes(at, { timeZone: 'America/St_Johns' })).toBe(-210);
    expect(formatOffset(at)).toBe('UTC+00:00');
  });

  it('prints a dash for nothing and for nonsense', () => {
    expect(formatDateTime(null)).toBe('–');
    expect(formatDate('not a date')).toBe('–');
  });
});

describe('how long ago', () => {
  const now = '2026-12-01T12:00:00Z';
  it.each([
    ['2026-12-01T11:59:56Z', '4 s ago'],
    ['2026-12-01T11:56:00Z', '4 min ago'],
    ['2026-12-01T11:02:00Z', '58 min ago'],
    ['2026-12-01T07:00:00Z', '5 h ago'],
    ['2026-11-20T12:00:00Z', '11 d ago'],
    ['2026-12-01T12:00:01Z', 'now'],
    ['2026-12-13T12:00:00Z', 'in 12 d'],
  ])('%s is %s', (moment, words) => {
    expect(formatAge(moment, now)).toBe(words);
  });

  it('counts days on the calendar, not by 24 hours', () => {
    expect(formatDaysAway('2026-12-02T00:10:00Z', '2026-12-01T23:50:00Z')).toBe('tomorrow');
    expect(formatDaysAway('2026-12-18T08:00:00Z', now)).toBe('in 17 days');
    expect(formatDaysAway('2026-11-28T23:00:00Z', now)).toBe('3 days ago');
  });

  it('says a length in the largest unit that still says enough', () => {
    expect([75, 3000, 86_400, 400 * 86_400, 1000 * 86_400].map(formatDuration)).toEqual([
      '75 s',
      '50 min',
      '24 h',
      '13 months',
      '2 years',
    ]);
  });
});

it('numbers weeks as ISO 8601 does', () => {
  // From the calendar: 2026 has 53 weeks, 1 January 2027 is a Friday of week 53.
  expect(
    ['2026-01-01', '2026-11-30', '2026-12-31', '2027-01-01', '2027-01-04'].map((d) => isoWeek(d)),
  ).toEqual([1, 49, 53, 53, 1]);
});
