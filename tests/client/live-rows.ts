import type { LiveRow, Trust } from '../../shared/contracts/readings.ts';
import type { LivePoint } from '../../shared/contracts/realtime.ts';

let lastId = 0;

export interface LiveRowFacts {
  trust?: Trust;
  hold?: LiveRow['hold'];
  readingAt?: string;
  hasProbe?: boolean;
  point?: Partial<LiveRow['point']>;
  reading?: Partial<NonNullable<LiveRow['reading']>>;
  trace?: LiveRow['trace'];
}

export const aHold = (userName: string): NonNullable<LiveRow['hold']> => ({
  userId: 7,
  userName,
  reason: 'cleaning',
  fromAt: '2026-12-01T13:00:00.000Z',
  untilAt: '2026-12-01T14:20:00.000Z',
});

/** A permeate point that reads 212.4 ± 3.1 µS/cm and is fit, unless told otherwise. */
export function aLiveRow(facts: LiveRowFacts = {}): LiveRow {
  lastId += 1;
  const { trust, hold = null, readingAt, hasProbe = true, point, reading, trace = [] } = facts;
  return {
    point: {
      id: lastId,
      code: `SK-${lastId}`,
      name: 'Permeate, train A',
      areaId: 1,
      areaName: 'Permeate',
      siteId: 1,
      siteName: 'Skerry Point',
      displayUnit: 'uS/cm',
      referenceTemperatureC: 25,
      compensationModel: 'linear',
      lowLimitUsCm: null,
      highLimitUsCm: 450,
      criticality: 'medium',
      controlNote: null,
      ...point,
    },
    probe: hasProbe
      ? { id: 100 + lastId, tag: 'sk-11', serial: '2E-1171', kind: 'two-electrode', cellConstantPerCm: 0.1 }
      : null,
    reading: hasProbe
      ? {
          at: readingAt ?? '2026-12-01T13:21:58.000Z',
          receivedAt: readingAt ?? '2026-12-01T13:21:58.100Z',
          context: 'process',
          conductivityUsCm: 160,
          temperatureC: 12.6,
          valueUsCm: 212.4,
          expandedUncertaintyUsCm: 3.1,
          quality: 'good',
          flags: [],
          ...reading,
        }
      : null,
    trust: trust ?? { level: 'fit', reason: 'as-compared', text: 'check −0.4 % on 24 Nov' },
    strip: null,
    trace,
    hold,
    can: { hold: hold === null, release: hold !== null },
  };
}

export const aLivePoint = (facts: Partial<LivePoint> = {}): LivePoint => ({
  at: '2026-12-01T13:22:00.000Z',
  conductivityUsCm: 161,
  temperatureC: 12.7,
  valueUsCm: 220,
  context: 'process',
  quality: 'good',
  flags: [],
  ...facts,
});
