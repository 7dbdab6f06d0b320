import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import {
  Assignment,
  CellConstant,
  Device,
  type Probe,
  ProbeEvent,
  type Point,
  type Site,
  type Standard,
} from '../../server/db/models/index.ts';
import { siteOfProbe } from '../../server/features/probes/service.ts';
import { startTestApp, type TestApp } from '../support/app.ts';
import { refusals } from '../support/refusals.ts';
import {
  aCheck,
  aDevice,
  aLiveReading,
  aPoint,
  aProbe,
  aSite,
  aStandard,
  installed,
  nameplate,
} from '../support/rows.ts';

let app: TestApp;
let site: Site;
let other: Site;
let point: Point;
let occupied: Point;
let spare: Probe;
let standing: Probe;
let retired: Probe;
let lot: Standard;
let technicianId: number;

beforeAll(async () => {
  app = await startTestApp();
  site = await aSite({ name: 'Lower Weir' });
  other = await aSite({ name: 'Quarrybank' });
  technicianId = (await app.person('technician')).id;
  point = await aPoint(site.id, { code: 'LWR-01', name: 'Rinse return' });
  occupied = await aPoint(site.id, { code: 'LWR-02', name: 'Caustic return' });
  spare = await aProbe(site.id, { tag: 'spare-1', serial: 'SN-SPARE' });
  standing = await aProbe(site.id, { tag: 'cip-2', serial: 'SN-CIP-2' });
  await installed(standing, occupied, technicianId);
  retired = await aProbe(site.id, {
    tag: 'old-1',
    status: 'retired',
    retiredAt: new Date('2026-06-01T00:00:00Z'),
    retiredReason: 'cracked body',
  });
  lot = await aStandard();
});
afterAll(() => app.stop());
beforeEach(() => {
  app.clock.set('2026-12-01T12:00:00Z');
  app.events.length = 0;
});

const plate = () => ({ ...nameplate, serial: 'SN-NEW', tag: 'new-1', notes: null, siteId: site.id });
const install = () => ({ pointId: point.id, version: 0 });
const move = () => ({ pointId: point.id, reason: 'swap', version: 0 });
const why = { reason: 'bench test', version: 0 };
const elsewhere = () => ({ role: 'manager' as const, siteId: other.id });
const installRace = (tag: string) => aProbe(site.id, { tag });

