import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { Hold, Point, type Area, type Site } from '../../server/db/models/index.ts';
import { startTestApp, type TestApp } from '../support/app.ts';
import { refusals } from '../support/refusals.ts';
import { anArea, aPoint, aProbe, aSite, installed, requirements } from '../support/rows.ts';

let app: TestApp;
let site: Site;
let other: Site;
let area: Area;
let otherArea: Area;
let point: Point;
let occupied: Point;
let retired: Point;
let held: Point;

beforeAll(async () => {
  app = await startTestApp();
  site = await aSite({ name: 'Lower Weir' });
  other = await aSite({ name: 'Quarrybank' });
  area = await anArea(site.id, { name: 'CIP room' });
  otherArea = await anArea(other.id);
  const inArea = { areaId: area.id };
  point = await aPoint(site.id, { ...inArea, code: 'LWR-01' });
  occupied = await aPoint(site.id, { ...inArea, code: 'LWR-02' });
  retired = await aPoint(site.id, { ...inArea, code: 'LWR-03', retiredAt: new Date('2026-05-01T00:00:00Z') });
  held = await aPoint(site.id, { ...inArea, code: 'LWR-04' });
  const technician = await app.person('technician');
  await installed(await aProbe(site.id, { tag: 'cip-2' }), occupied, technician.id);
  await Hold.create({
    pointId: held.id,
    userId: technician.id,
    reason: 'electrode swap',
    fromAt: new Date('2026-12-01T11:00:00Z'),
    untilAt: new Date('2026-12-01T15:00:00Z'),
    endedAt: null,
  });
});
afterAll(() => app.stop());
beforeEach(() => {
  app.clock.set('2026-12-01T12:00:00Z');
  app.events.length = 0;
});

const body = () => ({ ...requirements, areaId: area.id, code: 'LWR-10' });
const hold = { reason: 'cleaning', untilAt: '2026-12-01T14:00:00Z' };
const change = { tolerancePercent: 2, reason: 'tighter rinse', version: 0 };
const why = { reason: 'line taken out', version: 0 };
const elsewhere = () => ({ role: 'manager' as const, siteId: other.id });

