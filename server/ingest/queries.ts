/** The SQL of ingest: look-ups of the pipeline, and the statements of one grouped commit. */
import type { ClientBase, Pool } from 'pg';
import type { CompensationModelName, DecisionRule } from '../../shared/contracts/vocabulary.ts';
import { numberColumn, textColumn } from './columns.ts';

/** A pool, or one connection of it inside a transaction. */
export type Db = Pool | ClientBase;

// ---- The directory -------------------------------------------------------------------------------------------

export interface DeviceRow {
  id: number;
  name: string;
  secretHash: string;
  isRevoked: boolean;
  probeId: number;
  bootText: string | null;
  isOnline: boolean;
  reportedCellConstantPerCm: number | null;
}

const deviceColumns = `
  id, name, secret_hash as "secretHash", revoked_at is not null as "isRevoked", probe_id as "probeId",
  boot_text as "bootText", is_online as "isOnline", reported_cell_constant_per_cm as "reportedCellConstantPerCm"`;

export async function selectDevices(db: Db): Promise<DeviceRow[]> {
  return (await db.query<DeviceRow>(`select ${deviceColumns} from devices`)).rows;
}

export async function selectDevice(db: Db, name: string): Promise<DeviceRow | null> {
  const { rows } = await db.query<DeviceRow>(`select ${deviceColumns} from devices where name = $1`, [name]);
  return rows[0] ?? null;
}

export interface PointRow {
  pointId: number;
  siteId: number;
  compensationModel: CompensationModelName;
  compensationCoefficientPercentPerK: number | null;
  referenceTemperatureC: number;
  tolerancePercent: number;
  decisionRule: DecisionRule;
}

const pointColumns = `
  p.id as "pointId", a.site_id as "siteId", p.compensation_model as "compensationModel",
  p.compensation_coefficient_percent_per_k as "compensationCoefficientPercentPerK",
  p.reference_temperature_c as "referenceTemperatureC", p.tolerance_percent as "tolerancePercent",
  p.decision_rule as "decisionRule"`;

export interface ProbeRow {
  probeId: number;
  siteId: number;
  cellConstantPerCm: number;
  resolutionUsCm: number | null;
}

export async function selectProbes(db: Db): Promise<ProbeRow[]> {
  const { rows } = await db.query<ProbeRow>(`
    select id as "probeId", site_id as "siteId", cell_constant_per_cm as "cellConstantPerCm",
      resolution_us_cm as "resolutionUsCm"
    from probes`);
  return rows;
}

export interface PlacementRow extends PointRow {
  probeId: number;
  fromMs: number;
  toMs: number | null;
}

/** Where probes stand now or will stand, and the last hour. */
export async function selectPlacements(db: Db): Promise<PlacementRow[]> {
  const { rows } = await db.query<PlacementRow>(`
    select s.probe_id as "probeId", (extract(epoch from s.from_at) * 1000)::float8 as "fromMs",
      (extract(epoch from s.to_at) * 1000)::float8 as "toMs", ${pointColumns}
    from assignments s join points p on p.id = s.point_id join areas a on a.id = p.area_id
    where s.to_at is null or s.to_at > now() - interval '1 hour'`);
  return rows;
}

/** Where each probe stood at a moment of its own, in the order asked. */
export async function selectPointsAt(
  db: Db,
  asked: readonly { probeId: number; atMs: number }[],
): Promise<(PointRow | null)[]> {
  const { rows } = await db.query<PointRow & { place: number }>(
    `select k.place::int, ${pointColumns}
     from unnest($1::int[], $2::float8[]) with ordinality as k (probe_id, at_ms, place)
     join assignments s on s.probe_id = k.probe_id and s.from_at <= to_timestamp(k.at_ms / 1000)
       and (s.to_at is null or s.to_at > to_timestamp(k.at_ms / 1000))
     join points p on p.id = s.point_id join areas a on a.id = p.area_id`,
    [numberColumn(asked.map(({ probeId }) => probeId)), numberColumn(asked.map(({ atMs }) => atMs))],
  );
  const found = new Map(rows.map((row) => [row.place, row]));
  return asked.map((_, index) => found.get(index + 1) ?? null);
}

export interface LotRow {
  id: number;
  code: string;
  medium: string;
  basis: string;
  nominal: number | null;
  certifiedConductivityUsCm: number | null;
  referenceTemperatureC: number;
  expandedUncertaintyUsCm: number | null;
  coverageFactor: number | null;
  temperatureTable: { temperatureC: number; conductivityUsCm: number }[] | null;
  expiresOn: string;
  state: 'released' | 'quarantined' | 'recalled';
}

/** Lots by the codes that devices gave, without regard to case. */
export async function selectLots(db: Db, codes: readonly string[]): Promise<Map<string, LotRow>> {
  const { rows } = await db.query<LotRow>(
    `select id, code, medium, basis, nominal, certified_conductivity_us_cm as "certifiedConductivityUsCm",
       reference_temperature_c as "referenceTemperatureC", expanded_uncertainty_us_cm as "expandedUncertaintyUsCm",
       coverage_factor as "coverageFactor", temperature_table as "temperatureTable",
       to_char(expires_on, 'YYYY-MM-DD') as "expiresOn", state
     from standards where lower(code) = any($1::text[])`,
    [textColumn(codes.map(lotKey))],
  );
  return new Map(rows.map((row) => [lotKey(row.code), row]));
}

