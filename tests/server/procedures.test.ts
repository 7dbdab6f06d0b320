import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { IssueProcedure } from '../../shared/contracts/procedures.ts';
import { Procedure, type Site } from '../../server/db/models/index.ts';
import { startTestApp, type TestApp } from '../support/app.ts';
import { refusals } from '../support/refusals.ts';
import { aSite } from '../support/rows.ts';

let app: TestApp;
let site: Site;
let first: Procedure;

beforeAll(async () => {
  app = await startTestApp();
  site = await aSite();
  first = (await Procedure.findOne({ where: { code: 'in-line-probe', version: 1 } }))!;
});
afterAll(() => app.stop());
beforeEach(() => {
  app.events.length = 0;
});

const next = (more: Partial<IssueProcedure> = {}): IssueProcedure => ({
  name: first.name,
  probeKinds: first.probeKinds,
  steps: first.steps,
  criteria: { ...first.criteria, minReplicates: 5 },
  basedOnVersion: 1,
  reason: 'five readings from now on',
  ...more,
});
const path = '/api/procedures/in-line-probe/versions';
const without = (...names: string[]) => first.steps.filter((step) => !names.includes(step));

refusals(
  () => app,
  [
    {
      says: 'no session',
      who: null,
      ask: () => ['get', '/api/procedures'],
      code: 'sessions.required',
      status: 401,
    },
    {
      says: 'a technician issues none',
      who: 'technician',
      ask: () => ['post', path, next()],
      code: 'procedures.forbidden',
      status: 403,
    },
    {
      says: 'a manager of one site binds no other',
      who: () => ({ role: 'manager', siteId: site.id }),
      ask: () => ['post', path, next()],
      code: 'procedures.forbidden',
      status: 403,
    },
    {
      says: 'unknown procedure',
      who: 'manager',
      ask: () => ['post', '/api/procedures/none/versions', next()],
      code: 'procedures.not-found',
      status: 404,
    },
    {
      says: 'unknown version',
      who: 'auditor',
      ask: () => ['get', '/api/procedures/99999'],
      code: 'procedures.not-found',
      status: 404,
    },
    {
      says: 'somebody was faster',
      who: 'manager',
      ask: () => ['post', path, next({ basedOnVersion: 7 })],
      code: 'procedures.changed-meanwhile',
      status: 409,
    },
    {
      says: 'cleaning before as found',
      who: 'manager',
      ask: () => [
        'post',
        path,
        next({
          steps: [
            'identify',
            'pre-checks',
            'clean',
            'as-found',
            'as-found-cleaned',
            'decide',
            'as-left',
            'review',
            'sign',
          ],
        }),
      ],
      code: 'procedures.order-impossible',
      status: 422,
      issue: 'steps',
    },
    {
      says: 'no as found at all',
      who: 'manager',
      ask: () => ['post', path, next({ steps: without('as-found') })],
      code: 'procedures.order-impossible',
      status: 422,
      issue: 'steps',
    },
    {
      says: 'cleaning whose effect is not measured',
      who: 'manager',
      ask: () => ['post', path, next({ steps: without('as-found-cleaned') })],
      code: 'procedures.order-impossible',
      status: 422,
      issue: 'steps',
    },
    {
      says: 'two replicates',
      who: 'manager',
      ask: () => ['post', path, next({ criteria: { ...first.criteria, minReplicates: 2 } })],
      code: 'request.invalid',
      status: 422,
      issue: 'criteria.minReplicates',
    },
  ],
);

describe('procedures', () => {
  it('are issued as a new version that leaves the old one as it was', async () => {
    const agent = await app.as('administrator');
    const before = first.get({ plain: true });

    const { body } = await agent
      .post(path)
      .send(next({ steps: without('zero-in-air') }))
      .expect(201);

    expect(body).toMatchObject({
      code: 'in-line-probe',
      version: 2,
      criteria: { minReplicates: 5 },
      changeReason: 'five readings from now on',
      replacedAt: null,
      can: { change: true },
    });
    const old = await Procedure.findByPk(first.id);
    expect(old?.get({ plain: true })).toEqual({ ...before, replacedAt: new Date('2026-12-01T12:00:00Z') });
    expect(await app.audited('procedures.issued')).toMatchObject({
      oldValue: { version: 1, criteria: { minReplicates: 3 } },
      newValue: { version: 2, criteria: { minReplicates: 5 } },
      reason: 'five readings from now on',
    });
    expect(app.events).toEqual([{ slice: 'procedures', id: body.id, kind: 'created', siteId: null }]);

    const inForce = await agent.get('/api/procedures').expect(200);
    expect(
      inForce.body.items.map((one: { code: string; version: number }) => [one.code, one.version]),
    ).toEqual([
      ['in-line-inductive', 1],
      ['in-line-probe', 2],
    ]);
    const all = await agent.get('/api/procedures?all=1&code=in-line-probe').expect(200);
    expect(all.body.items.map((one: { version: number }) => one.version)).toEqual([2, 1]);
    expect((await agent.get(`/api/procedures/${first.id}`)).body.can.change).toBe(false);
  });

  it('may zero an inductive probe in air before its first solution', async () => {
    const inductive = (await Procedure.findOne({ where: { code: 'in-line-inductive', replacedAt: null } }))!;
    const agent = await app.as('manager');
    const { name, probeKinds, steps, criteria, version } = inductive;
    const { body } = await agent
      .post('/api/procedures/in-line-inductive/versions')
      .send({ name, probeKinds, steps, criteria, basedOnVersion: version, reason: 'yearly review' })
      .expect(201);
    expect(body.steps.indexOf('zero-in-air')).toBeLessThan(body.steps.indexOf('as-found'));
  });
});
