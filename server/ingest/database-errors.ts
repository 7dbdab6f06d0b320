/** Whose fault a failed commit is: what the message holds, or the database itself. */

/**
 * SQLSTATE classes that speak of the data: 22 data exception, 23 integrity constraint violation, 54 program limit
 * exceeded (JSON nested too deep). Everything else (connection, resources, shutdown, deadlock, a missing right or
 * table) is not cured by setting a message aside: setting aside all that comes would empty the plant into quarantine.
 */
const dataClasses = new Set(['22', '23', '54']);

export function isRefusal(error: unknown): boolean {
  if (error instanceof TypeError || error instanceof RangeError) return true;
  const code = (error as { code?: unknown } | null)?.code;
  return typeof code === 'string' && code.length === 5 && dataClasses.has(code.slice(0, 2));
}
