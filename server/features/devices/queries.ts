import { QueryTypes } from 'sequelize';
import type { CursorKey } from '../../http/paging.ts';
import type { Parts } from '../../parts.ts';

export interface DeviceRow {
  id: number;
  probeId: number;
  siteId: number;
  name: string;
  isOnline: boolean;
  onlineWhy: string | null;
  lastSeenAt: Date | null;
  firmware: string | null;
  settingsHash: string | null;
  reportedCellConstantPerCm: number | null;
  readingIntervalS: number | null;
  duplicateCount: number;
  clockOffsetMs: number | null;
  credentialsIssuedAt: Date;
  revokedAt: Date | null;
}

export interface DeviceFilter {
  /** null = every site. */
  siteIds: number[] | null;
  deviceId: number | null;
  probeId: number | null;
  pattern: string | null;
}

const matching = `($siteIds::int[] is null or p.site_id = any($siteIds))
  and ($deviceId::int is null or d.id = $deviceId)
  and ($probeId::int is null or d.probe_id = $probeId)
  and ($pattern::text is null or d.name ilike $pattern)`;

/** Devices by name, never their secrets. */
export function selectDevices(
  parts: Pick<Parts, 'sequelize'>,
  filter: DeviceFilter,
  after: CursorKey | null,
  limit: number | null,
): Promise<DeviceRow[]> {
  return parts.sequelize.query<DeviceRow>(
    `select d.id, d.probe_id as "probeId", p.site_id as "siteId", d.name, d.is_online as "isOnline",
       d.online_why as "onlineWhy", d.last_seen_at as "lastSeenAt", d.firmware, d.settings_hash as "settingsHash",
       d.reported_cell_constant_per_cm as "reportedCellConstantPerCm", d.reading_interval_s as "readingIntervalS",
       d.duplicate_count as "duplicateCount", d.clock_offset_ms as "clockOffsetMs",
       d.credentials_issued_at as "credentialsIssuedAt", d.revoked_at as "revokedAt"
     from devices d join probes p on p.id = d.probe_id
     where ${matching} and ($name::text is null or d.name > $name)
     order by d.name limit $limit`,
    { type: QueryTypes.SELECT, bind: { ...filter, name: after?.[0] ?? null, limit } },
  );
}

export async function countDevices(parts: Pick<Parts, 'sequelize'>, filter: DeviceFilter): Promise<number> {
  const [row] = await parts.sequelize.query<{ total: number }>(
    `select count(*) as total from devices d join probes p on p.id = d.probe_id where ${matching}`,
    { type: QueryTypes.SELECT, bind: { ...filter } },
  );
  return row?.total ?? 0;
}
