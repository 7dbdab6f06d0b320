import { z } from 'zod';
import { id, idParam, instant, listQuery, longText, reason, shortText, version } from './common.ts';
import {
  compensationModels,
  criticalities,
  decisionRules,
  displayUnits,
  hazardTags,
  intervalMethods,
} from './vocabulary.ts';

/** Requirements belong to the measuring point. */
const requirements = z.object({
  name: shortText,
  duty: shortText.describe('what the reading decides'),
  medium: shortText,
  displayUnit: z.enum(displayUnits),
  compensationModel: z.enum(compensationModels),
  compensationCoefficientPercentPerK: z.number().gt(0).max(10).nullable(),
  referenceTemperatureC: z.number().min(0).max(100),
  lowLimitUsCm: z.number().min(0).nullable(),
  highLimitUsCm: z.number().positive().nullable(),
  tolerancePercent: z.number().gt(0).max(50),
  decisionRule: z.enum(decisionRules),
  intervalDays: z.number().int().min(1).max(1830),
  intervalMethod: z.enum(intervalMethods),
  criticality: z.enum(criticalities),
  hazardTags: z.array(z.enum(hazardTags)),
  controlNote: longText.max(1000).nullable().describe('what acts on this signal, in one sentence'),
});

const limitsInOrder = {
  check: (point: { lowLimitUsCm?: number | null; highLimitUsCm?: number | null }) =>
    point.lowLimitUsCm == null || point.highLimitUsCm == null || point.lowLimitUsCm < point.highLimitUsCm,
  says: { path: ['highLimitUsCm'], message: 'The high limit must lie above the low limit.' },
};
const coefficientGiven = {
  check: (point: { compensationModel?: string; compensationCoefficientPercentPerK?: number | null }) =>
    point.compensationModel !== 'linear' || point.compensationCoefficientPercentPerK != null,
  says: {
    path: ['compensationCoefficientPercentPerK'],
    message: 'Linear compensation needs its coefficient in % per K.',
  },
};

/** Natural-water and ultrapure state the value at 25 °C only; a straight line holds near its reference. */
const referenceFits = {
  check: (point: { compensationModel?: string; referenceTemperatureC?: number }) => {
    const { compensationModel: model, referenceTemperatureC: reference } = point;
    if (model === undefined || reference === undefined) return true;
    if (model === 'natural-water' || model === 'ultrapure') return reference === 25;
    return model !== 'linear' || reference <= 50;
  },
  says: {
    path: ['referenceTemperatureC'],
    message: 'Natural water and ultrapure need 25 °C; linear compensation at most 50 °C.',
  },
};

export const point = requirements.extend({
  id,
  code: z.string(),
  areaId: id,
  areaName: z.string(),
  siteId: id,
  siteName: z.string(),
  probe: z.object({ id, tag: z.string(), serial: z.string(), kind: z.string(), since: instant }).nullable(),
  hold: z
    .object({ userId: id, userName: z.string(), reason: z.string(), fromAt: instant, untilAt: instant })
    .nullable(),
  retiredAt: instant.nullable(),
  version,
  can: z.object({
    change: z.boolean(),
    retire: z.boolean(),
    hold: z.boolean(),
    release: z.boolean(),
    install: z.boolean(),
  }),
});
export type Point = z.infer<typeof point>;

/** A probe that stood, or stands, at a point. */
export const pointProbe = z.object({
  id,
  tag: z.string(),
  serial: z.string(),
  kind: z.string(),
  fromAt: instant,
  toAt: instant.nullable(),
});
export type PointProbe = z.infer<typeof pointProbe>;

const code = z
  .string()
  .trim()
  .toUpperCase()
  .regex(/^[A-Z0-9][A-Z0-9-]{1,23}$/, 'Use 2 to 24 letters, digits and hyphens.');

/** The requirements as a whole, as they stand after a change. */
export const pointRequirements = requirements
  .refine(limitsInOrder.check, limitsInOrder.says)
  .refine(coefficientGiven.check, coefficientGiven.says)
  .refine(referenceFits.check, referenceFits.says);

export const createPoint = requirements
  .extend({ areaId: id, code })
  .refine(limitsInOrder.check, limitsInOrder.says)
  .refine(coefficientGiven.check, coefficientGiven.says)
  .refine(referenceFits.check, referenceFits.says);
export type CreatePoint = z.infer<typeof createPoint>;

export const changePoint = requirements
  .partial()
  .extend({ areaId: id.optional(), reason, version })
  .refine(limitsInOrder.check, limitsInOrder.says);
export type ChangePoint = z.infer<typeof changePoint>;

export const retirePoint = z.object({ reason, version });
export const holdPoint = z.object({
  reason,
  untilAt: instant.describe('when it should be back; at most 24 hours ahead'),
});
export type HoldPoint = z.infer<typeof holdPoint>;
export const pointsQuery = listQuery.extend({
  siteId: idParam.optional(),
  areaId: idParam.optional(),
  free: z.enum(['1']).optional().describe('1 = only points without a probe'),
  retired: z.enum(['1']).optional().describe('1 = the retired ones as well'),
});
export type PointsQuery = z.infer<typeof pointsQuery>;
