import type { CellConstantRow, PlacementRow, ProbeListRow, TimelineRow } from './queries.ts';
import type { Placement, Probe, ProbeEvent, ProbeRow } from '../../../shared/contracts/probes.ts';
import type { Strip } from '../../../shared/contracts/readings.ts';
import type { CheckInvalidReason } from '../../../shared/contracts/vocabulary.ts';
import {
  CHECK_INVALID_LABELS,
  OUTCOME_LABELS,
  PROBE_EVENT_LABELS,
  STAGE_LABELS,
  capitalise,
} from '../../../shared/format/labels.ts';
import { formatNumber } from '../../../shared/format/numbers.ts';
import type { Actor } from '../../http/actor.ts';
import { may } from '../../http/authorise.ts';
import { devicePolicy } from '../devices/policy.ts';
import { presentDeviceSummary } from '../devices/presenter.ts';
import type { DeviceRow } from '../devices/queries.ts';
import { stripOf } from '../readings/presenter.ts';
import type { Verdict } from '../readings/verdicts.ts';
import { probePolicy } from './policy.ts';

const asInstant = (time: string): string => new Date(time).toISOString();

const presentPlacement = (row: PlacementRow): Placement => ({
  ...row,
  fromAt: asInstant(row.fromAt),
  toAt: row.toAt === null ? null : asInstant(row.toAt),
});

export const presentProbeRow = (row: ProbeListRow, verdict: Verdict): ProbeRow => ({
  id: row.id,
  serial: row.serial,
  tag: row.tag,
  kind: row.kind,
  nominalCellConstantPerCm: row.nominalCellConstantPerCm,
  cellConstantPerCm: row.cellConstantPerCm,
  rangeLowUsCm: row.rangeLowUsCm,
  rangeHighUsCm: row.rangeHighUsCm,
  resolutionUsCm: row.resolutionUsCm,
  temperatureSensor: row.temperatureSensor,
  deviceCompensation: row.deviceCompensation,
  notes: row.notes || null,
  siteId: row.siteId,
  siteName: row.siteName,
  status: row.status,
  placement: row.placement && presentPlacement(row.placement),
  isOnline: row.isOnline,
  lastSeenAt: row.lastSeenAt?.toISOString() ?? null,
  trust: verdict.trust,
  strip: verdict.strip,
  version: row.version,
});

export interface WholeProbe {
  row: ProbeListRow;
  verdict: Verdict;
  device: DeviceRow | null;
  placements: PlacementRow[];
  cellConstants: CellConstantRow[];
}

export function presentProbe(whole: WholeProbe, actor: Actor): Probe {
  const { row, verdict, device } = whole;
  const isInUse = row.status !== 'retired';
  const isInstalled = row.placement !== null;
  const can = (action: keyof typeof probePolicy) => may(probePolicy, action, actor, row.siteId);
  return {
    ...presentProbeRow(row, verdict),
    device: device && presentDeviceSummary(device),
    reading: verdict.reading,
    placements: whole.placements.map(presentPlacement),
    cellConstants: whole.cellConstants.map((entry) => ({ ...entry, fromAt: entry.fromAt.toISOString() })),
    retiredAt: row.retiredAt?.toISOString() ?? null,
    retiredReason: row.retiredReason,
    can: {
      change: isInUse && can('change'),
      install: isInUse && !isInstalled && can('install'),
      move: isInstalled && can('move'),
      remove: isInstalled && can('remove'),
      retire: isInUse && can('retire'),
      issueCredentials: isInUse && !device && may(devicePolicy, 'issue', actor, row.siteId),
      revokeCredentials: device !== null && may(devicePolicy, 'revoke', actor, row.siteId),
      addNote: can('addNote'),
    },
  };
}

const text = (value: unknown): string | null => (typeof value === 'string' && value !== '' ? value : null);

/** One comparison in a line: `As found: +1.23 % ± 0.35 %, within, clear`. */
function titleOfCheck(row: TimelineRow): string {
  const stage = capitalise(STAGE_LABELS[row.stage ?? 'automatic']);
  if (!row.isValid || row.errorPercent == null || row.outcome == null) return `${stage}: not valid`;
  const error = formatNumber(row.errorPercent, { decimals: 2, sign: 'always', unit: '%' });
  const uncertainty = formatNumber(row.expandedUncertaintyPercent, { decimals: 2, unit: '%' });
  return `${stage}: ${error} ± ${uncertainty}, ${OUTCOME_LABELS[row.outcome]}`;
}

function titleOf(row: TimelineRow): string {
  if (row.kind === 'check') return titleOfCheck(row);
  if (row.kind === 'note') return text(row.detail['text']) ?? 'Note';
  const label = capitalise(PROBE_EVENT_LABELS[row.kind]);
  const isPlaced = row.kind === 'installed' || row.kind === 'moved';
  if (isPlaced && row.pointName) return `${label} ${row.kind === 'moved' ? 'to' : 'at'} ${row.pointName}`;
  if (row.kind === 'removed' && row.pointName) return `${label} of ${row.pointName}`;
  return label;
}

function detailOf({ kind, detail }: TimelineRow): string | null {
  if (kind === 'note') return null;
  if (kind === 'check') {
    const why = text(detail['invalidReason']) as CheckInvalidReason | null;
    const lot = text(detail['solution']);
    return [lot && `Lot ${lot}`, why && CHECK_INVALID_LABELS[why]].filter(Boolean).join(': ') || null;
  }
  const said = ['name', 'reason', 'note', 'text'].map((key) => text(detail[key]));
  return said.filter(Boolean).join(' · ') || null;
}

const stripOfLine = (row: TimelineRow): Strip | null =>
  row.isValid ? stripOf(row as Parameters<typeof stripOf>[0], row.earlierErrorPercent ?? []) : null;

export const presentTimelineRow = (row: TimelineRow): ProbeEvent => ({
  key: `${row.source}-${row.id}`,
  at: row.at.toISOString(),
  kind: row.kind,
  pointId: row.pointId,
  checkId: row.source === 'check' ? row.id : null,
  title: titleOf(row),
  by: row.by,
  detail: detailOf(row),
  strip: stripOfLine(row),
});
