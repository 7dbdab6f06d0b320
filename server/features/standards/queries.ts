import { QueryTypes } from 'sequelize';
import type { Preparation } from '../../../shared/contracts/preparations.ts';
import type {
  CreateStandard,
  StandardStateChange,
  StandardUses,
} from '../../../shared/contracts/standards.ts';
import type { StandardState } from '../../../shared/contracts/vocabulary.ts';
import type { CursorKey } from '../../http/paging.ts';
import type { Parts } from '../../parts.ts';
import type { CertificateRow } from '../certificates/presenter.ts';

export interface StandardRow extends CreateStandard {
  id: number;
  state: StandardState;
  stateReason: string | null;
  stateChangedAt: Date;
  version: number;
  checkCount: number;
  certificate: CertificateRow | null;
  preparation: Preparation | null;
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
       l.coverage_probability_percent as "coverageProbabilityPercent",
       l.temperature_table as "temperatureTable", l.traceability, l.is_in_house as "isInHouse",
       l.opened_life_days as "openedLifeDays", l.storage, l.preparation,
       l.issued_on::text as "issuedOn", l.expires_on::text as "expiresOn", l.state,
       l.state_reason as "stateReason", coalesce(l.state_changed_at, l.created_at) as "stateChangedAt", l.version,
       case when f.id is null then null else jsonb_build_object('id', f.id, 'sha256', f.sha256,
         'mediaType', f.media_type, 'byteCount', f.byte_count, 'fileName', f.file_name,
         'uploadedAt', f.uploaded_at, 'uploadedBy', u.name) end as certificate,
       (select count(*) from checks c where c.standard_id = l.id) as "checkCount"
     from standards l
       left join certificates f on f.id = l.certificate_id
       left join users u on u.id = f.uploaded_by
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

export interface StateChangeRow extends Omit<StandardStateChange, 'at'> {
  at: Date;
}

/** The audit trail is the history of a lot's state: newest first. */
export function selectStateChanges(
  parts: Pick<Parts, 'sequelize'>,
  standardId: number,
): Promise<StateChangeRow[]> {
  return parts.sequelize.query<StateChangeRow>(
    `select e.new_value ->> 'state' as state, coalesce(e.reason, e.new_value ->> 'stateReason') as reason,
       e.captured_at as at, e.actor_name as by
     from audit_events e
     where e.object_kind = 'standards' and e.object_id = $standardId::text
       and e.new_value ->> 'state' in ('released', 'quarantined', 'recalled')
     order by e.sequence desc`,
    { type: QueryTypes.SELECT, bind: { standardId } },
  );
}

type UseRow = StandardUses['probes'][number];
export interface ProbeUseRow extends Omit<UseRow, 'lastUsedAt'> {
  lastUsedAt: Date;
}

/**
 * Probes compared with the lot, the last one first. A probe rests on the lot when its newest valid comparison was
 * made with it: take the lot away and nothing newer speaks for that probe.
 */
export function selectProbeUses(
  parts: Pick<Parts, 'sequelize'>,
  standardId: number,
  siteIds: number[] | null,
): Promise<ProbeUseRow[]> {
  return parts.sequelize.query<ProbeUseRow>(
    `with uses as (
       select c.probe_id, c.point_id, c.at, 1 as checked, 0 as calibrated,
         case when c.is_valid then c.outcome end as outcome
       from checks c where c.standard_id = $standardId
       union all
       select r.probe_id, r.point_id, r.started_at, 0, 1, null
       from calibrations r where r.standard_id = $standardId or r.second_standard_id = $standardId
     ), probes_used as (
       select probe_id, sum(checked) as checks, sum(calibrated) as runs, max(at) as last_at,
         (array_agg(point_id order by at desc))[1] as point_id,
         (array_agg(outcome order by at desc) filter (where outcome is not null))[1] as outcome
       from uses group by probe_id
     )
     select p.id as "probeId", p.tag as "probeTag", s.id as "siteId", s.name as "siteName", pt.name as "pointName",
       w.checks::int as "checkCount", w.runs::int as "calibrationCount", w.last_at as "lastUsedAt",
       w.outcome as "lastOutcome",
       coalesce((select n.standard_id = $standardId from checks n
         where n.probe_id = p.id and n.is_valid order by n.at desc limit 1), false) as "restsOnThisLot"
     from probes_used w
       join probes p on p.id = w.probe_id
       join sites s on s.id = p.site_id
       left join points pt on pt.id = w.point_id
     where $siteIds::int[] is null or p.site_id = any($siteIds)
     order by w.last_at desc, p.id`,
    { type: QueryTypes.SELECT, bind: { standardId, siteIds } },
  );
}

/** Lots that were diluted from this one. */
export function selectDerivedLots(
  parts: Pick<Parts, 'sequelize'>,
  standardId: number,
): Promise<StandardUses['derivedLots']> {
  return parts.sequelize.query<StandardUses['derivedLots'][number]>(
    `select l.id, l.code, l.state from standards l
     where l.preparation is not null and (l.preparation -> 'source' ->> 'standardId')::integer = $standardId
     order by lower(l.code)`,
    { type: QueryTypes.SELECT, bind: { standardId } },
  );
}

export async function countBottlesOfLot(
  parts: Pick<Parts, 'sequelize'>,
  standardId: number,
): Promise<StandardUses['bottles']> {
  const [row] = await parts.sequelize.query<StandardUses['bottles']>(
    `select count(*)::int as total,
       (count(*) filter (where discarded_at is null and opened_at is null))::int as unopened,
       (count(*) filter (where discarded_at is null and opened_at is not null))::int as open
     from bottles where standard_id = $standardId`,
    { type: QueryTypes.SELECT, bind: { standardId } },
  );
  return row!;
}