refusals(
  () => app,
  [
    {
      says: 'no session',
      who: null,
      ask: () => ['get', '/api/points'],
      code: 'sessions.required',
      status: 401,
    },
    {
      says: 'an operator adds none',
      who: 'operator',
      ask: () => ['post', '/api/points', body()],
      code: 'points.forbidden',
      status: 403,
    },
    {
      says: 'a technician changes no tolerance',
      who: 'technician',
      ask: () => ['patch', `/api/points/${point.id}`, change],
      code: 'points.forbidden',
      status: 403,
    },
    {
      says: 'an auditor holds none',
      who: 'auditor',
      ask: () => ['post', `/api/points/${point.id}/hold`, hold],
      code: 'points.forbidden',
      status: 403,
    },
    {
      says: 'an administrator releases none',
      who: 'administrator',
      ask: () => ['delete', `/api/points/${held.id}/hold`],
      code: 'points.forbidden',
      status: 403,
    },
    {
      says: 'a technician retires none',
      who: 'technician',
      ask: () => ['post', `/api/points/${point.id}/retire`, why],
      code: 'points.forbidden',
      status: 403,
    },
    {
      says: 'another site',
      who: elsewhere,
      ask: () => ['get', `/api/points/${point.id}`],
      code: 'points.not-found',
      status: 404,
    },
    {
      says: 'change at another site',
      who: elsewhere,
      ask: () => ['patch', `/api/points/${point.id}`, change],
      code: 'points.not-found',
      status: 404,
    },
    {
      says: 'an area of another site',
      who: elsewhere,
      ask: () => ['post', '/api/points', body()],
      code: 'areas.not-found',
      status: 404,
    },
    {
      says: 'a move to another site',
      who: 'manager',
      ask: () => ['patch', `/api/points/${point.id}`, { areaId: otherArea.id, reason: 'moved', version: 0 }],
      code: 'areas.not-found',
      status: 404,
    },
    {
      says: 'unknown id',
      who: 'manager',
      ask: () => ['get', '/api/points/99999'],
      code: 'points.not-found',
      status: 404,
    },
    {
      says: 'no such area',
      who: 'manager',
      ask: () => ['post', '/api/points', { ...body(), areaId: 99_999 }],
      code: 'areas.not-found',
      status: 404,
    },
    {
      says: 'a tolerance of nothing',
      who: 'manager',
      ask: () => ['post', '/api/points', { ...body(), tolerancePercent: 0 }],
      code: 'request.invalid',
      status: 422,
      issue: 'tolerancePercent',
    },
    {
      says: 'limits the wrong way round',
      who: 'manager',
      ask: () => ['post', '/api/points', { ...body(), lowLimitUsCm: 3000 }],
      code: 'request.invalid',
      status: 422,
      issue: 'highLimitUsCm',
    },
    {
      says: 'a low limit above the stored high one',
      who: 'manager',
      ask: () => [
        'patch',
        `/api/points/${point.id}`,
        { lowLimitUsCm: 3000, reason: 'new limit', version: 0 },
      ],
      code: 'request.invalid',
      status: 422,
      issue: 'highLimitUsCm',
    },
    {
      says: 'linear without its coefficient',
      who: 'manager',
      ask: () => [
        'patch',
        `/api/points/${point.id}`,
        { compensationCoefficientPercentPerK: null, reason: 'unknown', version: 0 },
      ],
      code: 'request.invalid',
      status: 422,
      issue: 'compensationCoefficientPercentPerK',
    },
    {
      says: 'natural water at 20 °C',
      who: 'manager',
      ask: () => [
        'post',
        '/api/points',
        { ...body(), compensationModel: 'natural-water', referenceTemperatureC: 20 },
      ],
      code: 'request.invalid',
      status: 422,
      issue: 'referenceTemperatureC',
    },
    {
      says: 'an unknown hazard',
      who: 'manager',
      ask: () => ['post', '/api/points', { ...body(), hazardTags: ['ghosts'] }],
      code: 'request.invalid',
      status: 422,
      issue: 'hazardTags.0',
    },
    {
      says: 'a hold until yesterday',
      who: 'operator',
      ask: () => ['post', `/api/points/${point.id}/hold`, { ...hold, untilAt: '2026-11-30T12:00:00Z' }],
      code: 'request.invalid',
      status: 422,
      issue: 'untilAt',
    },
    {
      says: 'a hold for two days',
      who: 'operator',
      ask: () => ['post', `/api/points/${point.id}/hold`, { ...hold, untilAt: '2026-12-03T12:00:00Z' }],
      code: 'request.invalid',
      status: 422,
      issue: 'untilAt',
    },
    {
      says: 'a code in use',
      who: 'manager',
      ask: () => ['post', '/api/points', { ...body(), code: 'lwr-01' }],
      code: 'points.code-taken',
      status: 409,
    },
    {
      says: 'an old version',
      who: 'manager',
      ask: () => ['patch', `/api/points/${point.id}`, { ...change, version: 9 }],
      code: 'points.changed-meanwhile',
      status: 409,
    },
    {
      says: 'a retired point',
      who: 'manager',
      ask: () => ['patch', `/api/points/${retired.id}`, change],
      code: 'points.retired',
      status: 409,
    },
    {
      says: 'a point with a probe is not retired',
      who: 'manager',
      ask: () => ['post', `/api/points/${occupied.id}/retire`, why],
      code: 'points.occupied',
      status: 409,
    },
    {
      says: 'a second hold',
      who: 'operator',
      ask: () => ['post', `/api/points/${held.id}/hold`, hold],
      code: 'points.already-held',
      status: 409,
    },
    {
      says: 'release of what nobody holds',
      who: 'operator',
      ask: () => ['delete', `/api/points/${point.id}/hold`],
      code: 'points.not-held',
      status: 409,
    },
    {
      says: 'a cursor of another list',
      who: 'manager',
      ask: () => ['get', '/api/points?cursor=WyJhIiwxXQ'],
      code: 'request.cursor-invalid',
      status: 422,
    },
  ],
);

