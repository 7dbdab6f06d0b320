import { z } from 'zod';
import { certificate } from './certificates.ts';
import { day, id, instant, listQuery, longText, reason, shortText, version } from './common.ts';
import { lotCode, preparation } from './preparations.ts';
import { outcomes, standardBases, standardMedia, standardStates } from './vocabulary.ts';

const temperatureRow = z.object({
  temperatureC: z.number().min(-10).max(110),
  conductivityUsCm: z.number().positive(),
});

const facts = z.object({
  producer: shortText,
  product: shortText,
  medium: z.enum(standardMedia),
  basis: z.enum(standardBases),
  nominal: z
    .union([z.literal(0.01), z.literal(0.1), z.literal(1)])
    .nullable()
    .describe('of the basis: mol/kg, demal or mol/L'),
  certifiedConductivityUsCm: z.number().positive().max(5_000_000).nullable(),
  referenceTemperatureC: z.number().min(0).max(50),
  expandedUncertaintyUsCm: z.number().positive().nullable(),
  coverageFactor: z.number().min(1).max(4).nullable(),
  coverageProbabilityPercent: z.number().min(50).max(99.99).nullable(),
  temperatureTable: z.array(temperatureRow).min(2).max(60).nullable(),
  traceability: longText,
  isInHouse: z.boolean(),
  issuedOn: day,
  expiresOn: day.describe('unopened; the last day it may be used'),
  openedLifeDays: z
    .number()
    .int()
    .min(1)
    .max(3660)
    .nullable()
    .describe('how long a bottle may be used after opening; null = until the lot expires'),
  storage: z.string().trim().max(400),
});

export const standard = facts.extend({
  id,
  code: z.string(),
  label: z.string().describe('basis and value that cannot be confused'),
  state: z.enum(standardStates),
  stateReason: z.string().nullable(),
  stateChangedAt: instant,
  isExpired: z.boolean(),
  isUsable: z.boolean(),
  checkCount: z.number().int(),
  certificate: certificate.nullable(),
  preparation: preparation.nullable().describe('how an in-house lot was made; null for a bought one'),
  version,
  can: z.object({
    release: z.boolean(),
    quarantine: z.boolean(),
    recall: z.boolean(),
    attachCertificate: z.boolean(),
    receiveBottles: z.boolean(),
    dilute: z.boolean(),
  }),
});
export type Standard = z.infer<typeof standard>;

export const createStandard = facts
  .extend({
    code: lotCode,
    coverageProbabilityPercent: facts.shape.coverageProbabilityPercent.default(null),
    openedLifeDays: facts.shape.openedLifeDays.default(null),
    storage: facts.shape.storage.default(''),
  })
  .superRefine((lot, context) => {
    const say = (path: string, message: string) =>
      context.addIssue({ code: 'custom', path: [path], message });
    if (lot.expiresOn <= lot.issuedOn) say('expiresOn', 'The lot must expire after its issue date.');
    if (
      lot.certifiedConductivityUsCm !== null &&
      (lot.expandedUncertaintyUsCm === null || lot.coverageFactor === null)
    )
      say('expandedUncertaintyUsCm', 'A certified value needs its U and k as the certificate states them.');
    if (lot.certifiedConductivityUsCm === null && lot.nominal === null)
      say(
        'certifiedConductivityUsCm',
        'Give the certified value, or a KCl basis with its nominal concentration.',
      );
    if (lot.basis !== 'other' && lot.nominal === null)
      say('nominal', 'A molal, demal or molar basis needs its nominal value.');
    if (lot.medium === 'other' && lot.basis !== 'other')
      say('basis', 'Only aqueous KCl has a molal, demal or molar basis here.');
    const rows = lot.temperatureTable ?? [];
    if (rows.some((row, index) => index > 0 && row.temperatureC <= rows[index - 1]!.temperatureC))
      say('temperatureTable', 'List each temperature once, lowest first.');
    if (lot.basis === 'other' && lot.temperatureTable === null)
      say('temperatureTable', 'Without a KCl basis the certificate’s temperature table is needed.');
  });
export type CreateStandard = z.infer<typeof createStandard>;
export const changeStandardState = z.object({ state: z.enum(standardStates), reason, version });
export type ChangeStandardState = z.infer<typeof changeStandardState>;
export const standardsQuery = listQuery.extend({ state: z.enum(standardStates).optional() });
export type StandardsQuery = z.infer<typeof standardsQuery>;

/** A lot's states as the audit trail has them, newest first. */
export const standardStateChange = z.object({
  state: z.enum(standardStates),
  reason: z.string().nullable(),
  at: instant,
  by: z.string(),
});
export type StandardStateChange = z.infer<typeof standardStateChange>;

/** Where a lot was used, at the sites the person may read, and what a recall would touch. */
export const standardUses = z.object({
  probes: z.array(
    z.object({
      probeId: id,
      probeTag: z.string(),
      siteId: id,
      siteName: z.string(),
      pointName: z.string().nullable(),
      checkCount: z.number().int(),
      calibrationCount: z.number().int(),
      lastUsedAt: instant,
      lastOutcome: z.enum(outcomes).nullable(),
      restsOnThisLot: z.boolean().describe('its newest valid comparison was made with this lot'),
    }),
  ),
  derivedLots: z.array(z.object({ id, code: z.string(), state: z.enum(standardStates) })),
  bottles: z.object({ total: z.number().int(), unopened: z.number().int(), open: z.number().int() }),
  ifRecalled: z.object({
    checkCount: z.number().int(),
    calibrationCount: z.number().int(),
    probeCount: z.number().int(),
    probesWithoutOtherEvidence: z.number().int(),
  }),
});
export type StandardUses = z.infer<typeof standardUses>;
