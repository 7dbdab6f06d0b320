import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { Standard, type Site } from '../../server/db/models/index.ts';
import { startTestApp, type TestApp } from '../support/app.ts';
import { refusals } from '../support/refusals.ts';
import { aCheck, aProbe, aSite, aStandard } from '../support/rows.ts';

let app: TestApp;
let site: Site;
let released: Standard;
let recalled: Standard;

beforeAll(async () => {
  app = await startTestApp();
  site = await aSite();
  released = await aStandard({ code: 'KCL-0012' });
  recalled = await aStandard({
    code: 'KCL-0009',
    state: 'recalled',
    stateReason: 'wrong basis on the label',
  });
});
afterAll(() => app.stop());
beforeEach(() => {
  app.clock.set('2026-12-01T12:00:00Z');
  app.events.length = 0;
});

const lot = {
  code: 'KCL-0101',
  producer: 'Bench laboratory',
  product: 'Potassium chloride solution',
  medium: 'kcl-aqueous',
  basis: 'demal',
  nominal: 0.01,
  certifiedConductivityUsCm: 1409.3,
  referenceTemperatureC: 25,
  expandedUncertaintyUsCm: 2.8,
  coverageFactor: 2,
  temperatureTable: null,
  traceability: 'weighed in house, see worksheet 12',
  isInHouse: true,
  issuedOn: '2026-11-20',
  expiresOn: '2027-05-20',
} as const;
const recall = { state: 'recalled', reason: 'wrong basis on the label', version: 0 };

refusals(
  () => app,
  [
    {
      says: 'no session',
      who: null,
      ask: () => ['get', '/api/standards'],
      code: 'sessions.required',
      status: 401,
    },
    {
      says: 'a technician registers none',
      who: 'technician',
      ask: () => ['post', '/api/standards', lot],
      code: 'standards.forbidden',
      status: 403,
    },
    {
      says: 'an administrator registers none',
      who: 'administrator',
      ask: () => ['post', '/api/standards', lot],
      code: 'standards.forbidden',
      status: 403,
    },
    {
      says: 'a technician recalls none',
      who: 'technician',
      ask: () => ['post', `/api/standards/${released.id}/state`, recall],
      code: 'standards.forbidden',
      status: 403,
    },
    {
      says: 'a technician releases none',
      who: 'technician',
      ask: () => ['post', `/api/standards/${released.id}/state`, { ...recall, state: 'released' }],
      code: 'standards.forbidden',
      status: 403,
    },
    {
      says: 'an operator stops none',
      who: 'operator',
      ask: () => ['post', `/api/standards/${released.id}/state`, { ...recall, state: 'quarantined' }],
      code: 'standards.forbidden',
      status: 403,
    },
    {
      says: 'unknown id',
      who: 'manager',
      ask: () => ['get', '/api/standards/99999'],
      code: 'standards.not-found',
      status: 404,
    },
    {
      says: 'state of an unknown lot',
      who: 'manager',
      ask: () => ['post', '/api/standards/99999/state', recall],
      code: 'standards.not-found',
      status: 404,
    },
    {
      says: 'a value without its uncertainty',
      who: 'manager',
      ask: () => ['post', '/api/standards', { ...lot, expandedUncertaintyUsCm: null, coverageFactor: null }],
      code: 'request.invalid',
      status: 422,
      issue: 'expandedUncertaintyUsCm',
    },
    {
      says: 'a basis without its nominal value',
      who: 'manager',
      ask: () => ['post', '/api/standards', { ...lot, nominal: null }],
      code: 'request.invalid',
      status: 422,
      issue: 'nominal',
    },
    {
      says: 'expired at issue',
      who: 'manager',
      ask: () => ['post', '/api/standards', { ...lot, expiresOn: '2026-11-20' }],
      code: 'request.invalid',
      status: 422,
      issue: 'expiresOn',
    },
    {
      says: 'a table that goes back',
      who: 'manager',
      ask: () => [
        'post',
        '/api/standards',
        {
          ...lot,
          basis: 'other',
          medium: 'other',
          temperatureTable: [
            { temperatureC: 25, conductivityUsCm: 84 },
            { temperatureC: 20, conductivityUsCm: 76 },
          ],
        },
      ],
      code: 'request.invalid',
      status: 422,
      issue: 'temperatureTable',
    },
    {
      says: 'a code in use, in other letters',
      who: 'manager',
      ask: () => ['post', '/api/standards', { ...lot, code: 'kcl-0012' }],
      code: 'standards.code-taken',
      status: 409,
    },
    {
      says: 'an old version',
      who: 'manager',
      ask: () => ['post', `/api/standards/${released.id}/state`, { ...recall, version: 5 }],
      code: 'standards.changed-meanwhile',
      status: 409,
    },
    {
      says: 'a recalled lot stays recalled',
      who: 'manager',
      ask: () => ['post', `/api/standards/${recalled.id}/state`, { ...recall, state: 'released' }],
      code: 'standards.state-impossible',
      status: 409,
    },
  ],
);

