/** What a person must look into. One open notice for one cause; a repeated cause adds nothing. */
import type { NoticeKind } from '../../shared/contracts/vocabulary.ts';
import { numberColumn, textColumn } from './columns.ts';
import type { Db } from './queries.ts';

export interface NewNotice {
  kind: NoticeKind;
  deviceId: number;
  probeId: number;
  atMs: number;
  /** What makes it the same as an open one. */
  cause: Record<string, unknown>;
  detail: Record<string, unknown>;
}

export interface WrittenNotice {
  id: number;
  probeId: number;
}

export async function writeNotices(db: Db, notices: readonly NewNotice[]): Promise<WrittenNotice[]> {
  const { rows } = await db.query<WrittenNotice>(
    `insert into notices (kind, detail, at, device_id, probe_id)
     select distinct on (w.kind, w.device_id, w.cause)
       w.kind, w.cause::jsonb || w.detail::jsonb, to_timestamp(w.at_ms / 1000), w.device_id, w.probe_id
     from unnest($1::text[], $2::int[], $3::int[], $4::float8[], $5::text[], $6::text[])
       as w (kind, device_id, probe_id, at_ms, cause, detail)
     where not exists (
       select 1 from notices n where n.device_id = w.device_id and n.kind = w.kind and n.closed_at is null
         and n.detail @> w.cause::jsonb)
     order by w.kind, w.device_id, w.cause, w.at_ms
     returning id, probe_id as "probeId"`,
    [
      textColumn(notices.map(({ kind }) => kind)),
      numberColumn(notices.map(({ deviceId }) => deviceId)),
      numberColumn(notices.map(({ probeId }) => probeId)),
      numberColumn(notices.map(({ atMs }) => atMs)),
      textColumn(notices.map(({ cause }) => JSON.stringify(cause))),
      textColumn(notices.map(({ detail }) => JSON.stringify(detail))),
    ],
  );
  return rows;
}
