import { isDeepStrictEqual } from 'node:util';

export interface Changes {
  oldValue: Record<string, unknown>;
  newValue: Record<string, unknown>;
}

/** The fields of `patch` that differ from `before`, with both values; null when nothing differs. */
export function changesBetween(before: object, patch: object): Changes | null {
  const known = before as Record<string, unknown>;
  const different = Object.entries(patch).filter(
    ([name, value]) => value !== undefined && !isDeepStrictEqual(known[name], value),
  );
  if (different.length === 0) return null;
  return {
    oldValue: Object.fromEntries(different.map(([name]) => [name, known[name]])),
    newValue: Object.fromEntries(different),
  };
}
