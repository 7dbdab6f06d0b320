import { QueryTypes } from 'sequelize';
import type { CreateStandard } from '../../../shared/contracts/standards.ts';
import type { StandardState } from '../../../shared/contracts/vocabulary.ts';
import type { CursorKey } from '../../http/paging.ts';
import type { Parts } from '../../parts.ts';

export interface StandardRow extends CreateStandard {
  id: number;
  state: StandardState;
  stateReason: string | null;
  stateChangedAt: Date;
  version: number;
  checkCount: number;
}

export interface StandardFilter {
  standardId: number | null;
  state: StandardState | null;
  pattern: string | null;
}

const matching = `($standardId::int is null or l.id = $standardId)
  and ($state::text is null or l.state = $state)
  and ($pattern::text is null or l.code ilike $pattern or l.product ilike $pattern or l.producer ilike $pattern)`;

/** Lots by code, each with how many comparisons name it. */
export function selectStandards(
  parts: Pick<Parts, 'sequelize'>,
  filter: StandardFilter,
  after: CursorKey | null,
  limit: number,
): Promise<StandardRow[]> {
  return parts.sequelize.query<StandardRow>(
    `select l.id, l.code, l.producer, l.product, l.medium, l.basis, l.nominal,
       l.certified_conductivity_us_cm as "certifiedConductivityUsCm",
       l.reference_temperature_c as "referenceTemperatureC",
       l.expanded_uncertainty_us_cm as "expandedUncertaintyUsCm", l.coverage_factor as "coverageFactor",
       l.temperature_table as "temperatureTable", l.traceability, l.is_in_house as "isInHouse",
       l.issued_on::text as "issuedOn", l.expires_on::text as "expiresOn", l.state,
       l.state_reason as "stateReason", coalesce(l.state_changed_at, l.created_at) as "stateChangedAt", l.version,
       (select count(*) from checks c where c.standard_id = l.id) as "checkCount"
     from standards l
     where ${matching} and ($code::text is null or lower(l.code) > $code)
     order by lower(l.code) limit $limit`,
    { type: QueryTypes.SELECT, bind: { ...filter, code: after?.[0] ?? null, limit } },
  );
}

export async function countStandards(
  parts: Pick<Parts, 'sequelize'>,
  filter: StandardFilter,
): Promise<number> {
  const [row] = await parts.sequelize.query<{ total: number }>(
    `select count(*) as total from standards l where ${matching}`,
    { type: QueryTypes.SELECT, bind: { ...filter } },
  );
  return row?.total ?? 0;
}
