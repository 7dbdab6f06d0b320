/** Work that waits for somebody: due soon, overdue. */
import { z } from 'zod';
import { day, id, idParam, instant, listQuery } from './common.ts';
import { promptKinds } from './vocabulary.ts';

export const prompt = z.object({
  id,
  kind: z.enum(promptKinds),
  probeId: id,
  probeTag: z.string(),
  pointId: id,
  pointName: z.string(),
  siteId: id,
  siteName: z.string(),
  dueOn: day,
  raisedAt: instant,
  closedAt: instant.nullable(),
});
export type Prompt = z.infer<typeof prompt>;
export const promptsQuery = listQuery.extend({ siteId: idParam.optional(), open: z.enum(['1']).optional() });
