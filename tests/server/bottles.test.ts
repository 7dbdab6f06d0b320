import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { Bottle, type Site, type Standard } from '../../server/db/models/index.ts';
import { startTestApp, type TestApp } from '../support/app.ts';
import { refusals } from '../support/refusals.ts';
import { aBottle, aSite, aStandard } from '../support/rows.ts';

let app: TestApp;
let site: Site;
let other: Site;
let lot: Standard;
let recalled: Standard;
let bottle: Bottle;
let elsewhere: Bottle;
let ofRecalled: Bottle;
let gone: Bottle;

beforeAll(async () => {
  app = await startTestApp();
  site = await aSite();
  other = await aSite();
  lot = await aStandard({ code: 'KC-26-031', openedLifeDays: 30, expiresOn: '2027-03-31' });
  recalled = await aStandard({ code: 'KC-25-077', state: 'recalled' });
  bottle = await aBottle(lot.id, { code: 'KC-26-031/01', siteId: site.id });
  elsewhere = await aBottle(lot.id, { code: 'KC-26-031/02', siteId: other.id });
  ofRecalled = await aBottle(recalled.id);
  gone = await aBottle(lot.id, {
    code: 'KC-26-031/03',
    discardedAt: new Date('2026-11-01T09:00:00Z'),
    discardedReason: 'cap was broken',
  });
});
afterAll(() => app.stop());
beforeEach(() => {
  app.clock.set('2026-12-01T12:00:00Z');
  app.events.length = 0;
});

const delivery = () => ({ standardId: lot.id, siteId: site.id, count: 2, volumeMl: 500 });
const here = (role: 'technician' | 'operator' | 'manager') => () => ({ role, siteId: site.id });

refusals(
  () => app,
  [
    {
      says: 'no session',
      who: null,
      ask: () => ['get', '/api/bottles'],
      code: 'sessions.required',
      status: 401,
    },
    {
      says: 'an operator receives none',
      who: here('operator'),
      ask: () => ['post', '/api/bottles', delivery()],
      code: 'bottles.forbidden',
      status: 403,
    },
    {
      says: 'an auditor opens none',
      who: 'auditor',
      ask: () => ['post', `/api/bottles/${bottle.id}/open`, { version: 0 }],
      code: 'bottles.forbidden',
      status: 403,
    },
    {
      says: 'another site’s bottle is not to be told from a missing one',
      who: here('technician'),
      ask: () => ['get', `/api/bottles/${elsewhere.id}`],
      code: 'bottles.not-found',
      status: 404,
    },
    {
      says: 'another site’s bottle is not opened',
      who: here('technician'),
      ask: () => ['post', `/api/bottles/${elsewhere.id}/open`, { version: 0 }],
      code: 'bottles.not-found',
      status: 404,
    },
    {
      says: 'another site receives nothing from here',
      who: here('manager'),
      ask: () => ['post', '/api/bottles', { ...delivery(), siteId: other.id }],
      code: 'sites.not-found',
      status: 404,
    },
    {
      says: 'bottles of an unknown lot',
      who: 'manager',
      ask: () => ['post', '/api/bottles', { ...delivery(), standardId: 99_999 }],
      code: 'standards.not-found',
      status: 404,
    },
    {
      says: 'no bottle at all',
      who: 'manager',
      ask: () => ['post', '/api/bottles', { ...delivery(), count: 0 }],
      code: 'request.invalid',
      status: 422,
      issue: 'count',
    },
    {
      says: 'a bottle of a recalled lot stays shut',
      who: 'technician',
      ask: () => ['post', `/api/bottles/${ofRecalled.id}/open`, { version: 0 }],
      code: 'bottles.unusable',
      status: 409,
    },
    {
      says: 'a discarded bottle is not opened',
      who: 'technician',
      ask: () => ['post', `/api/bottles/${gone.id}/open`, { version: 0 }],
      code: 'bottles.discarded',
      status: 409,
    },
    {
      says: 'nothing is taken from a shut bottle',
      who: 'technician',
      ask: () => ['post', `/api/bottles/${bottle.id}/remaining`, { remainingMl: 100, version: 0 }],
      code: 'bottles.not-open',
      status: 409,
    },
    {
      says: 'an old version',
      who: 'technician',
      ask: () => ['post', `/api/bottles/${bottle.id}/discard`, { reason: 'spilled', version: 7 }],
      code: 'bottles.changed-meanwhile',
      status: 409,
    },
    {
      says: 'discarding without a reason',
      who: 'technician',
      ask: () => ['post', `/api/bottles/${bottle.id}/discard`, { version: 0 }],
      code: 'request.invalid',
      status: 422,
      issue: 'reason',
    },
  ],
);

