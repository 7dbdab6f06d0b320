/** Opaque list cursors: the sort key of the last row seen, base64url JSON. */
export const encodeCursor = (key: readonly (string | number | null)[]): string =>
  Buffer.from(JSON.stringify(key)).toString('base64url');

/** Null when the text is not a cursor with exactly `length` parts. */
export function decodeCursor(text: string, length: number): (string | number | null)[] | null {
  try {
    const key: unknown = JSON.parse(Buffer.from(text, 'base64url').toString('utf8'));
    const isKey =
      Array.isArray(key) &&
      key.length === length &&
      key.every((part) => part === null || ['string', 'number'].includes(typeof part));
    return isKey ? (key as (string | number | null)[]) : null;
  } catch {
    return null;
  }
}
