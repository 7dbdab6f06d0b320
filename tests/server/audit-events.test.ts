import pg from 'pg';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { AuditEvent } from '../../server/db/models/index.ts';
import { inTransaction } from '../../server/db/transaction.ts';
import { recordAuditEvent } from '../../server/features/audit-events/service.ts';
import { verifyChain } from '../../server/features/audit-events/verify.ts';
import { startTestApp, type TestApp } from '../support/app.ts';
import { refusals } from '../support/refusals.ts';
import { aSite } from '../support/rows.ts';

let app: TestApp;
let siteId: number;
let otherSiteId: number;
const desk = { kind: 'system', name: 'tests' } as const;

const record = (action: string, more: { siteId?: number | null; newValue?: unknown } = {}) =>
  inTransaction(app.sequelize, (transaction) =>
    recordAuditEvent(app.parts, transaction, desk, {
      action,
      objectKind: 'probes',
      objectId: 1,
      siteId: null,
      ...more,
    }),
  );

beforeAll(async () => {
  app = await startTestApp();
  siteId = (await aSite()).id;
  otherSiteId = (await aSite()).id;
});
afterAll(() => app.stop());

refusals(
  () => app,
  [
    {
      says: 'no session',
      who: null,
      ask: () => ['get', '/api/audit-events'],
      code: 'sessions.required',
      status: 401,
    },
    {
      says: 'a technician',
      who: 'technician',
      ask: () => ['get', '/api/audit-events'],
      code: 'audit-events.forbidden',
      status: 403,
    },
    {
      says: 'an operator',
      who: 'operator',
      ask: () => ['get', '/api/audit-events/integrity'],
      code: 'audit-events.forbidden',
      status: 403,
    },
    {
      says: 'a cursor of our own making',
      who: 'auditor',
      ask: () => ['get', '/api/audit-events?cursor=abc'],
      code: 'request.cursor-invalid',
      status: 422,
    },
    {
      says: 'a limit beyond the largest',
      who: 'auditor',
      ask: () => ['get', '/api/audit-events?limit=5000'],
      code: 'request.invalid',
      status: 422,
      issue: 'query.limit',
    },
  ],
);

describe('the trail', () => {
  it('is one unbroken chain when twenty writers write at once', async () => {
    await Promise.all(
      Array.from({ length: 20 }, (_, index) => record('probes.changed', { newValue: { index } })),
    );
    const report = await verifyChain(app.clock.now());
    expect(report).toMatchObject({ isUnbroken: true, firstBreak: null, events: await AuditEvent.count() });
  });

  it('keeps nothing of a change that was undone', async () => {
    const before = await AuditEvent.count();
    const undone = inTransaction(app.sequelize, async (transaction) => {
      await recordAuditEvent(app.parts, transaction, desk, {
        action: 'probes.changed',
        objectKind: 'probes',
        objectId: 1,
        siteId: null,
      });
      throw new Error('undone');
    });
    await expect(undone).rejects.toThrow('undone');
    expect(await AuditEvent.count()).toBe(before);
    expect((await verifyChain(app.clock.now())).isUnbroken).toBe(true);
  });

  it('hashes the same after a round trip through the database: numbers, umlauts, nesting, instants', async () => {
    await record('probes.changed', {
      newValue: {
        value: 0.1 + 0.2,
        tiny: 1e-21,
        text: 'Ä µS/cm “±”',
        nested: [{ at: app.clock.now(), none: undefined }],
      },
    });
    expect((await verifyChain(app.clock.now())).isUnbroken).toBe(true);
  });

  it('shows an auditor of one site that site’s events only, newest first, page by page', async () => {
    for (const [index, id] of [siteId, otherSiteId, siteId, siteId].entries())
      await record(`points.step-${index}`, { siteId: id });
    const auditor = await app.as({ role: 'auditor', siteId });
    const first = (await auditor.get('/api/audit-events?limit=2').expect(200)).body;
    expect(first.items.map((event: { action: string }) => event.action)).toEqual([
      'points.step-3',
      'points.step-2',
    ]);
    expect(first.total).toBe(3);
    const rest = (await auditor.get(`/api/audit-events?limit=2&cursor=${first.nextCursor}`).expect(200)).body;
    expect(rest.items.map((event: { action: string }) => event.action)).toEqual(['points.step-0']);
    expect(rest.nextCursor).toBeNull();
  });

  it('refuses the application every way of changing what is written', async () => {
    for (const attempt of [
      `UPDATE audit_events SET reason = 'x'`,
      'DELETE FROM audit_events',
      'TRUNCATE audit_events',
    ]) {
      await expect(app.sequelize.query(attempt)).rejects.toThrow(/permission denied/);
    }
  });
});

describe('a superuser who tampers is found', () => {
  const asSuperuser = async (sql: string) => {
    const client = new pg.Client({ connectionString: app.db.superuserUrl });
    await client.connect();
    try {
      await client.query('ALTER TABLE audit_events DISABLE TRIGGER audit_events_append_only');
      await client.query(sql);
      await client.query('ALTER TABLE audit_events ENABLE ALWAYS TRIGGER audit_events_append_only');
    } finally {
      await client.end();
    }
  };

  it('at the first event whose content was changed', async () => {
    const changed = await record('users.granted', { newValue: { role: 'operator' } });
    await record('users.granted');
    await asSuperuser(
      `UPDATE audit_events SET new_value = '{"role":"administrator"}' WHERE sequence = ${changed}`,
    );
    expect((await verifyChain(app.clock.now())).firstBreak).toEqual({
      sequence: changed,
      what: 'Its content was changed after it was written: the hash does not fit.',
    });
    await asSuperuser(
      `UPDATE audit_events SET new_value = '{"role":"operator"}' WHERE sequence = ${changed}`,
    );
    expect((await verifyChain(app.clock.now())).isUnbroken).toBe(true);
  });

  it('where an event was taken out', async () => {
    const gone = await record('probes.retired');
    await record('probes.noted');
    await asSuperuser(`DELETE FROM audit_events WHERE sequence = ${gone}`);
    const administrator = await app.as('administrator');
    const report = (await administrator.get('/api/audit-events/integrity').expect(200)).body;
    expect(report.isUnbroken).toBe(false);
    expect(report.firstBreak.what).toBe(`Event ${gone} is missing: after ${gone - 1} comes ${gone + 1}.`);
  });
});
