import { QueryTypes } from 'sequelize';
import type { Instrument, InstrumentUse } from '../../../shared/contracts/instruments.ts';
import type { InstrumentKind } from '../../../shared/contracts/vocabulary.ts';
import type { CursorKey } from '../../http/paging.ts';
import type { Parts } from '../../parts.ts';
import type { CertificateRow } from '../certificates/presenter.ts';

export interface InstrumentRow extends Omit<Instrument, 'isUsable' | 'certificate' | 'can'> {
  certificate: CertificateRow | null;
}

export interface InstrumentFilter {
  instrumentId: number | null;
  kind: InstrumentKind | null;
  usableOn: string | null;
  pattern: string | null;
}

const matching = `($instrumentId::int is null or i.id = $instrumentId)
  and ($kind::text is null or i.kind = $kind)
  and ($usableOn::date is null or (i.state = 'in-use' and i.due_on >= $usableOn))
  and ($pattern::text is null or i.code ilike $pattern or i.name ilike $pattern or i.serial ilike $pattern)`;

/** Instruments by kind and code; runs are counted at the sites given (null = every site). */
export function selectInstruments(
  parts: Pick<Parts, 'sequelize'>,
  filter: InstrumentFilter,
  siteIds: number[] | null,
  after: CursorKey | null,
  limit: number,
): Promise<InstrumentRow[]> {
  const [kindAfter, codeAfter] = after ?? [];
  return parts.sequelize.query<InstrumentRow>(
    `select i.id, i.code, i.kind, i.name, i.serial, i.certificate_number as "certificateNumber",
       i.issued_on::text as "issuedOn", i.due_on::text as "dueOn", i.expanded_uncertainty as "expandedUncertainty",
       i.uncertainty_unit as "uncertaintyUnit", i.coverage_factor as "coverageFactor", i.correction,
       i.traceability, i.state, i.version,
       case when f.id is null then null else jsonb_build_object('id', f.id, 'sha256', f.sha256,
         'mediaType', f.media_type, 'byteCount', f.byte_count, 'fileName', f.file_name,
         'uploadedAt', f.uploaded_at, 'uploadedBy', u.name) end as certificate,
       (select count(*) from calibrations c where c.thermometer_id = i.id
         and ($siteIds::int[] is null or c.site_id = any($siteIds))) as "runCount"
     from instruments i
       left join certificates f on f.id = i.certificate_id
       left join users u on u.id = f.uploaded_by
     where ${matching}
       and ($codeAfter::text is null or (i.kind, lower(i.code)) > ($kindAfter, $codeAfter))
     order by i.kind, lower(i.code) limit $limit`,
    {
      type: QueryTypes.SELECT,
      bind: { ...filter, siteIds, kindAfter: kindAfter ?? null, codeAfter: codeAfter ?? null, limit },
    },
  );
}

export async function countInstruments(
  parts: Pick<Parts, 'sequelize'>,
  filter: InstrumentFilter,
): Promise<number> {
  const [row] = await parts.sequelize.query<{ total: number }>(
    `select count(*) as total from instruments i where ${matching}`,
    { type: QueryTypes.SELECT, bind: { ...filter } },
  );
  return row?.total ?? 0;
}

export interface InstrumentUseRow extends Omit<InstrumentUse, 'startedAt'> {
  startedAt: Date;
}

/** The newest runs that used the instrument. */
export function selectInstrumentUses(
  parts: Pick<Parts, 'sequelize'>,
  instrumentId: number,
  siteIds: number[] | null,
  limit: number,
): Promise<InstrumentUseRow[]> {
  return parts.sequelize.query<InstrumentUseRow>(
    `select c.id as "calibrationId", c.number, c.status, c.probe_id as "probeId", p.tag as "probeTag",
       pt.name as "pointName", s.name as "siteName", u.name as performer, c.started_at as "startedAt"
     from calibrations c
       join probes p on p.id = c.probe_id
       join points pt on pt.id = c.point_id
       join sites s on s.id = c.site_id
       join users u on u.id = c.performer_id
     where c.thermometer_id = $instrumentId and ($siteIds::int[] is null or c.site_id = any($siteIds))
     order by c.started_at desc, c.id desc limit $limit`,
    { type: QueryTypes.SELECT, bind: { instrumentId, siteIds, limit } },
  );
}