refusals(
  () => app,
  [
    {
      says: 'no session',
      who: null,
      ask: () => ['get', '/api/probes'],
      code: 'sessions.required',
      status: 401,
    },
    {
      says: 'a technician registers none',
      who: 'technician',
      ask: () => ['post', '/api/probes', plate()],
      code: 'probes.forbidden',
      status: 403,
    },
    {
      says: 'an operator installs none',
      who: 'operator',
      ask: () => ['post', `/api/probes/${spare.id}/install`, install()],
      code: 'probes.forbidden',
      status: 403,
    },
    {
      says: 'an operator moves none',
      who: 'operator',
      ask: () => ['post', `/api/probes/${standing.id}/move`, move()],
      code: 'probes.forbidden',
      status: 403,
    },
    {
      says: 'an operator takes none out',
      who: 'operator',
      ask: () => ['post', `/api/probes/${standing.id}/remove`, why],
      code: 'probes.forbidden',
      status: 403,
    },
    {
      says: 'a technician retires none',
      who: 'technician',
      ask: () => ['post', `/api/probes/${spare.id}/retire`, why],
      code: 'probes.forbidden',
      status: 403,
    },
    {
      says: 'a technician changes none',
      who: 'technician',
      ask: () => ['patch', `/api/probes/${spare.id}`, { tag: 'x1', ...why }],
      code: 'probes.forbidden',
      status: 403,
    },
    {
      says: 'an auditor writes no note',
      who: 'auditor',
      ask: () => ['post', `/api/probes/${spare.id}/notes`, { text: 'seen' }],
      code: 'probes.forbidden',
      status: 403,
    },
    {
      says: 'another site',
      who: elsewhere,
      ask: () => ['get', `/api/probes/${spare.id}`],
      code: 'probes.not-found',
      status: 404,
    },
    {
      says: 'timeline of another site',
      who: elsewhere,
      ask: () => ['get', `/api/probes/${spare.id}/events`],
      code: 'probes.not-found',
      status: 404,
    },
    {
      says: 'change at another site',
      who: elsewhere,
      ask: () => ['patch', `/api/probes/${spare.id}`, { tag: 'x1', ...why }],
      code: 'probes.not-found',
      status: 404,
    },
    {
      says: 'registering at another site',
      who: elsewhere,
      ask: () => ['post', '/api/probes', plate()],
      code: 'sites.not-found',
      status: 404,
    },
    {
      says: 'a point of a site one may not read',
      who: () => ({ role: 'technician', siteId: other.id }),
      ask: () => ['post', `/api/probes/${standing.id}/move`, move()],
      code: 'probes.not-found',
      status: 404,
    },
    {
      says: 'unknown id',
      who: 'manager',
      ask: () => ['get', '/api/probes/99999'],
      code: 'probes.not-found',
      status: 404,
    },
    {
      says: 'install of an unknown probe',
      who: 'manager',
      ask: () => ['post', '/api/probes/99999/install', install()],
      code: 'probes.not-found',
      status: 404,
    },
    {
      says: 'an unknown point',
      who: 'manager',
      ask: () => ['post', `/api/probes/${spare.id}/install`, { pointId: 99_999, version: 0 }],
      code: 'points.not-found',
      status: 404,
    },
    {
      says: 'a range that ends before it starts',
      who: 'manager',
      ask: () => ['post', '/api/probes', { ...plate(), rangeHighUsCm: 0.5, rangeLowUsCm: 1 }],
      code: 'request.invalid',
      status: 422,
      issue: 'rangeHighUsCm',
    },
    {
      says: 'a low end above the stored high end',
      who: 'manager',
      ask: () => ['patch', `/api/probes/${spare.id}`, { rangeLowUsCm: 30_000, ...why }],
      code: 'request.invalid',
      status: 422,
      issue: 'rangeHighUsCm',
    },
    {
      says: 'a resolution of nothing',
      who: 'manager',
      ask: () => ['post', '/api/probes', { ...plate(), resolutionUsCm: 0 }],
      code: 'request.invalid',
      status: 422,
      issue: 'resolutionUsCm',
    },
    {
      says: 'a serial with a null character',
      who: 'manager',
      ask: () => ['post', '/api/probes', { ...plate(), serial: 'SN\u0000' }],
      code: 'request.invalid',
      status: 422,
      issue: 'serial',
    },
    {
      says: 'an empty note',
      who: 'manager',
      ask: () => ['post', `/api/probes/${spare.id}/notes`, { text: ' ' }],
      code: 'request.invalid',
      status: 422,
      issue: 'text',
    },
    {
      says: 'a serial in use, in other letters',
      who: 'manager',
      ask: () => ['post', '/api/probes', { ...plate(), serial: 'sn-spare' }],
      code: 'probes.serial-taken',
      status: 409,
    },
    {
      says: 'a tag in use',
      who: 'manager',
      ask: () => ['post', '/api/probes', { ...plate(), tag: 'spare-1' }],
      code: 'probes.tag-taken',
      status: 409,
    },
    {
      says: 'an old version',
      who: 'manager',
      ask: () => ['patch', `/api/probes/${spare.id}`, { tag: 'x1', reason: 'other', version: 4 }],
      code: 'probes.changed-meanwhile',
      status: 409,
    },
    {
      says: 'an installed probe is not installed again',
      who: 'technician',
      ask: () => ['post', `/api/probes/${standing.id}/install`, install()],
      code: 'probes.already-installed',
      status: 409,
    },
    {
      says: 'an occupied point',
      who: 'technician',
      ask: () => ['post', `/api/probes/${spare.id}/install`, { ...install(), pointId: occupied.id }],
      code: 'points.occupied',
      status: 409,
    },
    {
      says: 'a move to where it stands',
      who: 'technician',
      ask: () => ['post', `/api/probes/${standing.id}/move`, { ...move(), pointId: occupied.id }],
      code: 'points.occupied',
      status: 409,
    },
    {
      says: 'a move of what stands nowhere',
      who: 'technician',
      ask: () => ['post', `/api/probes/${spare.id}/move`, move()],
      code: 'probes.not-installed',
      status: 409,
    },
    {
      says: 'a removal of what stands nowhere',
      who: 'technician',
      ask: () => ['post', `/api/probes/${spare.id}/remove`, why],
      code: 'probes.not-installed',
      status: 409,
    },
    {
      says: 'a retired probe',
      who: 'technician',
      ask: () => ['post', `/api/probes/${retired.id}/install`, install()],
      code: 'probes.retired',
      status: 409,
    },
    {
      says: 'an installation tomorrow',
      who: 'technician',
      ask: () => ['post', `/api/probes/${spare.id}/install`, { ...install(), at: '2026-12-02T12:00:00Z' }],
      code: 'probes.time-impossible',
      status: 422,
    },
    {
      says: 'a move before the last one',
      who: 'technician',
      ask: () => ['post', `/api/probes/${standing.id}/move`, { ...move(), at: '2026-02-01T12:00:00Z' }],
      code: 'probes.time-impossible',
      status: 422,
    },
    {
      says: 'a cursor of another order',
      who: 'manager',
      ask: () => ['get', '/api/probes?sort=lastSeen&cursor=WyJhIiwxXQ'],
      code: 'request.cursor-invalid',
      status: 422,
    },
    {
      says: 'an order that is none',
      who: 'manager',
      ask: () => ['get', '/api/probes?sort=colour'],
      code: 'request.invalid',
      status: 422,
      issue: 'query.sort',
    },
  ],
);

