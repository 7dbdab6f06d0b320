/** From readings as they were heard to the rows one group writes: repeats out, late marked, checks evaluated. */
import { lateAfterMs } from '../../shared/contracts/mqtt.ts';
import { cellConstantDiffers } from '../features/readings/trust.ts';
import { sortOutRepeats, type Candidate, type Sorted } from './deduplicate.ts';
import type { Device, DeviceDirectory } from './device-directory.ts';
import { evaluate } from './evaluate.ts';
import type { toldCellConstants } from './gather-group.ts';
import { type GatheredGroup, type HeardReadings } from './gather-group.ts';
import { movesOn, type LivePosition } from './live-order.ts';
import type { NewNotice } from './notices.ts';
import type { PresencePlan } from './presence.ts';
import { lotKey, selectLots, selectPointsAt, type Db } from './queries.ts';
import type { SessionBook } from './session-book.ts';
import { judgeAge } from './time-rules.ts';
import type { NewCheck } from './write-checks.ts';
import type { LiveRow, ReadingRow, RollupMark } from './write-group.ts';

/** A reading with everything its row needs. */
export interface ReadingCandidate extends Candidate, ReadingRow {
  device: Device;
  boot: string;
  settingsHash: string | null;
  /** K in use in the device, as far as its settings are known. */
  settingsCellConstantPerCm: number | null;
}

export function toCandidates(
  heard: readonly HeardReadings[],
  book: SessionBook,
  told: ReturnType<typeof toldCellConstants>,
): ReadingCandidate[] {
  const candidates: ReadingCandidate[] = [];
  for (const { device, content, receivedAtMs } of heard) {
    const mark = book.boot(device.id, content.boot);
    if (!mark) throw new Error(`Boot ${content.boot} of ${device.name} has no id.`);
    const { settingsHash } = content;
    const settings = settingsHash === null ? undefined : book.settings(device.id, settingsHash);
    for (const reading of content.readings) {
      candidates.push({
        reading,
        mark,
        device,
        boot: content.boot,
        settingsHash,
        settingsCellConstantPerCm:
          settings?.cellConstantPerCm ?? (settingsHash === null ? null : told(device.id, settingsHash)),
        deviceId: device.id,
        bootId: mark.id,
        probeId: device.probeId,
        receivedAtMs,
        isLate: content.isBuffered || judgeAge(reading.atMs, receivedAtMs) === 'late',
        settingsId: settings?.id ?? null,
      });
    }
  }
  return candidates;
}

export interface AssembledRows {
  sorted: Sorted<ReadingCandidate>;
  /** Those that move the live view on, in order. */
  advancing: ReadingCandidate[];
  live: LiveRow[];
  checks: NewCheck[];
  rollupsDue: RollupMark[];
  notices: NewNotice[];
}

export interface AssembleContext {
  db: Db;
  directory: DeviceDirectory;
  isShared: boolean;
  shown: ReadonlyMap<number, LivePosition>;
  nowMs: number;
}

export async function assembleRows(
  candidates: readonly ReadingCandidate[],
  group: GatheredGroup,
  context: AssembleContext,
): Promise<AssembledRows> {
  const sorted = await sortOutRepeats(context.db, candidates, context.isShared);
  const { advancing, live } = followLive(sorted.fresh, context.shown);
  return {
    sorted,
    advancing,
    live,
    checks: await evaluateChecks(sorted.fresh, context),
    rollupsDue: rollupMarks(sorted.fresh, context.nowMs),
    notices: [
      ...differenceNotices(sorted.differing),
      ...cellConstantNotices(group.presence, context.directory),
    ],
  };
}

