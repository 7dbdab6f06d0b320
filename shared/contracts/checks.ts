import { z } from 'zod';
import { id, idParam, instant, listQuery } from './common.ts';
import { checkInvalidReasons, checkStages, decisionRules, outcomes } from './vocabulary.ts';

export const budgetRow = z.object({
  name: z.string(),
  standardUncertaintyPercent: z.number(),
  sharePercent: z.number(),
  distribution: z.string(),
  degreesOfFreedom: z.number().nullable(),
});
export type BudgetRow = z.infer<typeof budgetRow>;

/** One comparison with a KCl reference solution. Not valid = kept and shown with its reason, never used. */
export const check = z.object({
  id,
  probeId: id,
  probeTag: z.string(),
  pointId: id.nullable(),
  pointName: z.string().nullable(),
  siteId: id,
  at: instant,
  receivedAt: instant,
  stage: z.enum(checkStages),
  standardId: id.nullable(),
  solution: z.string().nullable(),
  isValid: z.boolean(),
  invalidReason: z.enum(checkInvalidReasons).nullable(),
  conductivityUsCm: z.number().nullable(),
  temperatureC: z.number().nullable(),
  cellConstantPerCm: z.number().nullable(),
  referenceUsCm: z.number().nullable(),
  errorPercent: z.number().nullable(),
  impliedCellConstantPerCm: z.number().nullable(),
  expandedUncertaintyPercent: z.number().nullable(),
  coverageFactor: z.number().nullable(),
  tolerancePercent: z.number().nullable(),
  decisionRule: z.enum(decisionRules).nullable(),
  outcome: z.enum(outcomes).nullable(),
  probabilityOutside: z.number().nullable(),
  acceptanceLimitPercent: z.number().nullable(),
  referenceSource: z.string().nullable(),
  budget: z.array(budgetRow).nullable(),
  performedBy: z.string().nullable(),
});
export type Check = z.infer<typeof check>;

export const checksQuery = listQuery.extend({
  probeId: idParam.optional(),
  siteId: idParam.optional(),
  standardId: idParam.optional(),
  stage: z.enum(checkStages).optional(),
});
export type ChecksQuery = z.infer<typeof checksQuery>;

/** What the history of a cell constant is drawn from; the server decides how much of it. */
export const checkHistoryQuery = z.object({ probeId: idParam });
export type CheckHistoryQuery = z.infer<typeof checkHistoryQuery>;
export const maxHistoryPoints = 1000;
export const checkHistoryPoint = z.object({
  id,
  at: instant,
  stage: z.enum(checkStages),
  impliedCellConstantPerCm: z.number(),
  expandedUncertaintyPercent: z.number().nullable(),
  tolerancePercent: z.number().nullable(),
  acceptanceLimitPercent: z.number().nullable(),
});
export type CheckHistoryPoint = z.infer<typeof checkHistoryPoint>;
export const checkHistory = z.object({
  probeId: id,
  total: z.number().int().describe('comparisons that count, drawn or not'),
  points: z.array(checkHistoryPoint).max(maxHistoryPoints).describe('oldest first'),
});
export type CheckHistory = z.infer<typeof checkHistory>;
