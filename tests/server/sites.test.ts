import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { Area, Site } from '../../server/db/models/index.ts';
import { startTestApp, type TestApp } from '../support/app.ts';
import { refusals } from '../support/refusals.ts';
import { anArea, aPoint, aProbe, aSite } from '../support/rows.ts';

let app: TestApp;
let site: Site;
let other: Site;
let area: Area;

beforeAll(async () => {
  app = await startTestApp();
  site = await aSite({ code: 'LWR', name: 'Lower Weir' });
  other = await aSite({ code: 'QBK', name: 'Quarrybank' });
  area = await anArea(site.id, { name: 'CIP room' });
});
afterAll(() => app.stop());
beforeEach(() => {
  app.events.length = 0;
});

const aRequest = { code: 'HFN', name: 'Hollow Fen', timeZone: 'Europe/London' };
const change = { name: 'Lower Weir dairy', reason: 'full name', version: 0 };

refusals(
  () => app,
  [
    {
      says: 'no session',
      who: null,
      ask: () => ['get', '/api/sites'],
      code: 'sessions.required',
      status: 401,
    },
    {
      says: 'a manager adds no site',
      who: 'manager',
      ask: () => ['post', '/api/sites', aRequest],
      code: 'sites.forbidden',
      status: 403,
    },
    {
      says: 'an administrator of one site adds no site',
      who: () => ({ role: 'administrator', siteId: site.id }),
      ask: () => ['post', '/api/sites', aRequest],
      code: 'sites.forbidden',
      status: 403,
    },
    {
      says: 'a technician changes no site',
      who: 'technician',
      ask: () => ['patch', `/api/sites/${site.id}`, change],
      code: 'sites.forbidden',
      status: 403,
    },
    {
      says: 'an operator adds no area',
      who: 'operator',
      ask: () => ['post', `/api/sites/${site.id}/areas`, { name: 'Hall' }],
      code: 'sites.forbidden',
      status: 403,
    },
    {
      says: 'another site',
      who: () => ({ role: 'manager', siteId: other.id }),
      ask: () => ['get', `/api/sites/${site.id}`],
      code: 'sites.not-found',
      status: 404,
    },
    {
      says: 'change of another site',
      who: () => ({ role: 'manager', siteId: other.id }),
      ask: () => ['patch', `/api/sites/${site.id}`, change],
      code: 'sites.not-found',
      status: 404,
    },
    {
      says: 'area of another site',
      who: () => ({ role: 'manager', siteId: other.id }),
      ask: () => ['patch', `/api/areas/${area.id}`, { name: 'x', reason: 'renamed' }],
      code: 'areas.not-found',
      status: 404,
    },
    {
      says: 'unknown id',
      who: 'manager',
      ask: () => ['get', '/api/sites/99999'],
      code: 'sites.not-found',
      status: 404,
    },
    {
      says: 'an id that is none',
      who: 'manager',
      ask: () => ['get', '/api/sites/weir'],
      code: 'request.not-found',
      status: 404,
    },
    {
      says: 'unknown area',
      who: 'manager',
      ask: () => ['patch', '/api/areas/99999', { name: 'x', reason: 'renamed' }],
      code: 'areas.not-found',
      status: 404,
    },
    {
      says: 'a code in words',
      who: 'administrator',
      ask: () => ['post', '/api/sites', { ...aRequest, code: 'lower weir' }],
      code: 'request.invalid',
      status: 422,
      issue: 'code',
    },
    {
      says: 'an unknown time zone',
      who: 'administrator',
      ask: () => ['post', '/api/sites', { ...aRequest, timeZone: 'Mars/Olympus' }],
      code: 'request.invalid',
      status: 422,
      issue: 'timeZone',
    },
    {
      says: 'a name with a line break',
      who: 'administrator',
      ask: () => ['post', '/api/sites', { ...aRequest, name: 'Hollow\nFen' }],
      code: 'request.invalid',
      status: 422,
      issue: 'name',
    },
    {
      says: 'a change without a reason',
      who: 'manager',
      ask: () => ['patch', `/api/sites/${site.id}`, { name: 'x', version: 0 }],
      code: 'request.invalid',
      status: 422,
      issue: 'reason',
    },
    {
      says: 'a code in use, in other letters',
      who: 'administrator',
      ask: () => ['post', '/api/sites', { ...aRequest, code: 'lwr' }],
      code: 'sites.code-taken',
      status: 409,
    },
    {
      says: 'an area name in use',
      who: 'manager',
      ask: () => ['post', `/api/sites/${site.id}/areas`, { name: 'CIP room' }],
      code: 'sites.area-taken',
      status: 409,
    },
    {
      says: 'an old version',
      who: 'manager',
      ask: () => ['patch', `/api/sites/${site.id}`, { ...change, version: 7 }],
      code: 'sites.changed-meanwhile',
      status: 409,
    },
    {
      says: 'a cursor of another list',
      who: 'manager',
      ask: () => ['get', '/api/sites?cursor=WzFd'],
      code: 'request.cursor-invalid',
      status: 422,
    },
  ],
);

