import { describe, expect, it } from 'vitest';
import { settingDefaults } from '../../shared/contracts/settings.ts';
import { judgeReading, valueAtReference } from '../../server/features/readings/judge.ts';
import { cellConstantDiffers, judgeTrust, type TrustInput } from '../../server/features/readings/trust.ts';

const now = new Date('2026-12-01T13:22:07Z');
/** A permeate point on a fit day; each case changes one thing. */
const fit: TrustInput = {
  now,
  timeZone: 'UTC',
  point: { intervalDays: 90, displayUnit: 'uS/cm' },
  probe: { cellConstantPerCm: 0.1021 },
  device: { isOnline: true, reportedCellConstantPerCm: 0.1021, readingIntervalS: 10, clockOffsetMs: 0 },
  reading: {
    at: new Date('2026-12-01T13:22:03Z'),
    context: 'process',
    conductivityUsCm: 160,
    temperatureC: 12.6,
    quality: 'good',
    flags: [],
    valueUsCm: 212.4,
  },
  hold: null,
  lastCheck: {
    at: new Date('2026-10-21T09:00:00Z'),
    stage: 'as-left',
    errorPercent: 0.4,
    outcome: 'within-clear',
  },
  calibrationDueOn: null,
  fitness: settingDefaults['check-fitness'],
};
const reading = (more: Partial<NonNullable<TrustInput['reading']>>): Partial<TrustInput> => ({
  reading: { ...fit.reading!, ...more },
});
const device = (more: Partial<NonNullable<TrustInput['device']>>): Partial<TrustInput> => ({
  device: { ...fit.device!, ...more },
});
const lastCheck = (more: Partial<NonNullable<TrustInput['lastCheck']>>): Partial<TrustInput> => ({
  lastCheck: { ...fit.lastCheck!, ...more },
});

describe('trust and its reason in words', () => {
  it.each<[string, string, string, Partial<TrustInput>]>([
    ['fit', 'as-compared', 'as left +0.4 % on 21 Oct', {}],
    [
      'fit',
      'as-compared',
      'check −0.4 % on 24 Nov',
      lastCheck({ stage: 'automatic', errorPercent: -0.4, at: new Date('2026-11-24T09:00:00Z') }),
    ],
    [
      'use-with-care',
      'value-unknown',
      'no value at its reference temperature: the point’s model does not hold here',
      reading({ valueUsCm: null }),
    ],
    ['no-signal', 'no-probe', 'no probe is installed here', { probe: null }],
    ['no-signal', 'no-device', 'the probe has no device that could report', { device: null }],
    ['no-signal', 'never-heard', 'its device has never sent a reading', { reading: null }],
    [
      'no-signal',
      'silent',
      'last message 12:24, 212.4 µS/cm',
      reading({ at: new Date('2026-12-01T12:24:00Z') }),
    ],
    [
      'no-signal',
      'silent',
      'last message 30 Nov 23:59, 212.4 µS/cm',
      reading({ at: new Date('2026-11-30T23:59:00Z') }),
    ],
    [
      'no-signal',
      'silent',
      'last message 12:24, 2.140 mS/cm',
      {
        point: { ...fit.point, displayUnit: 'mS/cm' },
        ...reading({ at: new Date('2026-12-01T12:24:00Z'), valueUsCm: 2140 }),
      },
    ],
    [
      'do-not-use',
      'held',
      'held: in a bottle, back about 14:20',
      { hold: { reason: 'in a bottle', untilAt: new Date('2026-12-01T14:20:00Z') } },
    ],
    [
      'do-not-use',
      'temperature-failed',
      'temperature sensor open',
      reading({ flags: ['t_open'], temperatureC: null }),
    ],
    ['do-not-use', 'temperature-failed', 'the device sent no temperature', reading({ temperatureC: null })],
    ['do-not-use', 'quality-bad', 'the device itself calls this reading bad', reading({ quality: 'bad' })],
    ['do-not-use', 'quality-bad', 'above the range of the probe', reading({ flags: ['over'] })],
    ['do-not-use', 'not-in-process', 'in a reference solution for a check', reading({ context: 'check' })],
    ['do-not-use', 'not-in-process', 'the cell is dry', reading({ flags: ['dry'] })],
    [
      'do-not-use',
      'cell-constant-changed',
      'cell constant changed, no record',
      device({ reportedCellConstantPerCm: 0.112 }),
    ],
    [
      'do-not-use',
      'outside-clear',
      'as left +9.7 %, outside its tolerance',
      lastCheck({ outcome: 'outside-clear', errorPercent: 9.7 }),
    ],
    [
      'do-not-use',
      'outside-unsure',
      'as left +3.2 %, outside, too close to be sure',
      lastCheck({ outcome: 'outside-unsure', errorPercent: 3.2 }),
    ],
    [
      'use-with-care',
      'within-unsure',
      'check +2.6 %, too close to be sure',
      lastCheck({ stage: 'automatic', outcome: 'within-unsure', errorPercent: 2.6 }),
    ],
    [
      'use-with-care',
      'check-overdue',
      'as left +0.4 % on 21 Oct, due since 20 Nov',
      { point: { ...fit.point, intervalDays: 30 } },
    ],
    [
      'use-with-care',
      'check-overdue',
      'fitness not confirmed, due 30 Nov',
      // A newer automatic check does not stand in for the calibration.
      {
        calibrationDueOn: '2026-11-30',
        ...lastCheck({ at: new Date('2026-12-01T06:00:00Z'), stage: 'automatic' }),
      },
    ],
    ['use-with-care', 'never-compared', 'never compared with a reference solution', { lastCheck: null }],
    [
      'use-with-care',
      'quality-doubtful',
      'the device itself calls this reading doubtful',
      reading({ quality: 'doubtful' }),
    ],
    [
      'use-with-care',
      'clock-doubtful',
      'its clock is 3 min behind',
      { ...device({ clockOffsetMs: 200_000 }), ...reading({ at: new Date('2026-12-01T13:18:43Z') }) },
    ],
  ])('%s, %s: %s', (level, reason, text, change) => {
    const judged = judgeTrust({ ...fit, ...change });
    expect({ ...judged, text: judged.text.replaceAll('\u00a0', ' ').replaceAll('\u2212', '−') }).toEqual({
      level,
      reason,
      text,
    });
  });

  it('the gravest reason wins', () => {
    const all = {
      ...reading({ quality: 'bad' }),
      ...lastCheck({ outcome: 'outside-clear' }),
      ...device({ reportedCellConstantPerCm: 9 }),
    };
    expect(judgeTrust({ ...fit, ...all }).reason).toBe('quality-bad');
    expect(judgeTrust({ ...fit, ...all, hold: { reason: 'away', untilAt: now } }).reason).toBe('held');
  });

  it('a device known to be gone is silent after one interval', () => {
    const twelveSecondsOld = reading({ at: new Date('2026-12-01T13:21:55Z') });
    expect(judgeTrust({ ...fit, ...twelveSecondsOld }).level).toBe('fit');
    expect(judgeTrust({ ...fit, ...twelveSecondsOld, ...device({ isOnline: false }) }).reason).toBe('silent');
  });

  it('a constant with four digits is the one on record', () => {
    expect(cellConstantDiffers(0.1021, 0.102_134)).toBe(false);
    expect(cellConstantDiffers(0.1022, 0.1021)).toBe(true);
  });
});

