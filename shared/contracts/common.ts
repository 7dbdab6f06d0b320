import { z } from 'zod';

/** Row identity: positive integer. */
export const id = z.number().int().positive().max(2_147_483_647);
/** Row identity in a path or query string. */
export const idParam = z.coerce.number().int().positive().max(2_147_483_647);
/** RFC 3339 instant in UTC with milliseconds. */
export const instant = z.iso.datetime({ offset: true });
/** Calendar day, `YYYY-MM-DD`. */
export const day = z.iso.date();
/** One line: no line breaks and no other control characters. */
export const line = z
  .string()
  .trim()
  // Written out, so that the published pattern means the same to readers without Unicode classes.
  .regex(/^[^\u0000-\u001f\u007f-\u009f]*$/, 'Keep it on one line, without control characters.');
/** PostgreSQL text cannot hold the null character. */
const text = z
  .string()
  .trim()
  .refine((value) => !value.includes('\0'), 'Leave out the null character.');
/** A name people read: trimmed, one line. */
export const shortText = line.min(1).max(120);
/** A few sentences. */
export const longText = text.max(4000);
/** Why somebody did it: at least a few words, kept in the audit trail. */
export const reason = text.min(3).max(1000);

export const idPath = z.object({ id: idParam });

/** `?limit=&cursor=` of every list. */
export const listQuery = z.object({
  limit: z.coerce.number().int().min(1).max(500).default(100),
  cursor: z.string().max(400).optional(),
  q: line.max(120).optional(),
});
export type ListQuery = z.infer<typeof listQuery>;

/** `{ items, total, nextCursor }` in stable order; `nextCursor` is null at the end. */
export const listOf = <T extends z.ZodType>(item: T) =>
  z.object({ items: z.array(item), total: z.number().int().min(0), nextCursor: z.string().nullable() });

export interface ListOf<T> {
  items: T[];
  total: number;
  nextCursor: string | null;
}

/** RFC 9457 problem details, as every refusal is answered. */
export const problem = z.object({
  type: z.string(),
  title: z.string(),
  status: z.number().int(),
  detail: z.string().optional(),
  code: z.string(),
  requestId: z.string().optional(),
  issues: z.array(z.object({ path: z.string(), message: z.string() })).optional(),
});
export type Problem = z.infer<typeof problem>;

/** Optimistic lock: the version the person saw. */
export const version = z.number().int().min(0);
