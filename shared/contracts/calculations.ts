/** Bench calculations: every figure comes with its equation's name, range, source and uncertainty. */
import { z } from 'zod';
import { id } from './common.ts';
import { compensationModels, decisionRules } from './vocabulary.ts';

const temperatureC = z.number().min(-10).max(140);
const conductivityUsCm = z.number().min(0).max(5_000_000);
const basis = z.enum(['molal', 'demal', 'molar']);
const nominal = z.union([z.literal(0.01), z.literal(0.1), z.literal(1)]);

/** One answer. U null = the equation is exact, or the note says why none is stated. */
export const figure = z.object({
  name: z.string(),
  value: z.number(),
  unit: z.string(),
  expandedUncertainty: z.number().nullable().describe('in the unit of the value'),
  coverageFactor: z.number().nullable(),
  equation: z.string(),
  range: z.string(),
  source: z.string(),
  note: z.string().nullable(),
});
export type Figure = z.infer<typeof figure>;

/** A figure that cannot be given, with the reason: shown beside the others, never left out. */
export const refusal = z.object({ name: z.string(), why: z.string() });
export const calculation = z.object({ figures: z.array(figure), refusals: z.array(refusal) });
export type Calculation = z.infer<typeof calculation>;

const standardSource = z.discriminatedUnion('by', [
  z.object({ by: z.literal('basis'), basis, nominal, solventUsCm: z.number().min(0).max(20).default(0) }),
  z.object({ by: z.literal('lot'), standardId: id }),
]);

export const standardConductivity = z.object({ solution: standardSource, temperatureC });
export type StandardConductivity = z.infer<typeof standardConductivity>;

export const diluteKcl = z.object({
  concentrationMolL: z.number().min(0).max(1),
  temperatureC,
  solventUsCm: z.number().min(0).max(20).describe('measured conductivity of the water, at that temperature'),
});
export type DiluteKcl = z.infer<typeof diluteKcl>;

export const referenceValue = z.object({
  conductivityUsCm,
  temperatureC,
  coefficientPercentPerK: z.number().min(0).max(10).default(1.9),
  referenceC: z.number().min(0).max(50).default(25),
});
export type ReferenceValue = z.infer<typeof referenceValue>;
export const comparedModels = compensationModels;

export const unitConversion = z.object({
  value: z.number().positive(),
  unit: z.enum(['uS/cm', 'mS/cm', 'S/cm', 'uS/m', 'mS/m', 'S/m', 'Mohm cm', 'kohm cm', 'ohm cm', 'ohm m']),
});
export type UnitConversion = z.infer<typeof unitConversion>;

export const concentrationConversion = z.object({
  value: z.number().min(0).max(1.1),
  from: basis,
  temperatureC,
});
export type ConcentrationConversion = z.infer<typeof concentrationConversion>;

export const cellConstantFromReading = z.object({
  referenceUsCm: z.number().positive(),
  conductanceUs: z.number().positive(),
  leadResistanceOhm: z.number().min(0).default(0),
  solventUsCm: z.number().min(0).default(0),
});
export type CellConstantFromReading = z.infer<typeof cellConstantFromReading>;

/** "Can this method decide this tolerance?", asked before anyone travels. */
export const plannedComparison = z.object({
  solution: standardSource,
  temperatureC,
  temperatureStandardUncertaintyC: z.number().min(0).max(2),
  repeatabilityPercent: z.number().min(0).max(5),
  resolutionUsCm: z.number().min(0).max(1000).default(0),
  tolerancePercent: z.number().gt(0).max(50),
  rule: z.enum(decisionRules),
});
export type PlannedComparison = z.infer<typeof plannedComparison>;

export const plannedAnswer = z.object({
  canDecide: z.boolean(),
  sentence: z.string(),
  referenceUsCm: z.number(),
  expandedUncertaintyPercent: z.number(),
  coverageFactor: z.number(),
  acceptanceLimitPercent: z.number(),
  toleranceToUncertainty: z.number(),
  probabilityOutsideAtLimit: z.number(),
  source: z.string(),
  budget: z.array(z.object({ name: z.string(), contributionPercent: z.number(), sharePercent: z.number() })),
});
export type PlannedAnswer = z.infer<typeof plannedAnswer>;
