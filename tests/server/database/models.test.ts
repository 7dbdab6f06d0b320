import { OptimisticLockError, UniqueConstraintError, ValidationError, type Sequelize } from 'sequelize';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import * as models from '../../../server/db/models/index.ts';
import { connectDatabase } from '../../../server/db/sequelize.ts';
import { inTransaction } from '../../../server/db/transaction.ts';
import { freshDatabase, type TestDatabase } from '../../support/database.ts';

const { Area, Assignment, AuditEvent, Device, DeviceBoot, LiveReading, Point, Probe, Reading, Site, User } =
  models;

let database: TestDatabase;
let sequelize: Sequelize;

beforeAll(async () => {
  database = await freshDatabase();
  sequelize = connectDatabase(database.appUrl);
});
afterAll(async () => {
  await sequelize.close();
  await database.drop();
});

let count = 0;
const createSite = () =>
  Site.create({ code: `S${++count}`, name: 'Skerry Point', timeZone: 'Europe/London' });
const createProbe = (siteId: number) =>
  Probe.create({
    serial: `A${++count}`,
    tag: `T${count}`,
    kind: 'four-electrode',
    nominalCellConstantPerCm: 1,
    cellConstantPerCm: 1.004,
    rangeLowUsCm: 1,
    rangeHighUsCm: 20_000,
    temperatureSensor: 'pt1000',
    deviceCompensation: 'none',
    status: 'spare',
    siteId,
  });

describe('models and tables', () => {
  it('have the same columns, and the same idea of what may be missing', async () => {
    const [rows] = (await sequelize.query(
      `select table_name || '.' || column_name as name from information_schema.columns c
       where table_schema = 'public' and table_name <> 'migrations'
         and not exists (select from pg_inherits where inhrelid = table_name::regclass)`,
    )) as [{ name: string }[], unknown];
    const mapped = Object.values(sequelize.models).flatMap((model) =>
      Object.values(model.getAttributes()).map(({ field }) => `${model.tableName}.${field ?? ''}`),
    );
    expect(mapped.toSorted()).toEqual(rows.map(({ name }) => name).toSorted());
  });

  it('can each be read', async () => {
    for (const model of Object.values(sequelize.models)) {
      await expect(model.findAll({ limit: 1 }), model.name).resolves.toBeInstanceOf(Array);
    }
  });
});

describe('rows', () => {
  it('come back with identity, defaults of the database and numbers as numbers', async () => {
    const site = await createSite();
    const probe = await createProbe(site.id);
    expect(probe.id).toBeGreaterThan(0);
    expect(probe.version).toBe(0);
    expect(probe.notes).toBe('');
    expect(probe.createdAt).toBeInstanceOf(Date);
    const device = await Device.create({
      name: `dev-${probe.id}-x`,
      secretHash: 'hash',
      credentialsIssuedAt: new Date('2026-12-01T00:00:00Z'),
      probeId: probe.id,
    });
    expect(device.duplicateCount).toBe(0);
    expect(device.isOnline).toBe(false);
    const boot = await DeviceBoot.create({ boot: '01JE6M0T6Y', deviceId: device.id });
    const at = new Date('2026-12-01T10:15:00.000Z');
    await Reading.create({
      deviceId: device.id,
      bootId: boot.id,
      n: Number.MAX_SAFE_INTEGER,
      at,
      context: 'process',
      conductivityUsCm: 1061,
      temperatureC: 13.02,
      quality: 'good',
      flags: ['hold'],
      receivedAt: at,
      probeId: probe.id,
    });
    const stored = await Reading.findOne({ where: { probeId: probe.id } });
    expect(stored?.n).toBe(Number.MAX_SAFE_INTEGER);
    expect(stored?.conductivityUsCm).toBe(1061);
    expect(stored?.flags).toEqual(['hold']);
    expect(stored?.at).toEqual(at);
  });

  it('can be created in bulk with identities from the database', async () => {
    const site = await createSite();
    const areas = await Area.bulkCreate([
      { name: 'Feed', siteId: site.id },
      { name: 'Permeate', siteId: site.id },
    ]);
    expect(new Set(areas.map(({ id }) => id)).size).toBe(2);
  });

  it('refuse a word that is not in the list before the database is asked', async () => {
    const site = await createSite();
    const probe = await createProbe(site.id);
    await expect(probe.update({ kind: 'magnetic' as 'inductive' })).rejects.toBeInstanceOf(ValidationError);
  });

  it('refuse the second of two people who change the same row', async () => {
    const site = await createSite();
    const [mine, theirs] = await Promise.all([Site.findByPk(site.id), Site.findByPk(site.id)]);
    await theirs!.update({ name: 'Skerry Point North' });
    await expect(mine!.update({ name: 'Skerry Point South' })).rejects.toBeInstanceOf(OptimisticLockError);
    await site.reload();
    expect([site.name, site.version]).toEqual(['Skerry Point North', 1]);
  });

  it('tell which e-mail is taken', async () => {
    await User.create({ email: 'ada@works.example', name: 'Ada' });
    await expect(User.create({ email: 'Ada@works.example', name: 'Ada' })).rejects.toBeInstanceOf(
      UniqueConstraintError,
    );
  });

  it('keep a missing old value apart from a null one', async () => {
    const at = new Date('2026-12-01T00:00:00.120Z');
    await AuditEvent.create({
      sequence: 1,
      capturedAt: at,
      receivedAt: at,
      actorKind: 'system',
      actorName: 'test',
      action: 'site.created',
      objectKind: 'sites',
      newValue: { name: 'Lower Weir' },
      previousHash: '0'.repeat(64),
      hash: 'a'.repeat(64),
    });
    const event = await AuditEvent.findByPk(1);
    expect([event?.sequence, event?.oldValue, event?.newValue]).toEqual([1, null, { name: 'Lower Weir' }]);
    expect(event?.capturedAt).toEqual(at);
    const [rows] = await sequelize.query('select old_value is null as missing from audit_events');
    expect(rows).toEqual([{ missing: true }]);
  });
});

