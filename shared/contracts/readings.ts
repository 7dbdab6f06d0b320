import { z } from 'zod';
import { id, idParam, instant } from './common.ts';
import {
  checkStages,
  criticalities,
  decisionRules,
  displayUnits,
  outcomes,
  probeKinds,
  readingContexts,
  readingQualities,
  trustLevels,
  trustReasons,
} from './vocabulary.ts';

export const trust = z.object({
  level: z.enum(trustLevels),
  reason: z.enum(trustReasons),
  text: z.string().describe('the reason in words'),
});
export type Trust = z.infer<typeof trust>;

/** The last KCl comparison that counts, as the tolerance strip draws it. */
export const strip = z.object({
  at: instant,
  stage: z.enum(checkStages),
  errorPercent: z.number(),
  expandedUncertaintyPercent: z.number(),
  coverageFactor: z.number(),
  tolerancePercent: z.number(),
  guardBandPercent: z.number(),
  decisionRule: z.enum(decisionRules),
  outcome: z.enum(outcomes),
  probabilityOutside: z.number(),
  earlierErrorPercent: z.array(z.number()).max(3),
});
export type Strip = z.infer<typeof strip>;

/** A reading as judged at the moment it is shown. */
export const judgedReading = z.object({
  at: instant,
  receivedAt: instant,
  context: z.enum(readingContexts),
  conductivityUsCm: z.number().nullable().describe('raw, at temperatureC'),
  temperatureC: z.number().nullable(),
  valueUsCm: z.number().nullable().describe('at the point’s reference temperature by the point’s model'),
  expandedUncertaintyUsCm: z.number().nullable(),
  quality: z.enum(readingQualities),
  flags: z.array(z.string()),
});
export type JudgedReading = z.infer<typeof judgedReading>;

export const liveRow = z.object({
  point: z.object({
    id,
    code: z.string(),
    name: z.string(),
    areaId: id,
    areaName: z.string(),
    siteId: id,
    siteName: z.string(),
    displayUnit: z.enum(displayUnits),
    referenceTemperatureC: z.number(),
    compensationModel: z.string(),
    lowLimitUsCm: z.number().nullable(),
    highLimitUsCm: z.number().nullable(),
    criticality: z.enum(criticalities),
    controlNote: z.string().nullable(),
  }),
  probe: z
    .object({
      id,
      tag: z.string(),
      serial: z.string(),
      kind: z.enum(probeKinds),
      cellConstantPerCm: z.number(),
    })
    .nullable(),
  reading: judgedReading.nullable(),
  trust,
  strip: strip.nullable(),
  trace: z
    .array(z.tuple([z.number(), z.number().nullable()]))
    .describe('two hours: [epoch ms, valueUsCm], at most 60'),
  hold: z
    .object({ userId: id, userName: z.string(), reason: z.string(), fromAt: instant, untilAt: instant })
    .nullable(),
  can: z.object({ hold: z.boolean(), release: z.boolean() }),
});
export type LiveRow = z.infer<typeof liveRow>;

export const liveBoard = z.object({
  at: instant,
  sites: z.array(
    z.object({
      id,
      code: z.string(),
      name: z.string(),
      timeZone: z.string(),
      counts: z.object({
        fit: z.number(),
        useWithCare: z.number(),
        doNotUse: z.number(),
        held: z.number(),
        noSignal: z.number(),
      }),
    }),
  ),
  rows: z
    .array(liveRow)
    .describe('by site, area and point; for all sites only those that need a person first'),
});
export type LiveBoard = z.infer<typeof liveBoard>;
export const liveQuery = z.object({ siteId: idParam.optional() });

export const seriesQuery = z.object({ probeId: idParam, from: instant, to: instant });
export type SeriesQuery = z.infer<typeof seriesQuery>;
/** At most 1 000 points; the server decides between single readings and buckets. */
export const maxSeriesPoints = 1000;
export const seriesPoint = z.object({
  at: instant.describe('of the reading, or the start of the bucket'),
  conductivityUsCm: z.number().nullable(),
  minUsCm: z.number().nullable(),
  maxUsCm: z.number().nullable(),
  temperatureC: z.number().nullable(),
  valueUsCm: z.number().nullable(),
  count: z.number().int(),
});
export type SeriesPoint = z.infer<typeof seriesPoint>;
export const series = z.object({
  probeId: id,
  from: instant,
  to: instant,
  bucketSeconds: z.number().int().nullable().describe('null = single readings'),
  referenceTemperatureC: z.number().nullable(),
  compensationModel: z.string().nullable(),
  points: z.array(seriesPoint),
});
export type Series = z.infer<typeof series>;
