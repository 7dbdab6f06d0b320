import type { Point, PointProbe } from '../../../shared/contracts/points.ts';
import type { Actor } from '../../http/actor.ts';
import { may } from '../../http/authorise.ts';
import { probePolicy } from '../probes/policy.ts';
import { pointPolicy } from './policy.ts';
import type { PointProbeRow, PointRow } from './queries.ts';

type HoldFacts = Pick<PointRow, 'holdUserId' | 'holdUserName' | 'holdReason' | 'holdFromAt' | 'holdUntilAt'>;

/** Who holds the point, or null; the join fills all of it or nothing. */
export const presentHold = (row: HoldFacts): Point['hold'] =>
  row.holdUserId === null
    ? null
    : {
        userId: row.holdUserId,
        userName: row.holdUserName!,
        reason: row.holdReason!,
        fromAt: row.holdFromAt!.toISOString(),
        untilAt: row.holdUntilAt!.toISOString(),
      };

const presentProbe = (row: PointRow): Point['probe'] =>
  row.probeId === null
    ? null
    : {
        id: row.probeId,
        tag: row.probeTag!,
        serial: row.probeSerial!,
        kind: row.probeKind!,
        since: row.probeSince!.toISOString(),
      };

export function presentPoint(row: PointRow, actor: Actor): Point {
  const { siteId } = row;
  const isInUse = row.retiredAt === null;
  const isHeld = row.holdUserId !== null;
  const isFree = row.probeId === null;
  return {
    id: row.id,
    code: row.code,
    name: row.name,
    duty: row.duty,
    medium: row.medium,
    displayUnit: row.displayUnit,
    compensationModel: row.compensationModel,
    compensationCoefficientPercentPerK: row.compensationCoefficientPercentPerK,
    referenceTemperatureC: row.referenceTemperatureC,
    lowLimitUsCm: row.lowLimitUsCm,
    highLimitUsCm: row.highLimitUsCm,
    tolerancePercent: row.tolerancePercent,
    decisionRule: row.decisionRule,
    intervalDays: row.intervalDays,
    intervalMethod: row.intervalMethod,
    criticality: row.criticality,
    hazardTags: row.hazardTags,
    controlNote: row.controlNote,
    areaId: row.areaId,
    areaName: row.areaName,
    siteId,
    siteName: row.siteName,
    probe: presentProbe(row),
    hold: presentHold(row),
    retiredAt: row.retiredAt?.toISOString() ?? null,
    version: row.version,
    can: {
      change: isInUse && may(pointPolicy, 'change', actor, siteId),
      retire: isInUse && isFree && may(pointPolicy, 'retire', actor, siteId),
      hold: isInUse && !isHeld && may(pointPolicy, 'hold', actor, siteId),
      release: isHeld && may(pointPolicy, 'release', actor, siteId),
      install: isInUse && isFree && may(probePolicy, 'install', actor, siteId),
    },
  };
}

export const presentPointProbe = ({ fromAt, toAt, ...probe }: PointProbeRow): PointProbe => ({
  ...probe,
  fromAt: fromAt.toISOString(),
  toAt: toAt?.toISOString() ?? null,
});