describe('registering and changing', () => {
  it('registers a probe as a spare with its nameplate constant in use', async () => {
    const agent = await app.as('manager');

    const { body } = await agent.post('/api/probes').send(plate()).expect(201);

    expect(body).toMatchObject({
      tag: 'new-1',
      status: 'spare',
      cellConstantPerCm: 1,
      placement: null,
      device: null,
      reading: null,
      strip: null,
      notes: null,
      trust: { level: 'no-signal', reason: 'no-device' },
      can: { install: true, move: false, remove: false, issueCredentials: false },
    });
    expect(body.cellConstants).toEqual([
      {
        cellConstantPerCm: 1,
        fromAt: '2026-12-01T12:00:00.000Z',
        origin: 'registered',
        by: 'Test manager',
        reason: null,
      },
    ]);
    expect(await ProbeEvent.findOne({ where: { probeId: body.id } })).toMatchObject({ kind: 'registered' });
    expect(await app.audited('probes.registered')).toMatchObject({
      objectId: String(body.id),
      siteId: site.id,
      newValue: expect.objectContaining({ serial: 'SN-NEW', nominalCellConstantPerCm: 1 }),
    });
    expect(app.events).toEqual([
      { slice: 'probes', id: body.id, kind: 'created', siteId: site.id },
      { slice: 'sites', id: site.id, kind: 'changed', siteId: site.id },
    ]);
  });

  it('corrects a mistyped nominal constant, and the one in use with it', async () => {
    const agent = await app.as('manager');
    const probe = await aProbe(site.id);

    const { body } = await agent
      .patch(`/api/probes/${probe.id}`)
      .send({ nominalCellConstantPerCm: 0.1, notes: 'bench spare', reason: 'misread nameplate', version: 0 })
      .expect(200);

    expect(body).toMatchObject({
      nominalCellConstantPerCm: 0.1,
      cellConstantPerCm: 0.1,
      notes: 'bench spare',
      version: 1,
    });
    expect(body.cellConstants.map((one: { cellConstantPerCm: number }) => one.cellConstantPerCm)).toEqual([
      0.1, 1,
    ]);
    expect(await app.audited('probes.changed')).toMatchObject({
      oldValue: { nominalCellConstantPerCm: 1, notes: '' },
      newValue: { nominalCellConstantPerCm: 0.1, notes: 'bench spare' },
      reason: 'misread nameplate',
    });
    expect(app.events.map(({ slice }) => slice)).toEqual(['probes', 'readings']);
  });

  it('leaves a calibrated constant alone when the nameplate is corrected', async () => {
    const agent = await app.as('manager');
    const probe = await aProbe(site.id, { cellConstantPerCm: 1.021 });
    await CellConstant.create({
      probeId: probe.id,
      cellConstantPerCm: 1.021,
      fromAt: new Date('2026-06-01T00:00:00Z'),
      origin: 'calibration',
      reason: null,
      userId: technicianId,
    });

    const { body } = await agent
      .patch(`/api/probes/${probe.id}`)
      .send({ nominalCellConstantPerCm: 1.05, reason: 'misread nameplate', version: 0 })
      .expect(200);

    expect(body).toMatchObject({ nominalCellConstantPerCm: 1.05, cellConstantPerCm: 1.021 });
  });

  it('writes a note into the timeline and the trail', async () => {
    const agent = await app.as('operator');

    const { body } = await agent
      .post(`/api/probes/${spare.id}/notes`)
      .send({ text: 'gland leaks' })
      .expect(201);

    expect(body).toMatchObject({ kind: 'note', title: 'gland leaks', by: 'Test operator', strip: null });
    expect(await app.audited('probes.note-added')).toMatchObject({ newValue: { text: 'gland leaks' } });
    const { body: timeline } = await agent.get(`/api/probes/${spare.id}/events`).expect(200);
    expect(timeline.items[0]).toEqual(body);
  });
});

