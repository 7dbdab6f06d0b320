import { QueryTypes } from 'sequelize';
import type { Point } from '../../../shared/contracts/points.ts';
import type { CursorKey } from '../../http/paging.ts';
import type { Parts } from '../../parts.ts';

export interface HoldRow {
  userId: number;
  userName: string;
  reason: string;
  fromAt: Date;
  untilAt: Date;
}

/** A point with what stands in it now. */
export interface PointRow extends Omit<Point, 'can' | 'probe' | 'hold' | 'retiredAt'> {
  retiredAt: Date | null;
  probeId: number | null;
  probeTag: string | null;
  probeSerial: string | null;
  probeKind: string | null;
  probeSince: Date | null;
  holdUserId: number | null;
  holdUserName: string | null;
  holdReason: string | null;
  holdFromAt: Date | null;
  holdUntilAt: Date | null;
  siteSort: string;
  areaPosition: number;
}

export interface PointFilter {
  /** null = every site. */
  siteIds: number[] | null;
  siteId: number | null;
  areaId: number | null;
  pointId: number | null;
  pattern: string | null;
  onlyFree: boolean;
  withRetired: boolean;
  now: Date;
}

const joins = `from points p
  join areas a on a.id = p.area_id
  join sites s on s.id = a.site_id
  left join assignments at on at.point_id = p.id and at.to_at is null
  left join probes pr on pr.id = at.probe_id
  left join holds h on h.point_id = p.id and h.ended_at is null and h.until_at > $now
  left join users u on u.id = h.user_id`;

const matching = `($siteIds::int[] is null or s.id = any($siteIds))
  and ($siteId::int is null or s.id = $siteId)
  and ($areaId::int is null or a.id = $areaId)
  and ($pointId::int is null or p.id = $pointId)
  and ($withRetired or p.retired_at is null)
  and (not $onlyFree or at.id is null)
  and ($pattern::text is null or p.code ilike $pattern or p.name ilike $pattern or a.name ilike $pattern
    or pr.tag ilike $pattern)`;

/** By site, area and code: the order in which people walk. */
const order = 'lower(s.name), s.id, a.position, a.id, lower(p.code)';

export function selectPoints(
  parts: Pick<Parts, 'sequelize'>,
  filter: PointFilter,
  after: CursorKey | null,
  limit: number,
): Promise<PointRow[]> {
  const [siteSort, lastSiteId, areaPosition, lastAreaId, code] = after ?? [];
  return parts.sequelize.query<PointRow>(
    `select p.id, p.code, p.name, p.duty, p.medium, p.display_unit as "displayUnit",
       p.compensation_model as "compensationModel",
       p.compensation_coefficient_percent_per_k as "compensationCoefficientPercentPerK",
       p.reference_temperature_c as "referenceTemperatureC",
       p.low_limit_us_cm as "lowLimitUsCm", p.high_limit_us_cm as "highLimitUsCm",
       p.tolerance_percent as "tolerancePercent", p.decision_rule as "decisionRule",
       p.interval_days as "intervalDays", p.interval_method as "intervalMethod", p.criticality,
       p.hazard_tags as "hazardTags", p.control_note as "controlNote", p.retired_at as "retiredAt", p.version,
       a.id as "areaId", a.name as "areaName", a.position as "areaPosition",
       s.id as "siteId", s.name as "siteName", lower(s.name) as "siteSort",
       pr.id as "probeId", pr.tag as "probeTag", pr.serial as "probeSerial", pr.kind as "probeKind",
       at.from_at as "probeSince", h.user_id as "holdUserId", u.name as "holdUserName", h.reason as "holdReason",
       h.from_at as "holdFromAt", h.until_at as "holdUntilAt"
     ${joins}
     where ${matching}
       and ($siteSort::text is null
         or (${order}) > ($siteSort, $lastSiteId::bigint, $areaPosition::bigint, $lastAreaId::bigint, $code::text))
     order by ${order} limit $limit`,
    {
      type: QueryTypes.SELECT,
      bind: {
        ...filter,
        siteSort: siteSort ?? null,
        lastSiteId: lastSiteId ?? null,
        areaPosition: areaPosition ?? null,
        lastAreaId: lastAreaId ?? null,
        code: code ?? null,
        limit,
      },
    },
  );
}

export async function countPoints(parts: Pick<Parts, 'sequelize'>, filter: PointFilter): Promise<number> {
  const [row] = await parts.sequelize.query<{ total: number }>(
    `select count(*) as total ${joins} where ${matching}`,
    {
      type: QueryTypes.SELECT,
      bind: { ...filter },
    },
  );
  return row?.total ?? 0;
}

export interface PointProbeRow {
  id: number;
  tag: string;
  serial: string;
  kind: string;
  fromAt: Date;
  toAt: Date | null;
}

/** Every probe that stood at a point, newest first; a probe that came back stands there twice. */
export function selectPointProbes(
  { sequelize }: Pick<Parts, 'sequelize'>,
  pointId: number,
): Promise<PointProbeRow[]> {
  return sequelize.query<PointProbeRow>(
    `select pr.id, pr.tag, pr.serial, pr.kind, at.from_at as "fromAt", at.to_at as "toAt"
     from assignments at join probes pr on pr.id = at.probe_id
     where at.point_id = $pointId order by at.from_at desc, at.id desc`,
    { type: QueryTypes.SELECT, bind: { pointId } },
  );
}
