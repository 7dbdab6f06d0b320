/** Reference solutions made in house: by weighing salt and water, or by diluting a lot. */
import { z } from 'zod';
import { day, id, shortText } from './common.ts';

/** Printed wherever such a lot is named. */
export const inHouseWords = 'in-house, not certified';

const airDensityKgM3 = z
  .number()
  .min(0.8)
  .max(1.4)
  .default(1.2)
  .describe('1.2 near sea level at 20 °C; the buoyancy correction needs it');
const waterBlankUsCm = z.number().min(0).max(5).describe('measured conductivity of the water at 25 °C');
const waterBlankStandardUncertaintyUsCm = z.number().positive().max(5).nullable().default(null);

export const weighedPreparation = z.object({
  kclReadingG: z.number().positive().max(2000).describe('balance reading in air'),
  waterReadingG: z.number().positive().max(50_000).describe('balance reading in air'),
  airDensityKgM3,
  purityPercent: z.number().min(90).max(100).default(100).describe('KCl in the dry salt'),
  dryingLossPercent: z.number().min(0).max(10).default(0).describe('0 when the salt was dried'),
  waterBlankUsCm,
  waterBlankStandardUncertaintyUsCm,
  saltBalanceId: id.nullable().default(null),
  waterBalanceId: id.nullable().default(null),
});
export type WeighedPreparation = z.infer<typeof weighedPreparation>;

export const dilutedPreparation = z.object({
  standardId: id.describe('the lot that is diluted'),
  stockReadingG: z.number().positive().max(10_000).describe('balance reading in air'),
  waterReadingG: z.number().positive().max(50_000).describe('balance reading in air'),
  airDensityKgM3,
  waterBlankUsCm,
  waterBlankStandardUncertaintyUsCm,
  isBlankInSameState: z
    .boolean()
    .describe('blank and solution hold the same carbon dioxide: both closed, or both left in air'),
  balanceId: id.nullable().default(null),
});
export type DilutedPreparation = z.infer<typeof dilutedPreparation>;

/** As it stands on the label of every bottle. */
export const lotCode = z
  .string()
  .trim()
  .toUpperCase()
  .regex(/^[A-Z0-9][A-Z0-9-]{2,39}$/, 'Use 3 to 40 letters, digits and hyphens.');

const lotOfPreparation = z.object({
  code: lotCode,
  expiresOn: day,
  openedLifeDays: z.number().int().min(1).max(3660).nullable().default(null),
  storage: z.string().trim().max(400).default(''),
});
export const createPreparedStandard = lotOfPreparation.extend({
  weighing: weighedPreparation,
  salt: shortText.describe('supplier, grade and lot of the salt, and how it was dried'),
});
export type CreatePreparedStandard = z.infer<typeof createPreparedStandard>;
export const createDilutedStandard = lotOfPreparation.extend({ dilution: dilutedPreparation });
export type CreateDilutedStandard = z.infer<typeof createDilutedStandard>;

/** What the masses give, with the budget of its U; the same before and after it is stored. */
export const preparation = z.object({
  method: z.enum(['weighed', 'diluted']),
  words: z.string(),
  molalityMolKg: z.number(),
  molarityMolL: z.number().describe('at 25 °C'),
  dilutionFactor: z.number().nullable(),
  conductivityUsCm: z.number().describe('at 25 °C, the water included'),
  saltConductivityUsCm: z.number(),
  waterBlankUsCm: z.number(),
  expandedUncertaintyUsCm: z.number(),
  coverageFactor: z.number(),
  budget: z.array(
    z.object({
      name: z.string(),
      distribution: z.string(),
      contributionUsCm: z.number(),
      sharePercent: z.number(),
    }),
  ),
  temperatureTable: z.array(z.object({ temperatureC: z.number(), conductivityUsCm: z.number() })),
  /** What the person should know before relying on it. */
  remarks: z.array(z.string()),
  source: z.object({ standardId: id, code: z.string() }).nullable().describe('the lot that was diluted'),
  preparedBy: z.string().nullable(),
  given: z.unknown().describe('readings and balances as entered'),
});
export type Preparation = z.infer<typeof preparation>;