describe('installing, moving, taking out', () => {
  it('installs a spare at a free point', async () => {
    const agent = await app.as('technician');
    const free = await aPoint(site.id, { name: 'Final rinse' });
    const probe = await aProbe(site.id);

    const { body } = await agent
      .post(`/api/probes/${probe.id}/install`)
      .send({ pointId: free.id, at: '2026-12-01T09:30:00Z', note: 'new gasket', version: 0 })
      .expect(200);

    expect(body).toMatchObject({
      status: 'in-service',
      version: 1,
      can: { install: false, move: true, remove: true },
    });
    expect(body.placement).toMatchObject({
      pointId: free.id,
      pointName: 'Final rinse',
      fromAt: '2026-12-01T09:30:00.000Z',
      toAt: null,
    });
    expect(await Assignment.findOne({ where: { probeId: probe.id } })).toMatchObject({
      note: 'new gasket',
      installedBy: technicianId,
    });
    expect(await app.audited('probes.installed')).toMatchObject({
      objectId: String(probe.id),
      oldValue: { pointId: null, status: 'spare' },
      newValue: { pointId: free.id, status: 'in-service', note: 'new gasket' },
      capturedAt: new Date('2026-12-01T09:30:00Z'),
      receivedAt: new Date('2026-12-01T12:00:00Z'),
    });
    expect(app.events.map(({ slice, id, siteId }) => [slice, id, siteId])).toEqual([
      ['points', free.id, site.id],
      ['probes', probe.id, site.id],
      ['readings', probe.id, site.id],
      ['sites', site.id, site.id],
    ]);
  });

  it('moves to another site at one moment and keeps credentials and history', async () => {
    const agent = await app.as('technician');
    const from = await aPoint(site.id, { name: 'Feed' });
    const to = await aPoint(other.id, { name: 'Condensate' });
    const probe = await aProbe(site.id);
    await installed(probe, from, technicianId);
    const device = await aDevice(probe.id);
    await aCheck({ probeId: probe.id, pointId: from.id, standardId: lot.id });

    const { body } = await agent
      .post(`/api/probes/${probe.id}/move`)
      .send({ pointId: to.id, reason: 'replaces a broken one', version: 0 })
      .expect(200);

    expect(body).toMatchObject({
      siteId: other.id,
      siteName: 'Quarrybank',
      device: { id: device.id, revokedAt: null },
    });
    expect(
      body.placements.map((one: { pointName: string; fromAt: string; toAt: string | null }) => [
        one.pointName,
        one.fromAt,
        one.toAt,
      ]),
    ).toEqual([
      ['Condensate', '2026-12-01T12:00:00.000Z', null],
      ['Feed', '2026-03-01T08:00:00.000Z', '2026-12-01T12:00:00.000Z'],
    ]);
    expect(await siteOfProbe(app.parts, probe.id)).toBe(other.id);
    expect(await app.audited('probes.moved')).toMatchObject({
      siteId: other.id,
      oldValue: { pointId: from.id, siteId: site.id },
      newValue: { pointId: to.id, siteId: other.id },
      reason: 'replaces a broken one',
    });
    const told = app.events.map(({ slice, id, siteId }) => [slice, id, siteId]);
    expect(told).toContainEqual(['points', from.id, site.id]);
    expect(told).toContainEqual(['points', to.id, other.id]);
    for (const { id } of [site, other]) expect(told).toContainEqual(['probes', probe.id, id]);
    const { body: timeline } = await agent.get(`/api/probes/${probe.id}/events`).expect(200);
    expect(timeline.items.map((one: { kind: string }) => one.kind)).toEqual(['moved', 'check']);
  });

  it('does not move half way: a move to an occupied point leaves the probe where it stood', async () => {
    const agent = await app.as('technician');
    const from = await aPoint(site.id);
    const probe = await aProbe(site.id);
    await installed(probe, from, technicianId);

    await agent
      .post(`/api/probes/${probe.id}/move`)
      .send({ ...move(), pointId: occupied.id })
      .expect(409);

    expect(await Assignment.findAll({ where: { probeId: probe.id } })).toMatchObject([
      { pointId: from.id, toAt: null },
    ]);
    expect(app.events).toEqual([]);
  });

  it('gives a free point to one of two probes that come at once', async () => {
    const agent = await app.as('technician');
    const free = await aPoint(site.id);
    const probes = await Promise.all([installRace('race-1'), installRace('race-2')]);

    const answers = await Promise.all(
      probes.map(({ id }) => agent.post(`/api/probes/${id}/install`).send({ pointId: free.id, version: 0 })),
    );

    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
    expect(answers.find(({ status }) => status === 409)!.body.code).toBe('points.occupied');
    expect(await Assignment.count({ where: { pointId: free.id, toAt: null } })).toBe(1);
  });

  it('takes a probe out and puts another in at the same moment', async () => {
    const agent = await app.as('technician');
    const place = await aPoint(site.id);
    const [first, second] = [await aProbe(site.id), await aProbe(site.id)];
    await installed(first, place, technicianId);

    const { body } = await agent.post(`/api/probes/${first.id}/remove`).send(why).expect(200);
    expect(body).toMatchObject({ status: 'spare', placement: null, siteId: site.id });
    expect(await app.audited('probes.removed')).toMatchObject({
      oldValue: { pointId: place.id },
      newValue: { pointId: null },
      reason: 'bench test',
    });

    await agent.post(`/api/probes/${second.id}/install`).send({ pointId: place.id, version: 0 }).expect(200);
  });

  it('retires a probe: out of its point, its device shut out, its history readable', async () => {
    const agent = await app.as('manager');
    const place = await aPoint(site.id);
    const probe = await aProbe(site.id);
    await installed(probe, place, technicianId);
    const device = await aDevice(probe.id);

    const { body } = await agent
      .post(`/api/probes/${probe.id}/retire`)
      .send({ reason: 'cracked body', version: 0 })
      .expect(200);

    expect(body).toMatchObject({
      status: 'retired',
      retiredReason: 'cracked body',
      placement: null,
      device: null,
      can: { change: false, install: false, retire: false, addNote: true },
    });
    expect((await Device.findByPk(device.id))?.revokedAt).toEqual(new Date('2026-12-01T12:00:00Z'));
    expect(await Assignment.findOne({ where: { probeId: probe.id } })).toMatchObject({
      toAt: new Date('2026-12-01T12:00:00Z'),
    });
    expect(await app.audited('probes.retired')).toMatchObject({
      oldValue: { status: 'in-service', pointId: place.id, device: device.name },
      reason: 'cracked body',
    });
    const { body: timeline } = await agent.get(`/api/probes/${probe.id}/events`).expect(200);
    expect(timeline.items.map((one: { kind: string }) => one.kind)).toEqual([
      'retired',
      'credentials-revoked',
    ]);
  });
});

