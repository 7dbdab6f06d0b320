import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readingsMessage } from '../../shared/contracts/mqtt.ts';
import { readingContexts, readingFlags, readingQualities } from '../../shared/contracts/vocabulary.ts';
import { decode } from '../../server/ingest/decode.ts';
import { decodePlainReadings } from '../../server/ingest/fast-decode.ts';
import { judgeAge } from '../../server/ingest/time-rules.ts';
import { ClockOffset } from '../../server/ingest/clock-offset.ts';
import { compareBoots, isAfter } from '../../server/ingest/boot-order.ts';
import { numberColumn, textColumn, wordSetColumn } from '../../server/ingest/columns.ts';
import { isDeviceSecret, hashDeviceSecret } from '../../server/ingest/device-secrets.ts';

const messages = <T>(value: fc.Arbitrary<T>, ...odd: unknown[]): fc.Arbitrary<unknown> =>
  fc.oneof(
    { arbitrary: value as fc.Arbitrary<unknown>, weight: 12 },
    { arbitrary: fc.constantFrom(...odd), weight: 1 },
  );

/** Mostly right, now and then odd in one field or another: near the border is where the two could differ. */
const aReading = fc.record(
  {
    n: messages(fc.nat(), -1, 1.5, '7', null, 2 ** 53),
    at: messages(
      fc
        .date({ min: new Date('1999-01-01'), max: new Date('2030-01-01'), noInvalidDate: true })
        .map((d) => d.toISOString()),
      '2026-02-30T10:00:00Z',
      '2026-02-28T24:00:00Z',
      '2026-12-01T10:15:00+01:00',
      '2026-12-01T10:15:00.123456Z',
      '2026-12-01 10:15:00Z',
      '2026-13-01T10:15:00Z',
      17,
    ),
    context: messages(fc.constantFrom(...readingContexts), 'lunch', null),
    conductivity_us_cm: messages(
      fc.double({ min: 0, max: 5e6, noNaN: true }),
      null,
      -1,
      5_000_001,
      '3',
      undefined,
    ),
    temperature_c: messages(fc.double({ min: -50, max: 300, noNaN: true }), null, -51, 301, undefined),
    conductance_us: messages(fc.double({ min: 0, max: 5e7, noNaN: true }), null, undefined, -1, {}),
    solution: messages(fc.constantFrom('LOT-1', null), undefined, 'x'.repeat(81), 5),
    quality: messages(fc.constantFrom(...readingQualities), 'fine'),
    flags: messages(
      fc.uniqueArray(fc.constantFrom(...readingFlags)),
      undefined,
      ['odd'],
      'hold',
      null,
      Array(9).fill('dry'),
    ),
    extra: messages(fc.constant(undefined), 'unknown field'),
  },
  { requiredKeys: ['n', 'at', 'context', 'quality'] },
);
const aMessage = fc.record(
  {
    v: messages(fc.constant(1), 2, '1'),
    boot: messages(fc.constantFrom('01JE6M0T6Y', 'abcd'), 'abc', 'with space', 4),
    sent: messages(fc.constant('2026-12-01T10:15:02.120Z'), 'yesterday'),
    clock: messages(fc.constant({ source: 'ntp', offset_ms: 12 }), undefined, { source: 'ntp' }, null, {
      source: 'x'.repeat(21),
      offset_ms: 0,
    }),
    settings: messages(fc.constant('sha256:9b1c4e'), undefined, 'short', null),
    readings: messages(fc.array(aReading, { minLength: 1, maxLength: 4 }), [], null, {}),
  },
  { requiredKeys: ['v', 'boot', 'sent', 'readings'] },
);

describe('the quick way to read a message', () => {
  it('accepts only what the schema accepts, and reads the same', () => {
    let quick = 0;
    fc.assert(
      fc.property(aMessage, (message) => {
        const value: unknown = JSON.parse(JSON.stringify(message));
        const plain = decodePlainReadings(value, false);
        if (plain === null) return;
        quick += 1;
        const checked = readingsMessage.parse(value);
        expect(plain.readings).toEqual(
          checked.readings.map((reading) => ({
            n: reading.n,
            atMs: Date.parse(reading.at),
            context: reading.context,
            conductivityUsCm: reading.conductivity_us_cm,
            temperatureC: reading.temperature_c,
            conductanceUs: reading.conductance_us ?? null,
            solution: reading.solution ?? null,
            quality: reading.quality,
            flags: reading.flags,
            extraJson: null,
          })),
        );
        expect([plain.boot, plain.sentMs, plain.clockSource, plain.settingsHash]).toEqual([
          checked.boot,
          Date.parse(checked.sent),
          checked.clock?.source ?? null,
          checked.settings ?? null,
        ]);
      }),
      { numRuns: 3000, seed: 20_261_201 },
    );
    expect(quick).toBeGreaterThan(200);
  });

  it('leaves the twenty-ninth and later days to the schema, which knows the months', () => {
    const message = (at: string) => ({
      v: 1,
      boot: '01JE6M0T6Y',
      sent: '2026-12-01T10:15:02Z',
      readings: [{ n: 1, at, context: 'process', conductivity_us_cm: 1, temperature_c: 20, quality: 'good' }],
    });
    const outcome = (at: string) => decode('readings', Buffer.from(JSON.stringify(message(at))), 'device-1');
    expect(outcome('2026-11-30T10:00:00Z')).toHaveProperty('content');
    expect(outcome('2026-11-31T10:00:00Z')).toHaveProperty('refusal.code', 'schema-invalid');
  });
});

describe('time', () => {
  const now = Date.parse('2026-12-01T12:00:00Z');
  it.each([
    [0, 'live'],
    [-15 * 60_000, 'live'],
    [-15 * 60_000 - 1, 'late'],
    [120_000, 'live'],
    [120_001, 'time-in-future'],
    [-10.01 * 365.25 * 86_400_000, 'time-too-old'],
  ])('%i ms from now is %s', (offset, verdict) => {
    expect(judgeAge(now + offset, now)).toBe(verdict);
  });

  it('the clock offset is the median of the last fifty, which one held-up message does not move', () => {
    const offset = new ClockOffset();
    for (let i = 0; i < 100; i += 1) offset.add(1000 + i, i === 80 ? -900_000 : i);
    expect(offset.medianMs()).toBe(1000);
  });
});

describe('boot order', () => {
  it('compares code units, as the database does: capitals before small letters', () => {
    expect(['b', 'B', 'a', '0'].sort(compareBoots)).toEqual(['0', 'B', 'a', 'b']);
    expect(isAfter({ boot: 'B', n: 0 }, { boot: 'A', n: 99 })).toBe(true);
    expect(isAfter({ boot: 'A', n: 99 }, { boot: 'A', n: 99 })).toBe(false);
  });
});

describe('columns as array text', () => {
  it('quote what needs it', () => {
    expect(numberColumn([1, null, -2.5e-7])).toBe('{1,NULL,-2.5e-7}');
    expect(textColumn(['plain', null, 'NULL', '', 'a "b" \\', 'x,y'])).toBe(
      '{plain,NULL,"NULL","","a \\"b\\" \\\\","x,y"}',
    );
    expect(wordSetColumn([[], ['t_open', 'dry']])).toBe('{"{}","{t_open,dry}"}');
  });
});

describe('device secrets', () => {
  it('fit their own hash and no other', () => {
    const stored = hashDeviceSecret('secret');
    expect(isDeviceSecret(stored, Buffer.from('secret'))).toBe(true);
    expect(isDeviceSecret(stored, 'Secret')).toBe(false);
    expect(isDeviceSecret('secret', 'secret')).toBe(false);
  });
});
