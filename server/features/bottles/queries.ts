import { QueryTypes, type Transaction } from 'sequelize';
import type { StandardState } from '../../../shared/contracts/vocabulary.ts';
import type { CursorKey } from '../../http/paging.ts';
import type { Parts } from '../../parts.ts';
import type { LotFacts } from '../standards/presenter.ts';

export interface BottleRow extends LotFacts {
  id: number;
  code: string;
  standardId: number;
  lotCode: string;
  lotState: StandardState;
  lotExpiresOn: string;
  isInHouse: boolean;
  siteId: number | null;
  siteName: string | null;
  volumeMl: number;
  remainingMl: number;
  openedAt: Date | null;
  openedBy: string | null;
  useByOn: string | null;
  discardedAt: Date | null;
  discardedReason: string | null;
  version: number;
}

export interface BottleFilter {
  /** null = every site; bottles that belong to none are everybody's. */
  siteIds: number[] | null;
  bottleId: number | null;
  standardId: number | null;
  siteId: number | null;
  usableOn: string | null;
  pattern: string | null;
}

const joins = `from bottles b
  join standards l on l.id = b.standard_id
  left join sites s on s.id = b.site_id
  left join users u on u.id = b.opened_by`;

/** The presenter's rule for one bottle, for a whole list. */
const matching = `($siteIds::int[] is null or b.site_id is null or b.site_id = any($siteIds))
  and ($bottleId::int is null or b.id = $bottleId)
  and ($standardId::int is null or b.standard_id = $standardId)
  and ($siteId::int is null or b.site_id = $siteId)
  and ($usableOn::date is null or (b.discarded_at is null and b.remaining_ml > 0 and l.state = 'released'
    and l.expires_on >= $usableOn and coalesce(b.use_by_on, l.expires_on) >= $usableOn))
  and ($pattern::text is null or b.code ilike $pattern)`;

/** Bottles by code. */
export function selectBottles(
  parts: Pick<Parts, 'sequelize'>,
  filter: BottleFilter,
  after: CursorKey | null,
  limit: number,
): Promise<BottleRow[]> {
  return parts.sequelize.query<BottleRow>(
    `select b.id, b.code, b.standard_id as "standardId", l.code as "lotCode", l.state as "lotState",
       l.expires_on::text as "lotExpiresOn", l.is_in_house as "isInHouse", l.basis, l.nominal, l.product,
       l.certified_conductivity_us_cm as "certifiedConductivityUsCm",
       l.reference_temperature_c as "referenceTemperatureC", b.site_id as "siteId", s.name as "siteName",
       b.volume_ml as "volumeMl", b.remaining_ml as "remainingMl", b.opened_at as "openedAt",
       u.name as "openedBy", b.use_by_on::text as "useByOn", b.discarded_at as "discardedAt",
       b.discarded_reason as "discardedReason", b.version
     ${joins}
     where ${matching} and ($code::text is null or lower(b.code) > $code)
     order by lower(b.code) limit $limit`,
    { type: QueryTypes.SELECT, bind: { ...filter, code: after?.[0] ?? null, limit } },
  );
}

export async function countBottles(parts: Pick<Parts, 'sequelize'>, filter: BottleFilter): Promise<number> {
  const [row] = await parts.sequelize.query<{ total: number }>(
    `select count(*) as total ${joins} where ${matching}`,
    { type: QueryTypes.SELECT, bind: { ...filter } },
  );
  return row?.total ?? 0;
}

/** The highest number a bottle of the lot carries; 0 when there is none. */
export async function lastBottleNumber(
  parts: Pick<Parts, 'sequelize'>,
  transaction: Transaction,
  standardId: number,
): Promise<number> {
  const [row] = await parts.sequelize.query<{ last: number }>(
    `select coalesce(max(substring(code from '/([0-9]+)$')::int), 0) as last
     from bottles where standard_id = $standardId`,
    { type: QueryTypes.SELECT, bind: { standardId }, transaction },
  );
  return row?.last ?? 0;
}