describe('measuring points', () => {
  it('lists them by site, area and code, without the retired ones unless asked', async () => {
    const agent = await app.as('operator');
    const { body: inUse } = await agent.get(`/api/points?siteId=${site.id}`).expect(200);
    expect(inUse.items.map((one: { code: string }) => one.code)).toEqual(['LWR-01', 'LWR-02', 'LWR-04']);
    expect(inUse.items[1].probe).toMatchObject({ tag: 'cip-2', since: '2026-03-01T08:00:00.000Z' });

    const { body: all } = await agent.get(`/api/points?siteId=${site.id}&retired=1`).expect(200);
    expect(all.items.map((one: { code: string }) => one.code)).toContain('LWR-03');
    const { body: free } = await agent.get(`/api/points?siteId=${site.id}&free=1`).expect(200);
    expect(free.items.map((one: { code: string }) => one.code)).toEqual(['LWR-01', 'LWR-04']);
    const { body: found } = await agent.get('/api/points?q=cip-2').expect(200);
    expect(found.items.map((one: { code: string }) => one.code)).toEqual(['LWR-02']);
  });

  it('pages through the same order', async () => {
    const agent = await app.as('operator');
    const codes: string[] = [];
    let cursor: string | null = '';
    while (cursor !== null) {
      const page: { body: { items: { code: string }[]; nextCursor: string | null } } = await agent
        .get(`/api/points?siteId=${site.id}&limit=2${cursor && `&cursor=${cursor}`}`)
        .expect(200);
      codes.push(...page.body.items.map((one) => one.code));
      cursor = page.body.nextCursor;
    }
    expect(codes).toEqual(['LWR-01', 'LWR-02', 'LWR-04']);
  });

  it('takes a wildcard in a search literally', async () => {
    const agent = await app.as('operator');
    const { body: found } = await agent.get('/api/points?q=%25').expect(200);
    expect(found.total).toBe(0);
  });

  it('creates a point with its requirements', async () => {
    const agent = await app.as('manager');

    const { body: made } = await agent.post('/api/points').send(body()).expect(201);

    expect(made).toMatchObject({
      ...requirements,
      code: 'LWR-10',
      siteId: site.id,
      areaName: 'CIP room',
      probe: null,
      hold: null,
      can: { change: true, install: true, hold: true, release: false, retire: true },
    });
    expect(await Point.findByPk(made.id)).toMatchObject({ tolerancePercent: 3, decisionRule: 'guarded-u' });
    expect(await app.audited('points.created')).toMatchObject({ objectId: String(made.id), siteId: site.id });
    expect(app.events).toContainEqual({ slice: 'points', id: made.id, kind: 'created', siteId: site.id });
  });

  it('changes a tolerance with old value, new value and reason', async () => {
    const agent = await app.as('manager');
    const before = await aPoint(site.id, { areaId: area.id });

    const { body: after } = await agent.patch(`/api/points/${before.id}`).send(change).expect(200);

    expect(after).toMatchObject({ tolerancePercent: 2, version: 1 });
    expect(await app.audited('points.changed')).toMatchObject({
      objectId: String(before.id),
      objectVersion: 1,
      oldValue: { tolerancePercent: 3 },
      newValue: { tolerancePercent: 2 },
      reason: 'tighter rinse',
      actingRole: 'manager',
    });
    expect(app.events.map(({ slice }) => slice)).toEqual(['points', 'sites', 'readings']);
  });

  it('lets one of two simultaneous changes win', async () => {
    const agent = await app.as('manager');
    const one = await aPoint(site.id, { areaId: area.id });

    const answers = await Promise.all(
      [1, 2].map((tolerancePercent) =>
        agent.patch(`/api/points/${one.id}`).send({ tolerancePercent, reason: 'race', version: 0 }),
      ),
    );

    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
    const winner = answers.find(({ status }) => status === 200)!.body;
    expect((await Point.findByPk(one.id))?.tolerancePercent).toBe(winner.tolerancePercent);
  });

  it('retires a free point and ends its hold', async () => {
    const agent = await app.as('manager');
    const old = await aPoint(site.id, { areaId: area.id });
    await agent.post(`/api/points/${old.id}/hold`).send(hold).expect(201);

    const { body: after } = await agent.post(`/api/points/${old.id}/retire`).send(why).expect(200);

    expect(after).toMatchObject({
      retiredAt: '2026-12-01T12:00:00.000Z',
      hold: null,
      can: { install: false, hold: false },
    });
    expect(await Hold.findOne({ where: { pointId: old.id, endedAt: null } })).toBeNull();
    expect(await app.audited('points.retired')).toMatchObject({
      objectId: String(old.id),
      reason: 'line taken out',
    });
  });
});

describe('holding a point', () => {
  it('shows who holds it and until when, and lets another person release it', async () => {
    const mine = await aPoint(site.id, { areaId: area.id });
    const operator = await app.as('operator');

    const { body: taken } = await operator.post(`/api/points/${mine.id}/hold`).send(hold).expect(201);
    expect(taken.hold).toEqual({
      userId: (await app.person('operator')).id,
      userName: 'Test operator',
      reason: 'cleaning',
      fromAt: '2026-12-01T12:00:00.000Z',
      untilAt: '2026-12-01T14:00:00.000Z',
    });
    expect(taken.can).toMatchObject({ hold: false, release: true });
    expect(app.events.map(({ slice, id }) => [slice, id])).toEqual([
      ['points', mine.id],
      ['readings', mine.id],
    ]);
    expect(await app.audited('points.held')).toMatchObject({ objectId: String(mine.id), reason: 'cleaning' });

    app.clock.advance(30 * 60_000);
    const { body: freed } = await (
      await app.as('technician')
    )
      .delete(`/api/points/${mine.id}/hold`)
      .expect(200);

    expect(freed.hold).toBeNull();
    expect((await Hold.findOne({ where: { pointId: mine.id } }))?.endedAt).toEqual(
      new Date('2026-12-01T12:30:00Z'),
    );
    expect(await app.audited('points.released')).toMatchObject({
      oldValue: { reason: 'cleaning' },
      actingRole: 'technician',
    });
  });

  it('runs out by itself and can then be taken again', async () => {
    const mine = await aPoint(site.id, { areaId: area.id });
    const operator = await app.as('operator');
    await operator.post(`/api/points/${mine.id}/hold`).send(hold).expect(201);

    app.clock.set('2026-12-01T14:00:00Z');
    const { body: later } = await operator.get(`/api/points/${mine.id}`).expect(200);
    expect(later.hold).toBeNull();
    expect(later.can.release).toBe(false);

    await operator
      .post(`/api/points/${mine.id}/hold`)
      .send({ ...hold, untilAt: '2026-12-01T16:00:00Z' })
      .expect(201);
    const rows = await Hold.findAll({ where: { pointId: mine.id }, order: [['id', 'ASC']] });
    expect(rows.map(({ endedAt }) => endedAt?.toISOString() ?? null)).toEqual([
      '2026-12-01T14:00:00.000Z',
      null,
    ]);
  });
});
