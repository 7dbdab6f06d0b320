import { describe, expect, it } from 'vitest';
import {
  dayBounds,
  deedWords,
  fieldChanges,
  receivedLater,
} from '../../client/src/features/audit-events/model.ts';
import { fieldWords } from '../../client/src/features/audit-events/words.ts';
import type { AuditEventView } from '../../shared/contracts/audit-events.ts';

const event = (fields: Partial<AuditEventView>): AuditEventView => ({
  sequence: 7,
  capturedAt: '2026-12-01T13:22:00.000Z',
  receivedAt: '2026-12-01T13:22:00.120Z',
  actorKind: 'user',
  actorId: 2,
  actorName: 'Tomas Reik',
  actingRole: 'manager',
  action: 'points.changed',
  objectKind: 'points',
  objectId: '9',
  objectVersion: 1,
  siteId: 1,
  oldValue: null,
  newValue: null,
  reason: null,
  source: null,
  previousHash: 'a',
  hash: 'b',
  ...fields,
});

describe('what changed', () => {
  it('is told field by field with its unit, and what stayed is left out', () => {
    expect(
      fieldChanges(
        { cellConstantPerCm: 0.50228, tag: 'sk-04' },
        { cellConstantPerCm: 0.55995, tag: 'sk-04' },
      ),
    ).toEqual([{ field: 'cell constant', from: '0.50228\u00a0cm⁻¹', to: '0.55995\u00a0cm⁻¹' }]);
  });

  it('of a new thing is every value it began with, without the empty ones', () => {
    expect(fieldChanges(null, { name: 'Noor Vane', deactivatedAt: null })).toEqual([
      { field: 'name', from: null, to: 'Noor Vane' },
    ]);
  });

  it('says nothing where a value was removed', () => {
    expect(fieldChanges({ highLimitUsCm: 500 }, { highLimitUsCm: null })).toEqual([
      { field: 'high limit', from: '500\u00a0µS/cm', to: 'nothing' },
    ]);
  });

  it('keeps what an entry tells only of before', () => {
    expect(fieldChanges({ topic: 'a/b' }, { resolvedAt: '2026-12-01T13:22:07.000Z' })).toEqual([
      { field: 'topic', from: 'a/b', to: null },
      { field: 'resolved at', from: null, to: '1 Dec 2026 13:22:07 UTC+00:00' },
    ]);
  });

  it('opens lists and nested values', () => {
    expect(
      fieldChanges(
        { hazardTags: ['chemicals'], table: [{ temperatureC: 20 }] },
        { hazardTags: ['chemicals', 'hygiene'], table: [{ temperatureC: 25 }] },
      ),
    ).toEqual([
      { field: 'hazard tags', from: 'chemicals', to: 'chemicals, hygiene' },
      { field: 'table 1 temperature', from: '20\u00a0°C', to: '25\u00a0°C' },
    ]);
  });
});

it.each([
  ['tolerancePercent', 'tolerance', '%'],
  ['compensationCoefficientPercentPerK', 'compensation coefficient', '%/K'],
  ['temperatureStandardUncertaintyC', 'temperature standard uncertainty', 'K'],
  ['referenceTemperatureC', 'reference temperature', '°C'],
  ['intervalDays', 'interval', 'days'],
  ['timeZone', 'time zone', null],
])('reads the field %s as %s in %s', (path, name, unit) => {
  expect(fieldWords(path)).toEqual({ name, unit });
});

describe('what was done', () => {
  it('names the thing where the entry carries its name, else by its number', () => {
    const value = { code: 'KC-26-040' };
    expect(deedWords(event({ action: 'standards.created', objectKind: 'standards', newValue: value }))).toBe(
      'registered the lot KC-26-040',
    );
    expect(deedWords(event({}))).toBe('changed the point no. 9');
  });

  it('does not take the code of a refusal for a name', () => {
    const resolved = {
      action: 'quarantine.resolved',
      objectKind: 'quarantine',
      oldValue: { code: 'not-json' },
    };
    expect(deedWords(event(resolved))).toBe('dealt with the message no. 9');
  });

  it('hides no action that nobody has put into words yet', () => {
    expect(deedWords(event({ action: 'points.painted' }))).toBe('points painted: measuring point no. 9');
  });
});

it('says when an entry came late, as from a phone that was offline', () => {
  expect(receivedLater(event({}))).toBeNull();
  expect(receivedLater(event({ receivedAt: '2026-12-01T14:00:00.000Z' }))).toBe('1 Dec 2026 14:00:00');
});

it('asks for whole days, the last one included', () => {
  expect(dayBounds('2026-12-01', '2026-12-01')).toEqual({
    from: '2026-12-01T00:00:00.000Z',
    to: '2026-12-02T00:00:00.000Z',
  });
  expect(dayBounds('', 'soon')).toEqual({});
});
