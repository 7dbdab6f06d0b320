import { z } from 'zod';

export const health = z.object({
  status: z.enum(['ok', 'failing']),
  parts: z.record(z.string(), z.object({ up: z.boolean(), detail: z.string().optional() })),
});
export type Health = z.infer<typeof health>;
