import { describe, expect, it } from 'vitest';
import {
  allSitesSentence,
  plainText,
  siteSentence,
  spanInWords,
} from '../../client/src/features/readings/sentence.ts';
import { aHold, aLiveRow } from './live-rows.ts';

const NOW = Date.parse('2026-12-01T13:22:00Z');
const fit = (count: number) => Array.from({ length: count }, () => aLiveRow());

describe('the sentence that opens a site', () => {
  it('says how many readings are fit and then every exception, the gravest last and strong', () => {
    const rows = [
      ...fit(7),
      aLiveRow({ trust: { level: 'use-with-care', reason: 'within-unsure', text: '' } }),
      aLiveRow({ trust: { level: 'use-with-care', reason: 'check-overdue', text: '' } }),
      aLiveRow({ trust: { level: 'do-not-use', reason: 'held', text: '' }, hold: aHold('Ines Falk') }),
      aLiveRow({
        trust: { level: 'no-signal', reason: 'silent', text: '' },
        readingAt: '2026-12-01T12:24:00Z',
      }),
      aLiveRow({ trust: { level: 'do-not-use', reason: 'cell-constant-changed', text: '' } }),
    ];
    const parts = siteSentence(rows, NOW);
    expect(plainText(parts)).toBe(
      'Seven of twelve readings are fit to use. Two need care, one is held for Ines Falk, one has been silent for 58 minutes, and one must not be used.',
    );
    expect(parts.filter((part) => part.isStrong).map((part) => part.text)).toEqual(['one must not be used.']);
  });

  it('is one short sentence when nothing is the matter', () => {
    expect(plainText(siteSentence(fit(5), NOW))).toBe('All five readings are fit to use.');
  });

  it('joins two exceptions without a comma and begins with a capital letter', () => {
    const rows = [
      ...fit(2),
      aLiveRow({ trust: { level: 'use-with-care', reason: 'within-unsure', text: '' } }),
      aLiveRow({ trust: { level: 'do-not-use', reason: 'outside-clear', text: '' } }),
    ];
    expect(plainText(siteSentence(rows, NOW))).toBe(
      'Two of four readings are fit to use. One needs care and one must not be used.',
    );
  });

  it('does not raise the alarm for a probe that is in its check solution', () => {
    const rows = [
      ...fit(3),
      aLiveRow({ trust: { level: 'do-not-use', reason: 'not-in-process', text: '' } }),
    ];
    const parts = siteSentence(rows, NOW);
    expect(plainText(parts)).toBe('Three of four readings are fit to use. One is out of the process.');
    expect(parts.some((part) => part.isStrong)).toBe(false);
  });

  it('speaks of points without a probe apart from silent ones', () => {
    const rows = [
      aLiveRow({ trust: { level: 'no-signal', reason: 'no-probe', text: '' }, hasProbe: false }),
      aLiveRow({ trust: { level: 'no-signal', reason: 'silent', text: '' } }),
      aLiveRow({ trust: { level: 'no-signal', reason: 'silent', text: '' } }),
    ];
    expect(plainText(siteSentence(rows, NOW))).toBe(
      'None of three readings is fit to use. One has no probe and two send no signal.',
    );
  });

  it('says plainly that nothing is set up yet', () => {
    expect(plainText(siteSentence([], NOW))).toBe('No measuring point is set up here yet.');
  });
});

describe('the sentence over all sites', () => {
  it('adds the counts of the sites up', () => {
    const none = { fit: 0, useWithCare: 0, doNotUse: 0, held: 0, noSignal: 0 };
    const site = (id: number, counts: Partial<typeof none>) => ({
      id,
      code: `S${id}`,
      name: `Site ${id}`,
      timeZone: 'UTC',
      counts: { ...none, ...counts },
    });
    const sites = [site(1, { fit: 9, held: 1, noSignal: 1, doNotUse: 1 }), site(2, { fit: 29 })];
    expect(plainText(allSitesSentence(sites))).toBe(
      '38 of 41 readings at two sites are fit to use. One is held, one sends no signal, and one must not be used.',
    );
  });
});

describe('a span in a sentence', () => {
  it.each([
    [20_000, 'one minute'],
    [58 * 60_000, '58 minutes'],
    [89 * 60_000, '89 minutes'],
    [5 * 3_600_000, 'five hours'],
    [3 * 86_400_000, 'three days'],
  ])('%d ms is %s', (ms, words) => {
    expect(spanInWords(ms)).toBe(words);
  });
});
