import { z } from 'zod';
import { day, id, instant, listQuery, longText, reason, shortText, version } from './common.ts';
import { standardBases, standardMedia, standardStates } from './vocabulary.ts';

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
  temperatureTable: z.array(temperatureRow).min(2).max(60).nullable(),
  traceability: longText,
  isInHouse: z.boolean(),
  issuedOn: day,
  expiresOn: day,
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
  version,
  can: z.object({ release: z.boolean(), quarantine: z.boolean(), recall: z.boolean() }),
});
export type Standard = z.infer<typeof standard>;

export const createStandard = facts
  .extend({
    code: z
      .string()
      .trim()
      .toUpperCase()
      .regex(/^[A-Z0-9][A-Z0-9-]{2,39}$/, 'Use 3 to 40 letters, digits and hyphens.'),
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
