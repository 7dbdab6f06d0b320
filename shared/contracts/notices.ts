import { z } from 'zod';
import { id, instant, listQuery, reason } from './common.ts';
import { noticeKinds } from './vocabulary.ts';

export const notice = z.object({
  id,
  kind: z.enum(noticeKinds),
  at: instant,
  deviceName: z.string().nullable(),
  probeId: id.nullable(),
  probeTag: z.string().nullable(),
  text: z.string(),
  closedAt: instant.nullable(),
  can: z.object({ close: z.boolean() }),
});
export type Notice = z.infer<typeof notice>;
export const closeNotice = z.object({ reason });
export const noticesQuery = listQuery.extend({ open: z.enum(['1']).optional() });
