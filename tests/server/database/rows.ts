/** The least that must exist before a row of interest: one site, area, point, person and probe, by plain SQL. */
import type { Client } from 'pg';

export async function insertId(client: Client, text: string, values: unknown[] = []): Promise<number> {
  const { rows } = await client.query<{ id: number }>(`${text} returning id`, values);
  return rows[0]!.id;
}

export async function insertSite(client: Client, code = 'SP'): Promise<number> {
  return insertId(client, 'insert into sites (code, name, time_zone) values ($1, $1, $2)', [
    code,
    'Europe/London',
  ]);
}

export async function insertUser(client: Client, email = 'ada@works.example'): Promise<number> {
  return insertId(client, 'insert into users (email, name) values ($1, $1)', [email]);
}

export async function insertArea(client: Client, siteId: number): Promise<number> {
  return insertId(client, `insert into areas (name, site_id) values ('Permeate', $1)`, [siteId]);
}

export async function insertPoint(client: Client, areaId: number, code = 'SP-01'): Promise<number> {
  return insertId(
    client,
    `insert into points (code, name, duty, medium, display_unit, compensation_model, tolerance_percent,
       decision_rule, interval_days, interval_method, criticality, area_id)
     values ($1, $1, 'Permeate quality', 'permeate', 'uS/cm', 'natural-water', 3,
       'guarded-u', 180, 'fixed', 'high', $2)`,
    [code, areaId],
  );
}

export async function insertProbe(client: Client, siteId: number, serial = 'A1001'): Promise<number> {
  return insertId(
    client,
    `insert into probes (serial, tag, kind, nominal_cell_constant_per_cm, cell_constant_per_cm, range_low_us_cm,
       range_high_us_cm, temperature_sensor, device_compensation, status, site_id)
     values ($1, $1, 'four-electrode', 1, 1.004, 1, 20000, 'pt1000', 'none', 'spare', $2)`,
    [serial, siteId],
  );
}

export async function insertDevice(client: Client, probeId: number, name = 'dev-1001'): Promise<number> {
  return insertId(
    client,
    'insert into devices (name, secret_hash, credentials_issued_at, probe_id) values ($1, $2, now(), $3)',
    [name, 'hash', probeId],
  );
}

export async function insertStandard(client: Client, code = 'KC-26-031'): Promise<number> {
  return insertId(
    client,
    `insert into standards (code, producer, product, medium, basis, nominal, issued_on, expires_on, state)
     values ($1, 'Own laboratory', 'KCl 0.01 mol/kg', 'kcl-aqueous', 'molal', 0.01,
       '2026-11-01', '2027-05-01', 'released')`,
    [code],
  );
}

/** One of each, ready to be referred to. */
export async function insertPlant(client: Client) {
  const siteId = await insertSite(client);
  const userId = await insertUser(client);
  const areaId = await insertArea(client, siteId);
  const pointId = await insertPoint(client, areaId);
  const probeId = await insertProbe(client, siteId);
  const deviceId = await insertDevice(client, probeId);
  const standardId = await insertStandard(client);
  return { siteId, userId, areaId, pointId, probeId, deviceId, standardId };
}

const hashOf = (digit: string) => digit.repeat(64);

export async function insertAuditEvent(client: Client, sequence = 1): Promise<void> {
  await client.query(
    `insert into audit_events (sequence, captured_at, received_at, actor_kind, actor_name, action, object_kind,
       previous_hash, hash) values ($1, now(), now(), 'system', 'migrations', 'created', 'sites', $2, $3)`,
    [sequence, hashOf(String(sequence - 1)), hashOf(String(sequence))],
  );
}
