import { z } from 'zod';
import { certificate } from './certificates.ts';
import { day, id, instant, listQuery, longText, reason, shortText, version } from './common.ts';
import { calibrationStatuses, instrumentKinds, instrumentStates } from './vocabulary.ts';

/** `C` is a kelvin of error as well: a difference of temperatures. */
export const uncertaintyUnits = ['C', 'percent', 'uS/cm', 'ohm', 'g'] as const;
export type UncertaintyUnit = (typeof uncertaintyUnits)[number];

const facts = z.object({
  kind: z.enum(instrumentKinds),
  name: shortText,
  serial: shortText,
  certificateNumber: shortText,
  issuedOn: day,
  dueOn: day,
  expandedUncertainty: z.number().positive().describe('in uncertaintyUnit'),
  uncertaintyUnit: z.enum(uncertaintyUnits),
  coverageFactor: z.number().min(1).max(4),
  correction: z.number().describe('added to the indication, in uncertaintyUnit'),
  traceability: longText,
});

export const instrument = facts.extend({
  id,
  code: z.string(),
  state: z.enum(instrumentStates),
  isUsable: z.boolean().describe('in use and not past its due date'),
  certificate: certificate.nullable(),
  runCount: z.number().int().describe('calibrations that used it, at the sites the person may read'),
  version,
  can: z.object({ change: z.boolean(), uploadCertificate: z.boolean() }),
});
export type Instrument = z.infer<typeof instrument>;

const code = z
  .string()
  .trim()
  .toUpperCase()
  .regex(/^[A-Z0-9][A-Z0-9-]{1,23}$/, 'Use 2 to 24 letters, digits and hyphens.');
const dueAfterIssue = (given: { issuedOn?: string | undefined; dueOn?: string | undefined }) =>
  given.issuedOn === undefined || given.dueOn === undefined || given.issuedOn < given.dueOn;
const dueSays = { path: ['dueOn'], message: 'The due date must lie after the certificate’s date.' };
export const createInstrument = facts
  .extend({ code, correction: facts.shape.correction.default(0) })
  .refine(dueAfterIssue, dueSays);
export type CreateInstrument = z.infer<typeof createInstrument>;
export const changeInstrument = facts
  .omit({ kind: true })
  .partial()
  .extend({ state: z.enum(instrumentStates).optional(), reason, version })
  .refine(dueAfterIssue, dueSays);
export type ChangeInstrument = z.infer<typeof changeInstrument>;

export const instrumentsQuery = listQuery.extend({
  kind: z.enum(instrumentKinds).optional(),
  usable: z.enum(['1']).optional(),
});
export type InstrumentsQuery = z.infer<typeof instrumentsQuery>;

/** A run that used the instrument, newest first. */
export const instrumentUse = z.object({
  calibrationId: id,
  number: z.string().nullable(),
  status: z.enum(calibrationStatuses),
  probeId: id,
  probeTag: z.string(),
  pointName: z.string(),
  siteName: z.string(),
  performer: z.string(),
  startedAt: instant,
});
export type InstrumentUse = z.infer<typeof instrumentUse>;