function followLive(
  fresh: readonly ReadingCandidate[],
  shown: ReadonlyMap<number, LivePosition>,
): Pick<AssembledRows, 'advancing' | 'live'> {
  const newest = new Map<number, ReadingCandidate>();
  const advancing: ReadingCandidate[] = [];
  for (const candidate of fresh) {
    if (candidate.isLate) continue;
    const before = newest.get(candidate.probeId);
    const position = before ? livePosition(before) : shown.get(candidate.probeId);
    if (!movesOn(livePosition(candidate), position)) continue;
    newest.set(candidate.probeId, candidate);
    advancing.push(candidate);
  }
  return { advancing, live: [...newest.values()] };
}

export const livePosition = ({ deviceId, boot, reading }: ReadingCandidate): LivePosition => ({
  deviceId,
  boot,
  n: reading.n,
  atMs: reading.atMs,
});

/** Lots and places are asked of the database at that very moment: a recall or a move counts from its commit on. */
async function evaluateChecks(
  fresh: readonly ReadingCandidate[],
  { db, directory }: AssembleContext,
): Promise<NewCheck[]> {
  const inSolution = fresh.filter(({ reading }) => reading.context === 'check');
  if (inSolution.length === 0) return [];
  const codes = new Set(inSolution.flatMap(({ reading }) => reading.solution ?? []));
  const lots = await selectLots(db, [...codes]);
  const points = await selectPointsAt(
    db,
    inSolution.map(({ probeId, reading }) => ({ probeId, atMs: reading.atMs })),
  );
  return inSolution.map((row, index) => {
    const { reading, device } = row;
    const probe = directory.probe(row.probeId);
    const point = points[index] ?? null;
    const lot = reading.solution === null ? undefined : lots.get(lotKey(reading.solution));
    const cellConstantPerCm =
      row.settingsCellConstantPerCm ?? device.reportedCellConstantPerCm ?? probe?.cellConstantPerCm ?? null;
    const result = evaluate({
      reading,
      lot,
      point,
      probe: { resolutionUsCm: probe?.resolutionUsCm ?? null },
      cellConstantPerCm,
      uncertainty: directory.uncertainty(),
    });
    return { row, lot, point, siteId: point?.siteId ?? probe?.siteId ?? null, cellConstantPerCm, result };
  });
}

const bucketMs = 600_000;

/** The job makes the newest summaries again by itself; what is older than its look-back is marked. */
function rollupMarks(fresh: readonly ReadingCandidate[], nowMs: number): RollupMark[] {
  const marks = new Map<string, RollupMark>();
  for (const { reading, probeId, isLate } of fresh) {
    // Also what was held so long while the database was down that it has become old meanwhile.
    if (!isLate && nowMs - reading.atMs <= lateAfterMs) continue;
    const bucketAtMs = Math.floor(reading.atMs / bucketMs) * bucketMs;
    marks.set(`${probeId}/${bucketAtMs}`, { probeId, bucketAtMs });
  }
  return [...marks.values()];
}

function differenceNotices(differing: Sorted<ReadingCandidate>['differing']): NewNotice[] {
  return differing.map(({ candidate, stored }) => ({
    kind: 'reading-content-differs' as const,
    deviceId: candidate.deviceId,
    probeId: candidate.probeId,
    atMs: candidate.receivedAtMs,
    cause: { boot: candidate.boot, n: candidate.reading.n },
    detail: { stored, received: { ...candidate.reading, receivedAtMs: candidate.receivedAtMs } },
  }));
}

function cellConstantNotices(presence: PresencePlan, directory: DeviceDirectory): NewNotice[] {
  const notices: NewNotice[] = [];
  for (const { device, receivedAtMs, said } of presence.births) {
    const recorded = directory.probe(device.probeId)?.cellConstantPerCm;
    const reported = said.cell_constant_per_cm;
    if (recorded === undefined || !cellConstantDiffers(reported, recorded)) continue;
    notices.push({
      kind: 'cell-constant-without-record',
      deviceId: device.id,
      probeId: device.probeId,
      atMs: receivedAtMs,
      cause: { reportedCellConstantPerCm: reported },
      detail: { recordedCellConstantPerCm: recorded, boot: said.boot, settingsHash: said.settings },
    });
  }
  return notices;
}
