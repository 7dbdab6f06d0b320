import pg from 'pg';
import { afterAll, beforeAll, beforeEach, afterEach, describe, expect, it } from 'vitest';
import { freshDatabase, type TestDatabase } from '../../support/database.ts';
import { insertDevice, insertId, insertPlant, insertPoint, insertProbe, insertUser } from './rows.ts';

let database: TestDatabase;
let client: pg.Client;
let plant: Awaited<ReturnType<typeof insertPlant>>;

beforeAll(async () => {
  database = await freshDatabase();
  client = new pg.Client({ connectionString: database.ownerUrl });
  await client.connect();
});
afterAll(async () => {
  await client.end();
  await database.drop();
});
beforeEach(async () => {
  await client.query('begin');
  plant = await insertPlant(client);
});
afterEach(async () => {
  await client.query('rollback');
});

const assign = (probeId: number, pointId: number, from: string, to: string | null) =>
  client.query(
    'insert into assignments (from_at, to_at, probe_id, point_id, installed_by) values ($1, $2, $3, $4, $5)',
    [from, to, probeId, pointId, plant.userId],
  );

describe('where a probe stands', () => {
  it('refuses a probe at two points at once', async () => {
    const other = await insertPoint(client, plant.areaId, 'SP-02');
    await assign(plant.probeId, plant.pointId, '2026-01-01T00:00Z', null);
    await expect(assign(plant.probeId, other, '2026-02-01T00:00Z', null)).rejects.toMatchObject({
      constraint: 'assignments_probe_at_one_point',
    });
  });

  it('refuses two probes at one point, also in the past', async () => {
    const other = await insertProbe(client, plant.siteId, 'A1002');
    await assign(plant.probeId, plant.pointId, '2026-01-01T00:00Z', '2026-03-01T00:00Z');
    await expect(
      assign(other, plant.pointId, '2026-02-28T23:59Z', '2026-04-01T00:00Z'),
    ).rejects.toMatchObject({ constraint: 'assignments_point_holds_one_probe' });
  });

  it('lets one probe follow another at the same instant', async () => {
    const other = await insertProbe(client, plant.siteId, 'A1002');
    await assign(plant.probeId, plant.pointId, '2026-01-01T00:00Z', '2026-03-01T00:00Z');
    await assign(other, plant.pointId, '2026-03-01T00:00Z', null);
    const { rowCount } = await client.query('select 1 from assignments');
    expect(rowCount).toBe(2);
  });

  it('refuses an assignment that ends before it starts', async () => {
    await expect(
      assign(plant.probeId, plant.pointId, '2026-03-01T00:00Z', '2026-03-01T00:00Z'),
    ).rejects.toMatchObject({ constraint: 'assignments_from_before_to' });
  });
});

describe('people', () => {
  it('refuses the same e-mail in other letters', async () => {
    await expect(insertUser(client, 'ADA@works.example')).rejects.toMatchObject({
      constraint: 'users_email_key',
    });
  });

  const grant = (role: string, siteId: number | null, endsOn: string | null) =>
    client.query('insert into memberships (role, ends_on, user_id, site_id) values ($1, $2, $3, $4)', [
      role,
      endsOn,
      plant.userId,
      siteId,
    ]);

  it('refuses a second open role at the same site, and a second for all sites', async () => {
    await grant('operator', null, null);
    await client.query('savepoint before');
    await expect(grant('manager', null, null)).rejects.toMatchObject({
      constraint: 'memberships_one_role_per_site',
    });
    await client.query('rollback to before');
    await grant('technician', plant.siteId, null);
    await expect(grant('manager', plant.siteId, null)).rejects.toMatchObject({
      constraint: 'memberships_one_role_per_site',
    });
  });

  it('lets a new role follow an ended one', async () => {
    await grant('operator', plant.siteId, null);
    await client.query('update memberships set ended_at = now()');
    await grant('manager', plant.siteId, null);
    const { rowCount } = await client.query('select 1 from memberships');
    expect(rowCount).toBe(2);
  });

  it('refuses an auditor without a last day', async () => {
    await expect(grant('auditor', null, null)).rejects.toMatchObject({
      constraint: 'memberships_auditor_ends',
    });
  });
});

describe('holds', () => {
  const hold = () =>
    client.query(
      `insert into holds (reason, from_at, until_at, point_id, user_id)
       values ('Probe out for calibration', now(), now() + interval '2 hours', $1, $2)`,
      [plant.pointId, plant.userId],
    );

  it('refuses a second open hold at a point and takes one after the first has ended', async () => {
    await hold();
    await client.query('savepoint before');
    await expect(hold()).rejects.toMatchObject({ constraint: 'holds_one_open_per_point' });
    await client.query('rollback to before');
    await client.query('update holds set ended_at = now()');
    await hold();
    const { rowCount } = await client.query('select 1 from holds');
    expect(rowCount).toBe(2);
  });
});