describe('reference solutions', () => {
  it('arrive quarantined and are usable once a manager has released them', async () => {
    const agent = await app.as({ role: 'manager', siteId: site.id });

    const { body: made } = await agent.post('/api/standards').send(lot).expect(201);

    expect(made).toMatchObject({
      ...lot,
      state: 'quarantined',
      isUsable: false,
      isExpired: false,
      checkCount: 0,
      can: { release: true, quarantine: false, recall: true },
    });
    expect(made.label.replace(/[\u2009\u00a0]/g, ' ')).toBe(
      'KCl 0.01 D (demal), in-house value 1 409.3 µS/cm at 25 °C',
    );
    expect(await app.audited('standards.created')).toMatchObject({
      objectId: String(made.id),
      newValue: { code: 'KCL-0101', state: 'quarantined' },
    });
    expect(app.events).toEqual([{ slice: 'standards', id: made.id, kind: 'created', siteId: null }]);

    app.events.length = 0;
    const { body: usable } = await agent
      .post(`/api/standards/${made.id}/state`)
      .send({ state: 'released', reason: 'certificate read', version: 0 })
      .expect(200);

    expect(usable).toMatchObject({
      state: 'released',
      stateReason: 'certificate read',
      isUsable: true,
      version: 1,
    });
    expect(await app.audited('standards.released')).toMatchObject({
      oldValue: { state: 'quarantined' },
      newValue: { state: 'released' },
      reason: 'certificate read',
    });
    expect(app.events).toEqual([{ slice: 'standards', id: made.id, kind: 'changed', siteId: null }]);
  });

  it('keep a table that stands without a KCl basis', async () => {
    const agent = await app.as('manager');
    const temperatureTable = [
      { temperatureC: 20, conductivityUsCm: 75.9 },
      { temperatureC: 25, conductivityUsCm: 84 },
    ];
    const { body } = await agent
      .post('/api/standards')
      .send({
        ...lot,
        code: 'CHK-84',
        medium: 'other',
        basis: 'other',
        nominal: null,
        certifiedConductivityUsCm: 84,
        expandedUncertaintyUsCm: 0.5,
        temperatureTable,
      })
      .expect(201);
    expect(body.temperatureTable).toEqual(temperatureTable);
    expect((await Standard.findByPk(body.id))?.temperatureTable).toEqual(temperatureTable);
  });

  it('may be stopped by a technician, who cannot let them back in', async () => {
    const agent = await app.as('technician');
    const one = await aStandard();

    const { body } = await agent
      .post(`/api/standards/${one.id}/state`)
      .send({ state: 'quarantined', reason: 'cap was open', version: 0 })
      .expect(200);

    expect(body).toMatchObject({
      state: 'quarantined',
      isUsable: false,
      can: { release: false, quarantine: false, recall: false },
    });
    expect(await app.audited('standards.quarantined')).toMatchObject({
      actingRole: 'technician',
      reason: 'cap was open',
    });
  });

  it('may be used up to and including their last day', async () => {
    const agent = await app.as('operator');
    const one = await aStandard({ expiresOn: '2026-12-05' });

    app.clock.set('2026-12-05T23:59:00Z');
    expect((await agent.get(`/api/standards/${one.id}`).expect(200)).body).toMatchObject({
      isExpired: false,
      isUsable: true,
    });
    app.clock.set('2026-12-06T00:00:00Z');
    expect((await agent.get(`/api/standards/${one.id}`).expect(200)).body).toMatchObject({
      isExpired: true,
      isUsable: false,
    });
  });

  it('say how often they were used, and are listed by code and state', async () => {
    const agent = await app.as({ role: 'auditor', siteId: site.id });
    const probe = await aProbe(site.id);
    await aCheck({ probeId: probe.id, pointId: null, standardId: released.id });
    await aCheck({ probeId: probe.id, pointId: null, standardId: released.id });

    const { body } = await agent.get('/api/standards?q=kcl-00').expect(200);
    expect(body.items.map((one: { code: string; checkCount: number }) => [one.code, one.checkCount])).toEqual(
      [
        ['KCL-0009', 0],
        ['KCL-0012', 2],
      ],
    );
    expect(body.items[1].label).toBe('KCl 0.01 mol/kg (molal), 1408.23 µS/cm at 25 °C');
    const { body: gone } = await agent.get('/api/standards?state=recalled').expect(200);
    expect(gone).toMatchObject({ total: 1, items: [{ code: 'KCL-0009' }] });
    const first = await agent.get('/api/standards?q=kcl-00&limit=1').expect(200);
    const second = await agent
      .get(`/api/standards?q=kcl-00&limit=1&cursor=${first.body.nextCursor}`)
      .expect(200);
    expect(second.body).toMatchObject({ items: [{ code: 'KCL-0012' }], nextCursor: null });
  });
});
