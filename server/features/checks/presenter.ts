import type { Check, CheckHistory } from '../../../shared/contracts/checks.ts';
import type { CheckRow, HistoryRow } from './queries.ts';

export function presentCheck({ atUs: _sortKey, ...row }: CheckRow): Check {
  return { ...row, at: row.at.toISOString(), receivedAt: row.receivedAt.toISOString() };
}

export const presentHistory = ({ probeId, rows }: { probeId: number; rows: HistoryRow[] }): CheckHistory => ({
  probeId,
  total: rows[0]?.total ?? 0,
  points: rows.map(({ total: _all, at, ...row }) => ({ ...row, at: at.toISOString() })),
});