export const lotKey = (code: string): string => code.trim().toLowerCase();

export async function selectSetting(db: Db, key: string): Promise<unknown> {
  const { rows } = await db.query<{ value: unknown }>('select value from settings where key = $1', [key]);
  return rows[0]?.value;
}

// ---- Boots, settings and duplicates --------------------------------------------------------------------------

export interface BootRow {
  deviceId: number;
  boot: string;
  id: number;
  /** Highest number stored of this boot; -1 when none is. */
  maxN: number;
}

/** Ids of boots, made where they are new. Two servers may make the same one at once: then it takes a second look. */
export async function resolveBoots(
  db: Db,
  wanted: readonly { deviceId: number; boot: string }[],
  at: Date,
): Promise<BootRow[]> {
  const values = [numberColumn(wanted.map((w) => w.deviceId)), textColumn(wanted.map((w) => w.boot))];
  await db.query(
    `insert into device_boots (device_id, boot, first_seen_at)
     select w.device_id, w.boot, $3 from unnest($1::int[], $2::text[]) as w (device_id, boot)
     where not exists (select 1 from device_boots b where b.device_id = w.device_id and b.boot = w.boot)
     on conflict do nothing`,
    [...values, at],
  );
  const { rows } = await db.query<BootRow>(
    `select b.device_id as "deviceId", b.boot, b.id,
       coalesce((select max(r.n) from readings r where r.device_id = b.device_id and r.boot_id = b.id), -1)::float8 as "maxN"
     from unnest($1::int[], $2::text[]) as w (device_id, boot)
     join device_boots b on b.device_id = w.device_id and b.boot = w.boot`,
    values,
  );
  return rows;
}

export interface SettingsRow {
  deviceId: number;
  settingsHash: string;
  id: number;
  /** Null while no birth has told what these settings are. */
  cellConstantPerCm: number | null;
}

export async function resolveSettings(
  db: Db,
  wanted: readonly { deviceId: number; settingsHash: string }[],
  at: Date,
): Promise<SettingsRow[]> {
  const values = [numberColumn(wanted.map((w) => w.deviceId)), textColumn(wanted.map((w) => w.settingsHash))];
  await db.query(
    `insert into device_settings (device_id, settings_hash, first_seen_at)
     select w.device_id, w.settings_hash, $3 from unnest($1::int[], $2::text[]) as w (device_id, settings_hash)
     where not exists (
       select 1 from device_settings s where s.device_id = w.device_id and s.settings_hash = w.settings_hash)
     on conflict do nothing`,
    [...values, at],
  );
  const { rows } = await db.query<SettingsRow>(
    `select s.device_id as "deviceId", s.settings_hash as "settingsHash", s.id,
       s.cell_constant_per_cm as "cellConstantPerCm"
     from unnest($1::int[], $2::text[]) as w (device_id, settings_hash)
     join device_settings s on s.device_id = w.device_id and s.settings_hash = w.settings_hash`,
    values,
  );
  return rows;
}

/** Held to commit, so that no other server stores a reading of these boots between look-up and insert. */
export async function lockBoots(db: Db, bootIds: readonly number[]): Promise<void> {
  await db.query('select id from device_boots where id = any($1::int[]) order by id for update', [
    numberColumn(bootIds),
  ]);
}

export interface StoredReading {
  bootId: number;
  n: number;
  atMs: number;
  context: string;
  conductivityUsCm: number | null;
  temperatureC: number | null;
  conductanceUs: number | null;
  solution: string | null;
  quality: string;
  flags: string[];
  extra: unknown;
}

/** What is stored under these numbers, in whichever partition. */
export async function selectStoredReadings(
  db: Db,
  keys: readonly { deviceId: number; bootId: number; n: number }[],
): Promise<StoredReading[]> {
  const { rows } = await db.query<StoredReading>(
    `select r.boot_id as "bootId", r.n::float8 as n, (extract(epoch from r.at) * 1000)::float8 as "atMs", r.context,
       r.conductivity_us_cm as "conductivityUsCm", r.temperature_c as "temperatureC",
       r.conductance_us as "conductanceUs", r.solution, r.quality, coalesce(r.flags, '{}') as flags, r.extra
     from unnest($1::int[], $2::int[], $3::bigint[]) as k (device_id, boot_id, n)
     join readings r on r.device_id = k.device_id and r.boot_id = k.boot_id and r.n = k.n`,
    [
      numberColumn(keys.map((k) => k.deviceId)),
      numberColumn(keys.map((k) => k.bootId)),
      numberColumn(keys.map((k) => k.n)),
    ],
  );
  return rows;
}

/** How far the live view had come when this process started. */
export async function selectLivePositions(
  db: Db,
): Promise<{ probeId: number; deviceId: number; boot: string; n: number; atMs: number }[]> {
  const { rows } = await db.query<{
    probeId: number;
    deviceId: number;
    boot: string;
    n: number;
    atMs: number;
  }>(`
    select probe_id as "probeId", device_id as "deviceId", boot, n::float8 as n,
      (extract(epoch from at) * 1000)::float8 as "atMs"
    from live_readings`);
  return rows;
}
