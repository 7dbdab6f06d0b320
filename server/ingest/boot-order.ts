/**
 * A device makes a new, later boot id at every start. What it says about itself is ordered by boot and number, never
 * by arrival: an old "offline" delivered after a newer "online" must change nothing.
 */

/** Negative when `a` is the earlier boot. Compared by code unit, like the "C" collation of the database. */
export function compareBoots(a: string, b: string): number {
  if (a === b) return 0;
  return a < b ? -1 : 1;
}

/** A message of boot `boot` is news when nothing later is known. */
export const isCurrentBoot = (boot: string, known: string | null): boolean =>
  known === null || compareBoots(boot, known) >= 0;

export interface Place {
  boot: string;
  n: number;
}

/** Whether a reading lies after the one shown, so that the live view may move on to it. */
export const isAfter = (a: Place, b: Place | null): boolean =>
  b === null || compareBoots(a.boot, b.boot) > 0 || (a.boot === b.boot && a.n > b.n);
