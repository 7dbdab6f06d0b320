/** Keyset paging: the cursor is the sort key of the last row seen, so that rows added meanwhile shift nothing. */
import { AppError } from '../errors.ts';
import { decodeCursor, encodeCursor } from '../lib/cursor.ts';

export type CursorKey = (string | number)[];

const fits = (part: string | number | null | undefined, kind: 'text' | 'integer'): boolean =>
  kind === 'text' ? typeof part === 'string' && !part.includes('\0') : Number.isSafeInteger(part);

/** The key in a cursor, or null at the start; refuses what this server did not give out before SQL sees it. */
export function readCursor(
  cursor: string | undefined,
  kinds: readonly ('text' | 'integer')[],
): CursorKey | null {
  if (cursor === undefined) return null;
  const key = decodeCursor(cursor, kinds.length);
  if (!key || !kinds.every((kind, index) => fits(key[index], kind)))
    throw new AppError('request.cursor-invalid');
  return key as CursorKey;
}

/** Cuts a page from rows that were asked for with one more than `limit`. */
export function pageOf<Row>(
  rows: readonly Row[],
  limit: number,
  keyOf: (row: Row) => CursorKey,
): { rows: Row[]; nextCursor: string | null } {
  const page = rows.slice(0, limit);
  const last = page.at(-1);
  return { rows: page, nextCursor: rows.length > limit && last ? encodeCursor(keyOf(last)) : null };
}
