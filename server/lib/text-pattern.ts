/** ILIKE pattern for "contains this text", with the text's own wildcards taken literally; null finds everything. */
export const containsPattern = (text: string | undefined): string | null =>
  text ? `%${text.replace(/[\\%_]/g, '\\$&')}%` : null;
