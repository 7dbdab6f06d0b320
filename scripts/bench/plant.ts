/** A site of imaginary points for the benchmark, written straight into its own empty database. */
import pg from 'pg';
import { hashDeviceSecret } from '../../server/ingest/device-secrets.ts';
import { hashPassword } from '../../server/lib/hashing.ts';
import { benchSecret } from './load.ts';

export const viewer = { email: 'viewer@bench.example', password: 'a-password-for-the-bench' };

export async function layPlant(
  ownerUrl: string,
  deviceCount: number,
): Promise<{ names: string[]; siteId: number }> {
  const client = new pg.Client({ connectionString: ownerUrl });
  await client.connect();
  try {
    const { rows } = await client.query<{ userId: number; siteId: number }>(
      `with person as (insert into users (email, name, password_hash) values ($1, 'Viewer', $2) returning id),
         place as (insert into sites (code, name, time_zone) values ('BENCH', 'Bench', 'UTC') returning id),
         grants as (insert into memberships (role, user_id) select 'operator', id from person)
       select person.id as "userId", place.id as "siteId" from person, place`,
      [viewer.email, await hashPassword(viewer.password)],
    );
    const { userId, siteId } = rows[0]!;
    const values = [siteId, userId, deviceCount, hashDeviceSecret(benchSecret)];
    await client.query(`insert into areas (name, site_id) values ('Hall', ${siteId})`);
    await client.query(
      `with points_made as (
         insert into points (code, name, duty, medium, display_unit, compensation_model,
           compensation_coefficient_percent_per_k, tolerance_percent, decision_rule, interval_days, interval_method,
           criticality, area_id)
         select 'B-' || i, 'Point ' || i, 'bench', 'water', 'uS/cm', 'linear', 2, 3, 'guarded-u', 90, 'fixed', 'low', a.id
         from generate_series(1, $3::int) i, areas a where a.site_id = $1
         returning id, substr(code, 3)::int as i
       ), probes_made as (
         insert into probes (serial, tag, kind, nominal_cell_constant_per_cm, cell_constant_per_cm, range_low_us_cm,
           range_high_us_cm, temperature_sensor, device_compensation, status, site_id)
         select 'SN-' || i, 'bench-' || i, 'two-electrode', 1, 1, 0, 20000, 'pt1000', 'none', 'in-service', $1
         from generate_series(1, $3::int) i
         returning id, substr(serial, 4)::int as i
       ), placed as (
         insert into assignments (from_at, probe_id, point_id, installed_by)
         select now() - interval '1 day', p.id, q.id, $2 from probes_made p join points_made q on q.i = p.i
       )
       insert into devices (name, secret_hash, credentials_issued_at, probe_id)
       select 'bench-' || i, $4, now(), id from probes_made`,
      values,
    );
    await client.query('select ensure_reading_partitions(1, 1)');
    await client.query('vacuum analyze');
    return { names: Array.from({ length: deviceCount }, (_, i) => `bench-${i + 1}`), siteId };
  } finally {
    await client.end();
  }
}