describe('the value of a live reading', () => {
  const linear = {
    compensationModel: 'linear',
    compensationCoefficientPercentPerK: 2,
    referenceTemperatureC: 25,
  } as const;
  const raw = { conductivityUsCm: 1000, temperatureC: 20 };

  it('is stated at the reference temperature', () => {
    expect(valueAtReference(raw, linear)).toBeCloseTo(1000 / 0.9, 9);
    expect(valueAtReference(raw, { ...linear, compensationModel: 'none' })).toBe(1000);
  });

  it.each([
    ['no temperature', { ...raw, temperatureC: null }],
    ['no conductivity', { ...raw, conductivityUsCm: null }],
    ['a temperature the model does not cover', { ...raw, temperatureC: 300 }],
  ])('is not stated with %s', (_says, reading) => {
    expect(valueAtReference(reading, linear)).toBeNull();
  });

  it('carries |e| and the uncertainties of comparison and temperature', () => {
    const lastComparison = { errorPercent: -0.6, expandedUncertaintyPercent: 0.4, coverageFactor: 2 };
    const judged = judgeReading({
      reading: raw,
      point: linear,
      lastComparison,
      temperatureStandardUncertaintyC: 0.1,
    });
    // 0.6 % + 2 √(0.2² + (2/0.9 × 0.1)²) %, the sensitivity of 1/(1 + α(t − 25)) being α/(1 + α(t − 25)).
    const relative = 0.006 + 2 * Math.hypot(0.002, (0.02 / 0.9) * 0.1);
    expect(judged.expandedUncertaintyUsCm).toBeCloseTo((relative * 1000) / 0.9, 3);
  });

  it('has no uncertainty without a comparison', () => {
    const judged = judgeReading({
      reading: raw,
      point: linear,
      lastComparison: null,
      temperatureStandardUncertaintyC: 0.1,
    });
    expect(judged).toEqual({ valueUsCm: 1000 / 0.9, expandedUncertaintyUsCm: null });
  });
});
