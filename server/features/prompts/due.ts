/** Pure: whether a day asks for work now. */
import type { PromptKind } from '../../../shared/contracts/vocabulary.ts';

const dayMs = 86_400_000;

/** Days are `YYYY-MM-DD` of the site's own calendar. On its due day a probe is due soon; overdue begins the day after. */
export function promptFor(dueOn: string | null, today: string, dueSoonDays: number): PromptKind | null {
  if (dueOn === null) return null;
  const daysLeft = Math.round((Date.parse(dueOn) - Date.parse(today)) / dayMs);
  if (daysLeft < 0) return 'overdue';
  return daysLeft <= dueSoonDays ? 'due-soon' : null;
}