describe('the timeline', () => {
  it('merges events and comparisons, newest first, page by page', async () => {
    const agent = await app.as('auditor');
    const probe = await aProbe(site.id);
    const where = { probeId: probe.id, pointId: point.id, standardId: lot.id };
    await ProbeEvent.create({
      kind: 'registered',
      at: new Date('2026-01-01T00:00:00Z'),
      probeId: probe.id,
      pointId: null,
      userId: technicianId,
    });
    await aCheck(where, { at: new Date('2026-04-01T00:00:00Z'), errorPercent: -0.25 });
    await ProbeEvent.create({
      kind: 'cleaned',
      at: new Date('2026-05-01T00:00:00Z'),
      probeId: probe.id,
      pointId: point.id,
      userId: technicianId,
    });
    await aCheck(where, { at: new Date('2026-05-01T00:00:00Z'), stage: 'as-left', errorPercent: 0.75 });
    await aCheck(where, {
      at: new Date('2026-06-01T00:00:00Z'),
      isValid: false,
      invalidReason: 'solution-expired',
      outcome: null,
    });

    const { body: whole } = await agent.get(`/api/probes/${probe.id}/events`).expect(200);

    expect(whole.total).toBe(5);
    expect(whole.items.map((one: { title: string }) => one.title)).toEqual(
      [
        'Automatic check: not valid',
        'Cleaned',
        'As left: +0.75 % ± 0.40 %, within, clear',
        'Automatic check: −0.25 % ± 0.40 %, within, clear',
        'Registered',
      ].map((title) =>
        expect.stringMatching(new RegExp(`^${title.replace(/[+.]/g, '\\$&').replace(/ /g, '\\s')}$`)),
      ),
    );
    expect(whole.items[0]).toMatchObject({
      detail: 'Lot LOT: the lot was past its use-by date',
      strip: null,
    });
    expect(whole.items[2].strip).toMatchObject({
      errorPercent: 0.75,
      guardBandPercent: expect.closeTo(0.4, 9),
      earlierErrorPercent: [-0.25],
    });

    const keys: string[] = [];
    let cursor: string | null = '';
    while (cursor !== null) {
      const page: { body: { items: { key: string }[]; nextCursor: string | null } } = await agent
        .get(`/api/probes/${probe.id}/events?limit=2${cursor && `&cursor=${cursor}`}`)
        .expect(200);
      keys.push(...page.body.items.map((one) => one.key));
      cursor = page.body.nextCursor;
    }
    expect(keys).toEqual(whole.items.map((one: { key: string }) => one.key));
  });
});

