import { z } from 'zod';
import { id, line } from './common.ts';

export const searchQuery = z.object({ q: line.min(1).max(80) });
export const searchHit = z.object({
  kind: z.enum(['probe', 'point']),
  id,
  probeId: id.nullable(),
  title: z.string(),
  subtitle: z.string(),
  siteId: id,
});
export type SearchHit = z.infer<typeof searchHit>;
export const searchAnswer = z.object({ items: z.array(searchHit).max(20) });