describe('quantities', () => {
  it.each([
    ['probes', 'cell_constant_per_cm', '0'],
    ['probes', 'cell_constant_per_cm', "'NaN'"],
    ['probes', 'nominal_cell_constant_per_cm', '-1'],
    ['probes', 'range_high_us_cm', "'Infinity'"],
    ['probes', 'range_high_us_cm', '0.5'],
    ['points', 'tolerance_percent', '0'],
    ['points', 'interval_days', '0'],
    ['points', 'reference_temperature_c', '120'],
    ['standards', 'nominal', '0'],
    ['standards', 'coverage_factor', '2'],
    ['standards', 'expires_on', "'2026-10-31'"],
    ['devices', 'reading_interval_s', '0'],
    ['devices', 'clock_offset_ms', "'NaN'"],
  ])('%s refuses %s = %s', async (table, column, value) => {
    await expect(client.query(`update ${table} set ${column} = ${value}`)).rejects.toMatchObject({
      code: '23514',
    });
  });

  it('refuses a low limit at or above the high one', async () => {
    await expect(
      client.query('update points set low_limit_us_cm = 500, high_limit_us_cm = 500'),
    ).rejects.toMatchObject({ constraint: 'points_low_below_high' });
  });

  it('refuses linear compensation without its coefficient', async () => {
    await expect(client.query(`update points set compensation_model = 'linear'`)).rejects.toMatchObject({
      constraint: 'points_linear_has_coefficient',
    });
  });

  it('refuses a hazard that has no caution of its own', async () => {
    await expect(client.query(`update points set hazard_tags = '{chemicals,dragons}'`)).rejects.toMatchObject(
      {
        constraint: 'points_hazard_tags_check',
      },
    );
  });
});

describe('probes and devices', () => {
  it('refuses a twin tag in other letters', async () => {
    await expect(insertProbe(client, plant.siteId, 'a1001')).rejects.toMatchObject({ code: '23505' });
  });

  it('refuses retirement without a reason', async () => {
    await expect(
      client.query(`update probes set status = 'retired', retired_at = now()`),
    ).rejects.toMatchObject({ constraint: 'probes_retired_has_reason' });
  });

  it('refuses a second active device on a probe and takes one after the first is revoked', async () => {
    await client.query('savepoint before');
    await expect(insertDevice(client, plant.probeId, 'dev-1002')).rejects.toMatchObject({
      constraint: 'devices_one_active_per_probe',
    });
    await client.query('rollback to before');
    await client.query('update devices set revoked_at = now()');
    await expect(insertDevice(client, plant.probeId, 'dev-1002')).resolves.toBeGreaterThan(plant.deviceId);
  });

  it('refuses a device name that is no MQTT user name of ours', async () => {
    const other = await insertProbe(client, plant.siteId, 'A1002');
    await expect(insertDevice(client, other, 'Dev/1')).rejects.toMatchObject({
      constraint: 'devices_name_check',
    });
  });

  it('orders boots byte by byte, as devices make them', async () => {
    for (const boot of ['01JEa', '01JEB', '01JEC']) {
      await client.query('insert into device_boots (boot, device_id) values ($1, $2)', [
        boot,
        plant.deviceId,
      ]);
    }
    const { rows } = await client.query<{ boot: string }>('select boot from device_boots order by boot');
    expect(rows.map(({ boot }) => boot)).toEqual(['01JEB', '01JEC', '01JEa']);
  });
});

describe('standards', () => {
  it('refuses a lot whose value has no source', async () => {
    await expect(
      client.query(`update standards set medium = 'other', basis = 'other'`),
    ).rejects.toMatchObject({ constraint: 'standards_value_has_source' });
  });
});

describe('checks', () => {
  const check = (columns: string, values: string) =>
    insertId(
      client,
      `insert into checks (stage, at, probe_id, ${columns}) values ('automatic', now(), ${plant.probeId}, ${values})`,
    );
  const result = `standard_id, conductivity_us_cm, temperature_c, cell_constant_per_cm, reference_us_cm, error_percent,
    implied_cell_constant_per_cm, expanded_uncertainty_percent, coverage_factor, tolerance_percent, decision_rule,
    outcome, probability_outside, acceptance_limit_percent, reference_source`;
  const values = () =>
    `${plant.standardId}, 1410, 25, 1.004, 1408.23, 0.13, 1.003, 0.8, 2, 3, 'guarded-u', 'within-clear', 0, 2.2, 'lot'`;

  it('takes a valid check with its whole result', async () => {
    await expect(check(`is_valid, ${result}`, `true, ${values()}`)).resolves.toBeGreaterThan(0);
  });

  it('refuses a valid check that lacks a part of its result', async () => {
    await expect(
      check(`is_valid, ${result}`, `true, ${values().replace("'within-clear'", 'null')}`),
    ).rejects.toMatchObject({ constraint: 'checks_valid_has_result' });
  });

  it('refuses a check that is not valid for no reason, and a valid one with a reason', async () => {
    await client.query('savepoint before');
    await expect(check('is_valid', 'false')).rejects.toMatchObject({
      constraint: 'checks_invalid_has_reason',
    });
    await client.query('rollback to before');
    await expect(
      check(`is_valid, invalid_reason, ${result}`, `true, 'solution-expired', ${values()}`),
    ).rejects.toMatchObject({ constraint: 'checks_invalid_has_reason' });
  });

  it('refuses a second check of the same reading', async () => {
    const bootId = await insertId(client, 'insert into device_boots (boot, device_id) values ($1, $2)', [
      '01JE6M',
      plant.deviceId,
    ]);
    const again = () =>
      check(
        'is_valid, invalid_reason, device_id, boot_id, n',
        `false, 'solution-unknown', ${plant.deviceId}, ${bootId}, 7`,
      );
    await again();
    await expect(again()).rejects.toMatchObject({ constraint: 'checks_one_per_reading' });
  });
});

describe('quarantined messages', () => {
  const quarantine = (payload: Buffer, payloadBytes: number) =>
    client.query(
      `insert into quarantined_messages (topic, code, reason, payload, payload_bytes)
       values ('saltmark/1/dev-1001/readings', 'too-large', 'Longer than 64 KiB', $1, $2)`,
      [payload, payloadBytes],
    );

  it('keeps 64 KiB of a message together with the length it had, and no more', async () => {
    await quarantine(Buffer.alloc(65_536), 70_000);
    await expect(quarantine(Buffer.alloc(65_537), 65_537)).rejects.toMatchObject({
      constraint: 'quarantined_messages_payload_check',
    });
  });
});
