import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { Instrument } from '../../server/db/models/index.ts';
import { startTestApp, type TestApp } from '../support/app.ts';
import { refusals } from '../support/refusals.ts';
import { anInstrument } from '../support/rows.ts';

let app: TestApp;
let thermometer: Instrument;

beforeAll(async () => {
  app = await startTestApp();
  thermometer = await anInstrument({ code: 'RT-05' });
});
afterAll(() => app.stop());
beforeEach(() => {
  app.clock.set('2026-12-01T12:00:00Z');
  app.events.length = 0;
});

const facts = {
  code: 'rt-06',
  kind: 'thermometer',
  name: 'Platinum thermometer',
  serial: '9911',
  certificateNumber: '4471-T',
  issuedOn: '2026-10-01',
  dueOn: '2027-10-01',
  expandedUncertainty: 0.03,
  uncertaintyUnit: 'C',
  coverageFactor: 2,
  correction: -0.012,
  traceability: 'As its certificate states.',
};

refusals(
  () => app,
  [
    {
      says: 'no session',
      who: null,
      ask: () => ['get', '/api/instruments'],
      code: 'sessions.required',
      status: 401,
    },
    {
      says: 'a technician registers none',
      who: 'technician',
      ask: () => ['post', '/api/instruments', facts],
      code: 'instruments.forbidden',
      status: 403,
    },
    {
      says: 'an auditor changes none',
      who: 'auditor',
      ask: () => [
        'patch',
        `/api/instruments/${thermometer.id}`,
        { dueOn: '2029-01-01', reason: 'later', version: 0 },
      ],
      code: 'instruments.forbidden',
      status: 403,
    },
    {
      says: 'unknown id',
      who: 'operator',
      ask: () => ['get', '/api/instruments/99999'],
      code: 'instruments.not-found',
      status: 404,
    },
    {
      says: 'a code in use, in other letters',
      who: 'manager',
      ask: () => ['post', '/api/instruments', { ...facts, code: 'rt-05' }],
      code: 'instruments.code-taken',
      status: 409,
    },
    {
      says: 'due before its certificate',
      who: 'manager',
      ask: () => ['post', '/api/instruments', { ...facts, dueOn: '2026-01-01' }],
      code: 'request.invalid',
      status: 422,
      issue: 'dueOn',
    },
    {
      says: 'a new due date before the certificate that stays',
      who: 'manager',
      ask: () => [
        'patch',
        `/api/instruments/${thermometer.id}`,
        { dueOn: '2026-05-01', reason: 'wrong way', version: 0 },
      ],
      code: 'request.invalid',
      status: 422,
      issue: 'dueOn',
    },
    {
      says: 'an old version',
      who: 'manager',
      ask: () => [
        'patch',
        `/api/instruments/${thermometer.id}`,
        { name: 'other', reason: 'renamed', version: 4 },
      ],
      code: 'instruments.changed-meanwhile',
      status: 409,
    },
    {
      says: 'a change without its reason',
      who: 'manager',
      ask: () => ['patch', `/api/instruments/${thermometer.id}`, { name: 'other', version: 0 }],
      code: 'request.invalid',
      status: 422,
      issue: 'reason',
    },
  ],
);

describe('reference instruments', () => {
  it('are registered as their certificate states them and usable until the due day', async () => {
    const agent = await app.as('manager');
    const { body } = await agent.post('/api/instruments').send(facts).expect(201);
    expect(body).toMatchObject({
      ...facts,
      code: 'RT-06',
      state: 'in-use',
      isUsable: true,
      certificate: null,
      runCount: 0,
      can: { change: true, uploadCertificate: true },
    });
    expect(await app.audited('instruments.created')).toMatchObject({ newValue: { code: 'RT-06' } });
    expect(app.events).toEqual([{ slice: 'instruments', id: body.id, kind: 'created', siteId: null }]);

    app.clock.set('2027-10-01T20:00:00Z');
    expect((await agent.get(`/api/instruments/${body.id}`)).body.isUsable).toBe(true);
    app.clock.set('2027-10-02T00:00:00Z');
    expect((await agent.get(`/api/instruments/${body.id}`)).body.isUsable).toBe(false);
  });

  it('keep what a change does not name, and the old values in the trail', async () => {
    const one = await anInstrument({ correction: 0.02 });
    const agent = await app.as('manager');
    const { body } = await agent
      .patch(`/api/instruments/${one.id}`)
      .send({ dueOn: '2028-06-01', certificateNumber: 'C-2027', reason: 'new certificate', version: 0 })
      .expect(200);
    expect(body).toMatchObject({ dueOn: '2028-06-01', correction: 0.02, version: 1 });
    expect((await Instrument.findByPk(one.id))?.correction).toBe(0.02);
    expect(await app.audited('instruments.changed')).toMatchObject({
      oldValue: { dueOn: '2027-06-01' },
      newValue: { dueOn: '2028-06-01', certificateNumber: 'C-2027' },
      reason: 'new certificate',
    });
  });

  it('are out of use at once, and found by kind and use', async () => {
    const balance = await anInstrument({ code: 'BAL-01', kind: 'balance', uncertaintyUnit: 'g' });
    const agent = await app.as('manager');
    await agent
      .patch(`/api/instruments/${balance.id}`)
      .send({ state: 'out-of-use', reason: 'dropped', version: 0 })
      .expect(200);
    const all = await agent.get('/api/instruments?kind=balance').expect(200);
    const usable = await agent.get('/api/instruments?kind=balance&usable=1').expect(200);
    expect(all.body).toMatchObject({ total: 1, items: [{ code: 'BAL-01', isUsable: false }] });
    expect(usable.body).toMatchObject({ total: 0, items: [] });
    const uses = await agent.get(`/api/instruments/${balance.id}/uses`).expect(200);
    expect(uses.body).toEqual({ items: [], total: 0, nextCursor: null });
  });
});
