/**
 * Columns as PostgreSQL array text. The driver's own conversion looks at every value's type and quotes each; ours
 * knows the type of its column, which makes a group of thousands several times cheaper to send.
 */

export function numberColumn(values: readonly (number | null)[]): string {
  let text = '{';
  for (let i = 0; i < values.length; i += 1) {
    if (i > 0) text += ',';
    text += values[i] ?? 'NULL';
  }
  return `${text}}`;
}

export const booleanColumn = (values: readonly boolean[]): string => `{${values.join(',')}}`;

const plainWord = /^[0-9A-Za-z_-]+$/;
const isNull = /^null$/i;
const quoted = (value: string): string => `"${value.replace(/["\\]/g, '\\$&')}"`;

/** Any text; what the database cannot hold (a zero byte) it refuses itself. */
export function textColumn(values: readonly (string | null)[]): string {
  let text = '{';
  for (let i = 0; i < values.length; i += 1) {
    const value = values[i] ?? null;
    if (i > 0) text += ',';
    if (value === null) text += 'NULL';
    else text += plainWord.test(value) && !isNull.test(value) ? value : quoted(value);
  }
  return `${text}}`;
}

/** Sets of plain words, one set a row; to be cast with `::text[]` on the other side. */
export const wordSetColumn = (values: readonly (readonly string[])[]): string =>
  textColumn(values.map((words) => `{${words.join(',')}}`));
