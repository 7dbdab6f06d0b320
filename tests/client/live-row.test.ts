import { describe, expect, it } from 'vitest';
import {
  alarmsOf,
  alarmWords,
  figureRoom,
  isSurprising,
  needsPersonNow,
  quantityOf,
  readingNow,
  rowHref,
  rowState,
  tracePoints,
  valueHead,
  valueState,
} from '../../client/src/features/readings/live-row.ts';
import { aHold, aLivePoint, aLiveRow } from './live-rows.ts';

const stop = { level: 'do-not-use', reason: 'cell-constant-changed', text: 'cell constant changed' } as const;
const away = { level: 'do-not-use', reason: 'not-in-process', text: 'in a reference solution' } as const;
const silent = { level: 'no-signal', reason: 'silent', text: 'last message 12:24' } as const;

describe('a live row', () => {
  it('shows the newer of the fetched and the live reading, with U in proportion', () => {
    const row = aLiveRow();
    expect(quantityOf(row, readingNow(row, null)).text).toBe('212.4 ± 3.1 µS/cm'.replaceAll(' ', '\u00a0'));
    const now = readingNow(row, aLivePoint({ valueUsCm: 424.8 }));
    expect(now).toMatchObject({ valueUsCm: 424.8, temperatureC: 12.7, at: '2026-12-01T13:22:00.000Z' });
    expect(now?.expandedUncertaintyUsCm).toBeCloseTo(6.2, 10);
  });

  it('ignores a live point that is older than what was fetched', () => {
    const row = aLiveRow();
    expect(readingNow(row, aLivePoint({ at: '2026-12-01T13:20:00.000Z' }))).toBe(row.reading);
  });

  it('shows values in the unit of the point', () => {
    const row = aLiveRow({
      point: { displayUnit: 'mS/cm' },
      reading: { valueUsCm: 49_820, expandedUncertaintyUsCm: 450 },
    });
    expect(quantityOf(row, row.reading)).toMatchObject({
      value: '49.82',
      uncertainty: '0.45',
      unit: 'mS/cm',
    });
  });

  it('shows no value where there is no signal', () => {
    const row = aLiveRow({ trust: silent });
    expect(quantityOf(row, row.reading).value).toBe('–');
    expect(valueState(row)).toBe('gone');
  });

  it('is loud only while nobody has a reading that must not be used', () => {
    expect(rowState(aLiveRow({ trust: stop }))).toBe('alarm');
    expect(valueState(aLiveRow({ trust: stop }))).toBe('stop');
    const taken = aLiveRow({ trust: stop, hold: aHold('Ines Falk') });
    expect(rowState(taken)).toBe('held');
    expect(valueState(taken)).toBe('held');
    expect(needsPersonNow(aLiveRow({ trust: away }))).toBe(false);
    expect(rowState(aLiveRow({ trust: away }))).toBe('plain');
  });

  it('asks for the board again when a reading says what the trust cannot know yet', () => {
    expect(isSurprising(aLiveRow(), aLivePoint())).toBe(false);
    expect(isSurprising(aLiveRow(), aLivePoint({ context: 'check' }))).toBe(true);
    expect(isSurprising(aLiveRow(), aLivePoint({ quality: 'bad' }))).toBe(true);
    expect(isSurprising(aLiveRow(), aLivePoint({ flags: ['t_open'] }))).toBe(true);
    expect(isSurprising(aLiveRow({ trust: silent }), aLivePoint())).toBe(true);
    expect(isSurprising(aLiveRow(), aLivePoint({ at: '2026-12-01T13:00:00.000Z', context: 'check' }))).toBe(
      false,
    );
  });

  it('opens its probe, or the point where there is none', () => {
    const row = aLiveRow();
    expect(rowHref(row)).toBe(`/probes/${row.probe?.id}`);
    const bare = aLiveRow({ hasProbe: false });
    expect(rowHref(bare)).toBe(`/points/${bare.point.id}`);
  });

  it('ends its trace where somebody began to work, and breaks it where nothing was heard', () => {
    const at = (text: string) => Date.parse(`2026-12-01T${text}:00.000Z`);
    const trace: [number, number][] = [
      [at('12:50'), 210],
      [at('12:58'), 211],
      [at('13:10'), 212],
    ];
    expect(tracePoints(aLiveRow({ trace, hold: aHold('Ines Falk') }), null)).toEqual(trace.slice(0, 2));
    const row = aLiveRow({ trace });
    expect(tracePoints(row, row.reading).map(([, value]) => value)).toEqual([210, 211, 212, null, 212.4]);
  });
});

describe('alarms', () => {
  it('tell what, why and what follows the signal', () => {
    const row = aLiveRow({ trust: stop, point: { controlNote: 'The divert valve follows this signal' } });
    expect(alarmWords(row)).toBe(
      'The cell constant in its transmitter changed and no record asked for it. The divert valve follows this signal.',
    );
    const outside = aLiveRow({
      trust: { level: 'do-not-use', reason: 'outside-clear', text: 'check +9.7 %, outside its tolerance' },
    });
    expect(alarmWords(outside)).toBe('Check +9.7 %, outside its tolerance.');
  });

  it('put the most critical points first and count the rest', () => {
    const rows = (['low', 'critical', 'medium', 'high'] as const).map((criticality) =>
      aLiveRow({ trust: stop, point: { criticality } }),
    );
    const { shown, more } = alarmsOf([...rows, aLiveRow()]);
    expect(shown.map((row) => row.point.criticality)).toEqual(['critical', 'high', 'medium']);
    expect(more).toBe(1);
  });
});

describe('the room of the value column', () => {
  it('grows with the longest figure, so that values, U and units never touch', () => {
    expect(figureRoom([aLiveRow()])).toEqual({ whole: 5, fraction: 3 });
    const fine = aLiveRow({ reading: { valueUsCm: 6.985, expandedUncertaintyUsCm: 0.075 } });
    expect(figureRoom([aLiveRow(), fine])).toEqual({ whole: 5, fraction: 4 });
  });
});

describe('the head of the value column', () => {
  it('says 25 °C only when that is true of every row', () => {
    expect(valueHead([aLiveRow(), aLiveRow()])).toBe('Value, 25 °C, with U');
    expect(valueHead([aLiveRow(), aLiveRow({ point: { referenceTemperatureC: 20 } })])).toBe('Value with U');
    expect(valueHead([aLiveRow({ point: { compensationModel: 'none' } })])).toBe('Value with U');
  });
});