describe('relations', () => {
  it('lead from a probe to its point, area, site and newest reading', async () => {
    const site = await createSite();
    const area = await Area.create({ name: 'Permeate', siteId: site.id });
    const point = await Point.create({
      code: 'SP-77',
      name: 'Permeate outlet',
      duty: 'Product quality',
      medium: 'permeate',
      displayUnit: 'uS/cm',
      compensationModel: 'natural-water',
      tolerancePercent: 3,
      decisionRule: 'guarded-u',
      intervalDays: 180,
      intervalMethod: 'fixed',
      criticality: 'high',
      hazardTags: ['pressurised'],
      areaId: area.id,
    });
    const probe = await createProbe(site.id);
    const user = await User.create({ email: 'grace@works.example', name: 'Grace' });
    const from = new Date('2026-11-01T00:00:00Z');
    await Assignment.create({ probeId: probe.id, pointId: point.id, fromAt: from, installedBy: user.id });
    const loaded = await Probe.findByPk(probe.id, {
      include: [
        { model: LiveReading, as: 'liveReading' },
        {
          model: Assignment,
          as: 'assignments',
          include: [{ model: Point, as: 'point', include: [{ model: Area, as: 'area' }] }],
        },
      ],
    });
    expect(loaded?.liveReading).toBeNull();
    expect(loaded?.assignments?.[0]?.point?.area?.name).toBe('Permeate');
    expect(loaded?.assignments?.[0]?.point?.referenceTemperatureC).toBe(25);
  });
});

describe('a transaction', () => {
  it('calls back after the commit, in order, when others can see the change', async () => {
    const seen: string[] = [];
    const code = `S${++count}`;
    await inTransaction(sequelize, async (transaction) => {
      transaction.afterCommit(async () => {
        seen.push(`rows: ${await Site.count({ where: { code } })}`);
      });
      transaction.afterCommit(() => void seen.push('second'));
      await Site.create({ code, name: 'Weir', timeZone: 'UTC' }, { transaction });
      seen.push('work done');
    });
    expect(seen).toEqual(['work done', 'rows: 1', 'second']);
  });

  it('keeps nothing and calls nobody back when the work fails', async () => {
    const seen: string[] = [];
    const code = `S${++count}`;
    await expect(
      inTransaction(sequelize, async (transaction) => {
        transaction.afterCommit(() => void seen.push('called'));
        await Site.create({ code, name: 'Weir', timeZone: 'UTC' }, { transaction });
        throw new Error('the pen broke');
      }),
    ).rejects.toThrow('the pen broke');
    expect([seen, await Site.count({ where: { code } })]).toEqual([[], 0]);
  });

  it('calls nobody back when the commit itself is refused', async () => {
    const seen: string[] = [];
    await expect(
      inTransaction(sequelize, async (transaction) => {
        transaction.afterCommit(() => void seen.push('called'));
        await sequelize.query(
          `create temporary table late (id integer unique deferrable initially deferred);
           insert into late values (1), (1)`,
          { transaction },
        );
      }),
    ).rejects.toThrow();
    expect(seen).toEqual([]);
  });

  it('reports a callback that fails as a warning; the change stays and the next callback runs', async () => {
    const warnings: string[] = [];
    const listen = (warning: Error) => warnings.push(warning.message);
    process.on('warning', listen);
    const code = `S${++count}`;
    const seen: string[] = [];
    await inTransaction(sequelize, async (transaction) => {
      transaction.afterCommit(() => {
        throw new Error('the line is down');
      });
      transaction.afterCommit(() => void seen.push('next'));
      await Site.create({ code, name: 'Weir', timeZone: 'UTC' }, { transaction });
    });
    await expect.poll(() => warnings).toContain('the line is down');
    process.off('warning', listen);
    expect([seen, await Site.count({ where: { code } })]).toEqual([['next'], 1]);
  });
});
