import type { Check } from '../../../shared/contracts/checks.ts';
import type { CheckRow } from './queries.ts';

export function presentCheck({ atUs: _sortKey, ...row }: CheckRow): Check {
  return { ...row, at: row.at.toISOString(), receivedAt: row.receivedAt.toISOString() };
}
