/** Calibration runs as others use them: listed, read, and changed by the deeds in the files beside this one. */
import type { CalibrationsQuery } from '../../../shared/contracts/calibrations.ts';
import type { ListOf } from '../../../shared/contracts/common.ts';
import { AppError } from '../../errors.ts';
import { readableSites, type Actor } from '../../http/actor.ts';
import { pageOf, readCursor } from '../../http/paging.ts';
import { containsPattern } from '../../lib/text-pattern.ts';
import type { Parts } from '../../parts.ts';
import { countRuns, selectRuns, type ListedRun, type RunFilter } from './queries.ts';
import { readRun, type Run } from './runs.ts';

export { amendCalibration } from './amend.ts';
export { captureReading, excludeCapture } from './captures.ts';
export {
  closeAbandonedCommands,
  isSameConstant,
  repeatCommand,
  reportedCellConstant,
  settleCommand,
  takeCommands,
  type TakenCommand,
} from './commands.ts';
export { reviewCalibration } from './review.ts';
export { readRun, type Run } from './runs.ts';
export { signCalibration } from './sign.ts';
export { startCalibration } from './start.ts';
export { finishStep } from './steps.ts';
export { handOver, stopCalibration } from './stop.ts';

export function filterOf(actor: Actor, query: Omit<CalibrationsQuery, 'limit' | 'cursor'>): RunFilter {
  return {
    siteIds: readableSites(actor),
    siteId: query.siteId ?? null,
    pointId: query.pointId ?? null,
    probeId: query.probeId ?? null,
    standardId: query.standardId ?? null,
    performerId: query.performerId ?? null,
    status: query.status ?? null,
    outcome: query.outcome ?? null,
    from: query.from ?? null,
    to: query.to ?? null,
    pattern: containsPattern(query.q),
  };
}

export async function listCalibrations(
  parts: Parts,
  actor: Actor,
  query: CalibrationsQuery,
): Promise<ListOf<ListedRun>> {
  const after = readCursor(query.cursor, ['integer', 'integer']);
  const filter = filterOf(actor, query);
  const [found, total] = await Promise.all([
    selectRuns(parts, filter, after, query.limit + 1),
    countRuns(parts, filter),
  ]);
  const { rows, nextCursor } = pageOf(found, query.limit, (row) => [row.startedUs, row.id]);
  return { items: rows, total, nextCursor };
}

/** The signed record, exactly as its hash was taken. */
export async function readRecord(actor: Actor, id: number): Promise<Run> {
  const run = await readRun(actor, id);
  if (run.row.record === null) throw new AppError('calibrations.not-signed');
  return run;
}
