import { z } from 'zod';
import { id, instant } from './common.ts';

export const mail = z.object({
  id,
  to: z.string(),
  subject: z.string(),
  textBody: z.string(),
  kind: z.string(),
  createdAt: instant,
  sentAt: instant.nullable(),
  attempts: z.number().int(),
  lastError: z.string().nullable(),
});
export type Mail = z.infer<typeof mail>;