describe('sites', () => {
  it('lists the sites a person has a role at, with what stands in them', async () => {
    const point = await aPoint(site.id, { areaId: area.id });
    await aPoint(site.id, { areaId: area.id, retiredAt: new Date('2026-05-01T00:00:00Z') });
    await aProbe(site.id);
    const agent = await app.as({ role: 'operator', siteId: site.id });

    const { body } = await agent.get('/api/sites').expect(200);

    expect(body).toMatchObject({ total: 1, nextCursor: null });
    expect(body.items).toEqual([
      expect.objectContaining({ code: 'LWR', pointCount: 1, probeCount: 1, timeZone: 'Europe/London' }),
    ]);
    expect(body.items[0].areas).toEqual([
      { id: point.areaId, siteId: site.id, name: 'CIP room', position: 0, pointCount: 1 },
    ]);
    expect(body.items[0].can).toEqual({
      change: false,
      addArea: false,
      addPoint: false,
      registerProbe: false,
    });
  });

  it('pages through sites by name without repeating or losing one', async () => {
    const agent = await app.as('manager');
    const all = await agent.get('/api/sites').expect(200);
    const names: string[] = [];
    let cursor: string | null = '';
    while (cursor !== null) {
      const page: { body: { items: { name: string }[]; total: number; nextCursor: string | null } } =
        await agent.get(`/api/sites?limit=1${cursor && `&cursor=${cursor}`}`).expect(200);
      expect(page.body.total).toBe(all.body.total);
      names.push(...page.body.items.map((one) => one.name));
      cursor = page.body.nextCursor;
    }
    expect(names).toEqual(all.body.items.map((one: { name: string }) => one.name));
    expect(names).toEqual([...names].sort());
  });

  it('adds a site, writes it into the trail and tells everybody', async () => {
    const agent = await app.as('administrator');

    const { body } = await agent.post('/api/sites').send(aRequest).expect(201);

    expect(body).toMatchObject({ ...aRequest, areas: [], version: 0, can: { change: true } });
    expect(await Site.findByPk(body.id)).toMatchObject({ code: 'HFN', name: 'Hollow Fen' });
    expect(await app.audited('sites.created')).toMatchObject({
      objectId: String(body.id),
      siteId: body.id,
      actingRole: 'administrator',
      newValue: aRequest,
    });
    expect(app.events).toEqual([{ slice: 'sites', id: body.id, kind: 'created', siteId: null }]);
  });

  it('changes a name with its reason, old value and next version', async () => {
    const agent = await app.as('manager');

    const { body } = await agent
      .patch(`/api/sites/${other.id}`)
      .send({ ...change, name: 'Quarrybank boilers' })
      .expect(200);

    expect(body).toMatchObject({ name: 'Quarrybank boilers', version: 1 });
    expect(await app.audited('sites.changed')).toMatchObject({
      objectVersion: 1,
      oldValue: { name: 'Quarrybank' },
      newValue: { name: 'Quarrybank boilers' },
      reason: 'full name',
    });
    expect(app.events).toEqual([{ slice: 'sites', id: other.id, kind: 'changed', siteId: other.id }]);
  });

  it('leaves no trace of a change that changes nothing', async () => {
    const agent = await app.as('manager');
    const before = await app.auditCount();
    const { name, version } = (await Site.findByPk(site.id))!;

    const { body } = await agent
      .patch(`/api/sites/${site.id}`)
      .send({ name, reason: 'no change', version })
      .expect(200);

    expect(body.version).toBe(version);
    expect(await app.auditCount()).toBe(before);
    expect(app.events).toEqual([]);
  });

  it('puts a new area behind the others and renames it with a reason', async () => {
    const agent = await app.as('manager');
    const added = await agent.post(`/api/sites/${site.id}/areas`).send({ name: 'Tank farm' }).expect(201);
    expect(added.body).toMatchObject({ siteId: site.id, name: 'Tank farm', position: 1, pointCount: 0 });
    expect(app.events.map(({ slice, kind }) => `${slice} ${kind}`)).toEqual([
      'areas created',
      'sites changed',
    ]);

    const renamed = await agent
      .patch(`/api/areas/${added.body.id}`)
      .send({ name: 'Silo hall', reason: 'silos came' })
      .expect(200);

    expect(renamed.body.name).toBe('Silo hall');
    expect((await Area.findByPk(added.body.id))?.name).toBe('Silo hall');
    expect(await app.audited('areas.renamed')).toMatchObject({
      siteId: site.id,
      oldValue: { name: 'Tank farm' },
      newValue: { name: 'Silo hall' },
      reason: 'silos came',
    });
  });
});
