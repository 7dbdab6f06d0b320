/** Comparisons with reference solutions, as evidence: read here, written by ingest and by calibrations. */
import type { ChecksQuery } from '../../../shared/contracts/checks.ts';
import type { ListOf } from '../../../shared/contracts/common.ts';
import { AppError } from '../../errors.ts';
import { readableSites, type Actor } from '../../http/actor.ts';
import { pageOf, readCursor } from '../../http/paging.ts';
import { containsPattern } from '../../lib/text-pattern.ts';
import type { Parts } from '../../parts.ts';
import { readProbe } from '../probes/service.ts';
import {
  countChecks,
  selectChecks,
  selectHistory,
  type CheckFilter,
  type CheckRow,
  type HistoryRow,
} from './queries.ts';

const noFilter = {
  siteId: null,
  checkId: null,
  probeId: null,
  standardId: null,
  stage: null,
  pattern: null,
};

export async function listChecks(parts: Parts, actor: Actor, query: ChecksQuery): Promise<ListOf<CheckRow>> {
  const after = readCursor(query.cursor, ['integer', 'integer']);
  const filter: CheckFilter = {
    ...noFilter,
    siteIds: readableSites(actor),
    siteId: query.siteId ?? null,
    probeId: query.probeId ?? null,
    standardId: query.standardId ?? null,
    stage: query.stage ?? null,
    pattern: containsPattern(query.q),
  };
  const [found, total] = await Promise.all([
    selectChecks(parts, filter, after, query.limit + 1),
    countChecks(parts, filter),
  ]);
  const { rows, nextCursor } = pageOf(found, query.limit, (row) => [row.atUs, row.id]);
  return { items: rows, total, nextCursor };
}

/** One comparison; at another site it is not to be told from a missing one. */
export async function readCheck(parts: Parts, actor: Actor, id: number): Promise<CheckRow> {
  const filter = { ...noFilter, siteIds: readableSites(actor), checkId: id };
  const [row] = await selectChecks(parts, filter, null, 1);
  if (!row) throw new AppError('checks.not-found');
  return row;
}

/** What the history of a probe's cell constant is drawn from. */
export async function readHistory(
  parts: Parts,
  actor: Actor,
  probeId: number,
): Promise<{ probeId: number; rows: HistoryRow[] }> {
  await readProbe(parts, actor, probeId);
  const filter = { probeId, siteIds: readableSites(actor) };
  return { probeId, rows: await selectHistory(parts, filter) };
}
