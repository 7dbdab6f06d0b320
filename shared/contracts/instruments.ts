import { z } from 'zod';
import { day, id, longText, reason, shortText, version } from './common.ts';
import { instrumentKinds, instrumentStates } from './vocabulary.ts';

const facts = z.object({
  kind: z.enum(instrumentKinds),
  name: shortText,
  serial: shortText,
  certificateNumber: shortText,
  issuedOn: day,
  dueOn: day,
  expandedUncertainty: z.number().positive().describe('in uncertaintyUnit'),
  uncertaintyUnit: z.enum(['C', 'percent', 'uS/cm', 'ohm', 'g']),
  coverageFactor: z.number().min(1).max(4),
  correction: z.number().describe('added to the indication, in uncertaintyUnit').default(0),
  traceability: longText,
});

export const instrument = facts.extend({
  id,
  code: z.string(),
  state: z.enum(instrumentStates),
  isUsable: z.boolean().describe('in use and not past its due date'),
  certificateId: id.nullable(),
  runCount: z.number().int(),
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
export const createInstrument = facts.extend({ code }).refine(dueAfterIssue, dueSays);
export type CreateInstrument = z.infer<typeof createInstrument>;
export const changeInstrument = facts
  .omit({ kind: true })
  .partial()
  .extend({ state: z.enum(instrumentStates).optional(), reason, version })
  .refine(dueAfterIssue, dueSays);
export type ChangeInstrument = z.infer<typeof changeInstrument>;