describe('bottles', () => {
  it('are numbered on from the last one of their lot', async () => {
    const agent = await app.as({ role: 'technician', siteId: site.id });

    const { body } = await agent.post('/api/bottles').send(delivery()).expect(201);

    expect(body.items.map((one: { code: string }) => one.code)).toEqual(['KC-26-031/04', 'KC-26-031/05']);
    expect(body.items[0]).toMatchObject({
      lotCode: 'KC-26-031',
      siteId: site.id,
      remainingMl: 500,
      openedAt: null,
      useByOn: '2027-03-31',
      isUsable: true,
      can: { open: true, setRemaining: false, discard: true },
    });
    expect(await app.audited('bottles.received')).toMatchObject({
      objectKind: 'standards',
      newValue: { codes: ['KC-26-031/04', 'KC-26-031/05'], volumeMl: 500 },
    });
    expect(app.events).toEqual([
      { slice: 'bottles', id: body.items[0].id, kind: 'created', siteId: site.id },
    ]);
  });

  it('are used up within their time after opening, and never beyond the lot', async () => {
    const agent = await app.as({ role: 'technician', siteId: site.id });
    const early = await aBottle(lot.id, { siteId: site.id });
    const { body } = await agent.post(`/api/bottles/${early.id}/open`).send({ version: 0 }).expect(200);
    expect(body).toMatchObject({
      openedAt: '2026-12-01T12:00:00.000Z',
      openedBy: 'Test technician',
      useByOn: '2026-12-31',
      isUsable: true,
    });
    expect(await app.audited('bottles.opened')).toMatchObject({
      oldValue: { openedAt: null },
      newValue: { useByOn: '2026-12-31' },
    });
    app.clock.set('2026-12-31T23:00:00Z');
    expect((await agent.get(`/api/bottles/${early.id}`)).body.isUsable).toBe(true);
    app.clock.set('2027-01-01T00:00:00Z');
    expect((await agent.get(`/api/bottles/${early.id}`)).body.isUsable).toBe(false);

    app.clock.set('2027-03-20T12:00:00Z');
    const late = await aBottle(lot.id, { siteId: site.id });
    const opened = await agent.post(`/api/bottles/${late.id}/open`).send({ version: 0 }).expect(200);
    expect(opened.body.useByOn).toBe('2027-03-31');
    const again = await agent.post(`/api/bottles/${late.id}/open`).send({ version: 1 });
    expect(again.body.code).toBe('bottles.opened-already');
  });

  it('only ever get emptier', async () => {
    const agent = await app.as('technician');
    const one = await aBottle(lot.id, { siteId: site.id });
    await agent.post(`/api/bottles/${one.id}/open`).send({ version: 0 }).expect(200);

    const less = await agent
      .post(`/api/bottles/${one.id}/remaining`)
      .send({ remainingMl: 320, version: 1 })
      .expect(200);
    const more = await agent.post(`/api/bottles/${one.id}/remaining`).send({ remainingMl: 400, version: 2 });

    expect(less.body.remainingMl).toBe(320);
    expect(more.status).toBe(422);
    expect(more.body.issues[0]).toMatchObject({ path: 'remainingMl' });
    expect((await Bottle.findByPk(one.id))?.remainingMl).toBe(320);
    expect(await app.audited('bottles.used')).toMatchObject({
      oldValue: { remainingMl: 500 },
      newValue: { remainingMl: 320 },
    });
  });

  it('stay in the list when discarded, with the reason', async () => {
    const agent = await app.as('technician');
    const one = await aBottle(lot.id, { siteId: site.id });
    const { body } = await agent
      .post(`/api/bottles/${one.id}/discard`)
      .send({ reason: 'left uncapped overnight', version: 0 })
      .expect(200);
    expect(body).toMatchObject({
      discardedReason: 'left uncapped overnight',
      isUsable: false,
      can: { open: false, setRemaining: false, discard: false },
    });
    expect(await app.audited('bottles.discarded')).toMatchObject({ reason: 'left uncapped overnight' });
    const usable = await agent.get(`/api/bottles?standardId=${lot.id}&usable=1`).expect(200);
    const all = await agent.get(`/api/bottles?standardId=${lot.id}`).expect(200);
    expect(usable.body.items.map((item: { id: number }) => item.id)).not.toContain(one.id);
    expect(all.body.items.map((item: { id: number }) => item.id)).toContain(one.id);
  });

  it('are listed at the sites one may read, and where they belong to none', async () => {
    const agent = await app.as({ role: 'operator', siteId: site.id });
    const { body } = await agent.get('/api/bottles?limit=500').expect(200);
    const siteIds = new Set(body.items.map((item: { siteId: number | null }) => item.siteId));
    expect(siteIds).toEqual(new Set([site.id, null]));
  });

  it('carry a label with their code to scan and the words of the lot', async () => {
    const inHouse = await aStandard({ code: 'IH-26-001', isInHouse: true });
    const one = await aBottle(inHouse.id, { code: 'IH-26-001/01' });
    const agent = await app.as('technician');
    const answer = await agent.get(`/api/bottles/${one.id}/label.svg`).buffer().expect(200);
    const svg = answer.text ?? (answer.body as Buffer).toString();
    expect(answer.headers['content-type']).toContain('image/svg+xml');
    expect(svg).toContain('IH-26-001/01');
    expect(svg).toContain('in-house, not certified');
    expect(svg).not.toContain('certified 1');
    // A QR code of that much text has 21 modules a side and four of white around it.
    expect(svg).toContain('viewBox="0 0 29 29"');
  });
});