describe('the list', () => {
  let hall: Site;

  beforeAll(async () => {
    hall = await aSite({ name: 'Hollow Fen' });
    for (const [tag, errorPercent, outcome] of [
      ['pond-1', 0.5, 'within-clear'],
      ['pond-2', 5, 'outside-clear'],
      ['pond-3', null, null],
    ] as const) {
      const probe = await aProbe(hall.id, { tag });
      await installed(probe, await aPoint(hall.id, { code: `HF-${tag}` }), technicianId);
      const device = await aDevice(probe.id);
      await aLiveReading(probe.id, device.id);
      if (errorPercent !== null)
        await aCheck({ probeId: probe.id, pointId: null, standardId: lot.id }, { errorPercent, outcome });
    }
    await aProbe(hall.id, { tag: 'pond-0', kind: 'inductive' });
  });

  it('carries trust and strip, and is filtered by trust', async () => {
    const agent = await app.as('operator');
    const { body } = await agent.get(`/api/probes?siteId=${hall.id}`).expect(200);
    expect(
      body.items.map((one: { tag: string; trust: { level: string; reason: string } }) => [
        one.tag,
        one.trust.level,
        one.trust.reason,
      ]),
    ).toEqual([
      ['pond-0', 'no-signal', 'no-device'],
      ['pond-1', 'fit', 'as-compared'],
      ['pond-2', 'do-not-use', 'outside-clear'],
      ['pond-3', 'use-with-care', 'never-compared'],
    ]);
    expect(body.items[1].strip).toMatchObject({ errorPercent: 0.5, tolerancePercent: 3 });

    const { body: avoid } = await agent.get(`/api/probes?siteId=${hall.id}&trust=do-not-use`).expect(200);
    expect(avoid).toMatchObject({ total: 1, items: [{ tag: 'pond-2' }] });
  });

  it('is sorted both ways, with what has no point last', async () => {
    const agent = await app.as('operator');
    const tags = async (query: string): Promise<string[]> =>
      (await agent.get(`/api/probes?siteId=${hall.id}&${query}`).expect(200)).body.items.map(
        (one: { tag: string }) => one.tag,
      );
    expect(await tags('sort=-tag')).toEqual(['pond-3', 'pond-2', 'pond-1', 'pond-0']);
    expect(await tags('sort=point')).toEqual(['pond-1', 'pond-2', 'pond-3', 'pond-0']);
    expect(await tags('kind=inductive')).toEqual(['pond-0']);
    expect(await tags('q=hf-pond-2')).toEqual(['pond-2']);
  });

  it('pages in every order, with and without a trust filter', async () => {
    const agent = await app.as('operator');
    for (const query of [
      'sort=tag',
      'sort=-serial',
      'sort=point',
      'sort=-site',
      'sort=lastSeen',
      'sort=tag&trust=no-signal',
    ]) {
      const whole = await agent.get(`/api/probes?${query}`).expect(200);
      const ids: number[] = [];
      let cursor: string | null = '';
      while (cursor !== null) {
        const page: { body: { items: { id: number }[]; total: number; nextCursor: string | null } } =
          await agent.get(`/api/probes?${query}&limit=3${cursor && `&cursor=${cursor}`}`).expect(200);
        ids.push(...page.body.items.map((one) => one.id));
        expect(page.body.total).toBe(whole.body.total);
        cursor = page.body.nextCursor;
      }
      expect([query, ids]).toEqual([query, whole.body.items.map((one: { id: number }) => one.id)]);
    }
  });

  it('shows nothing of other sites', async () => {
    const agent = await app.as({ role: 'technician', siteId: hall.id });
    const { body } = await agent.get('/api/probes').expect(200);
    expect(body.total).toBe(4);
    expect(new Set(body.items.map((one: { siteId: number }) => one.siteId))).toEqual(new Set([hall.id]));
  });
});
