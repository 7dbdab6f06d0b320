import { z } from 'zod';
import { day, id, idParam, instant, listQuery, reason, version } from './common.ts';

export const bottle = z.object({
  id,
  code: z.string().describe('lot code and number, as on its label: KC-26-031/07'),
  standardId: id,
  lotCode: z.string(),
  label: z.string(),
  siteId: id.nullable(),
  siteName: z.string().nullable(),
  volumeMl: z.number().positive(),
  remainingMl: z.number().min(0),
  openedAt: instant.nullable(),
  openedBy: z.string().nullable(),
  useByOn: day.nullable().describe('the earlier of the lot’s expiry and the time after opening'),
  discardedAt: instant.nullable(),
  discardedReason: z.string().nullable(),
  isUsable: z.boolean(),
  version,
  can: z.object({ open: z.boolean(), discard: z.boolean(), setRemaining: z.boolean() }),
});
export type Bottle = z.infer<typeof bottle>;

export const receiveBottles = z.object({
  standardId: id,
  siteId: id.nullable(),
  count: z.number().int().min(1).max(100),
  volumeMl: z.number().positive().max(20_000),
});
export type ReceiveBottles = z.infer<typeof receiveBottles>;
export const openBottle = z.object({ version });
export const setRemaining = z.object({ remainingMl: z.number().min(0).max(20_000), version });
export type SetRemaining = z.infer<typeof setRemaining>;
export const discardBottle = z.object({ reason, version });
export type DiscardBottle = z.infer<typeof discardBottle>;
export const bottlesQuery = listQuery.extend({
  standardId: idParam.optional(),
  siteId: idParam.optional(),
  usable: z.enum(['1']).optional(),
});
export type BottlesQuery = z.infer<typeof bottlesQuery>;
