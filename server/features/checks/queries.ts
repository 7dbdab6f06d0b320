import { QueryTypes } from 'sequelize';
import { maxHistoryPoints, type Check, type CheckHistoryPoint } from '../../../shared/contracts/checks.ts';
import type { CheckStage } from '../../../shared/contracts/vocabulary.ts';
import type { CursorKey } from '../../http/paging.ts';
import type { Parts } from '../../parts.ts';

export interface CheckRow extends Omit<Check, 'at' | 'receivedAt'> {
  at: Date;
  receivedAt: Date;
  /** Microseconds since 1970: the sort key without loss. */
  atUs: number;
}

export interface CheckFilter {
  /** null = every site. */
  siteIds: number[] | null;
  siteId: number | null;
  checkId: number | null;
  probeId: number | null;
  standardId: number | null;
  stage: CheckStage | null;
  pattern: string | null;
}

/** A comparison belongs to the site of its point; one made uninstalled, to where the probe is kept. */
const joins = `from checks c
  join probes p on p.id = c.probe_id
  left join points pt on pt.id = c.point_id
  left join areas a on a.id = pt.area_id
  left join users u on u.id = c.performed_by_user_id`;
const site = 'coalesce(a.site_id, p.site_id)';

const matching = `($siteIds::int[] is null or ${site} = any($siteIds))
  and ($siteId::int is null or ${site} = $siteId)
  and ($checkId::int is null or c.id = $checkId)
  and ($probeId::int is null or c.probe_id = $probeId)
  and ($standardId::int is null or c.standard_id = $standardId)
  and ($stage::text is null or c.stage = $stage)
  and ($pattern::text is null or p.tag ilike $pattern or pt.name ilike $pattern or c.solution ilike $pattern)`;

/** Comparisons, newest first. */
export function selectChecks(
  parts: Pick<Parts, 'sequelize'>,
  filter: CheckFilter,
  after: CursorKey | null,
  limit: number,
): Promise<CheckRow[]> {
  return parts.sequelize.query<CheckRow>(
    `select c.id, c.probe_id as "probeId", p.tag as "probeTag", c.point_id as "pointId", pt.name as "pointName",
       ${site} as "siteId", c.at, (extract(epoch from c.at) * 1000000)::bigint as "atUs",
       c.received_at as "receivedAt", c.stage, c.standard_id as "standardId", c.solution,
       c.is_valid as "isValid", c.invalid_reason as "invalidReason", c.conductivity_us_cm as "conductivityUsCm",
       c.temperature_c as "temperatureC", c.cell_constant_per_cm as "cellConstantPerCm",
       c.reference_us_cm as "referenceUsCm", c.error_percent as "errorPercent",
       c.implied_cell_constant_per_cm as "impliedCellConstantPerCm",
       c.expanded_uncertainty_percent as "expandedUncertaintyPercent", c.coverage_factor as "coverageFactor",
       c.tolerance_percent as "tolerancePercent", c.decision_rule as "decisionRule", c.outcome,
       c.probability_outside as "probabilityOutside", c.acceptance_limit_percent as "acceptanceLimitPercent",
       c.reference_source as "referenceSource", c.budget, u.name as "performedBy"
     ${joins}
     where ${matching}
       and ($us::bigint is null
         or (c.at, c.id) < (timestamptz 'epoch' + $us * interval '1 microsecond', $id::bigint))
     order by c.at desc, c.id desc limit $limit`,
    { type: QueryTypes.SELECT, bind: { ...filter, us: after?.[0] ?? null, id: after?.[1] ?? null, limit } },
  );
}

export async function countChecks(parts: Pick<Parts, 'sequelize'>, filter: CheckFilter): Promise<number> {
  const [row] = await parts.sequelize.query<{ total: number }>(
    `select count(*) as total ${joins} where ${matching}`,
    { type: QueryTypes.SELECT, bind: { ...filter } },
  );
  return row?.total ?? 0;
}

export interface HistoryRow extends Omit<CheckHistoryPoint, 'at'> {
  at: Date;
  /** Of all that count, before thinning. */
  total: number;
}

/** What people determined is rare and matters most; the rest of the drawing is left to automatic checks. */
const mostByPeople = 400;
const mostAutomatic = maxHistoryPoints - mostByPeople;

/**
 * The comparisons of one probe that count, oldest first. The newest of those made by people stay whole; automatic
 * ones are thinned evenly, counted from the newest back.
 */
export function selectHistory(
  parts: Pick<Parts, 'sequelize'>,
  filter: { probeId: number; siteIds: number[] | null },
): Promise<HistoryRow[]> {
  return parts.sequelize.query<HistoryRow>(
    `with counted as (
       select c.id, c.at, c.stage, c.stage = 'automatic' as is_automatic, c.implied_cell_constant_per_cm,
         c.expanded_uncertainty_percent, c.tolerance_percent, c.acceptance_limit_percent,
         row_number() over (partition by c.stage = 'automatic' order by c.at desc, c.id desc) as place,
         count(*) over (partition by c.stage = 'automatic') as among, count(*) over () as total
       ${joins}
       where c.probe_id = $probeId and c.is_valid and c.implied_cell_constant_per_cm is not null
         and ($siteIds::int[] is null or ${site} = any($siteIds))
     )
     select id, at, stage, implied_cell_constant_per_cm as "impliedCellConstantPerCm",
       expanded_uncertainty_percent as "expandedUncertaintyPercent", tolerance_percent as "tolerancePercent",
       acceptance_limit_percent as "acceptanceLimitPercent", total
     from counted
     where case when is_automatic then (place - 1) % ceil(among / $mostAutomatic::numeric)::bigint = 0
       else place <= $mostByPeople end
     order by at, id`,
    { type: QueryTypes.SELECT, bind: { ...filter, mostAutomatic, mostByPeople } },
  );
}
