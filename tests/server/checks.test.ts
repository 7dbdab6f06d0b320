import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Check, Point, Probe, Site, Standard } from '../../server/db/models/index.ts';
import { startTestApp, type TestApp } from '../support/app.ts';
import { refusals } from '../support/refusals.ts';
import { aCheck, aPoint, aProbe, aSite, aStandard } from '../support/rows.ts';

let app: TestApp;
let site: Site;
let other: Site;
let point: Point;
let probe: Probe;
let lot: Standard;
let valid: Check;
let unknownLot: Check;
let moved: Check;

beforeAll(async () => {
  app = await startTestApp();
  site = await aSite({ name: 'Lower Weir' });
  other = await aSite({ name: 'Quarrybank' });
  point = await aPoint(site.id, { name: 'Rinse return' });
  probe = await aProbe(site.id, { tag: 'cip-2' });
  lot = await aStandard({ code: 'KCL-0012' });
  const where = { probeId: probe.id, pointId: point.id, standardId: lot.id };
  const technician = await app.person('technician');
  valid = await aCheck(where, {
    stage: 'as-found',
    performedByUserId: technician.id,
    budget: [
      {
        name: 'lot',
        standardUncertaintyPercent: 0.1,
        sharePercent: 25,
        distribution: 'normal',
        degreesOfFreedom: null,
      },
    ],
  });
  unknownLot = await aCheck(
    { ...where, standardId: null as never },
    {
      at: new Date('2026-11-25T09:00:00Z'),
      solution: 'KCL-9999',
      isValid: false,
      invalidReason: 'solution-unknown',
      errorPercent: null,
      outcome: null,
    },
  );
  // Made while the probe stood at Lower Weir; it is kept at Quarrybank now.
  const traveller = await aProbe(other.id);
  moved = await aCheck(
    { probeId: traveller.id, pointId: point.id, standardId: lot.id },
    { at: new Date('2026-11-10T09:00:00Z') },
  );
});
afterAll(() => app.stop());

const atOther = () => ({ role: 'manager' as const, siteId: other.id });

refusals(
  () => app,
  [
    {
      says: 'no session',
      who: null,
      ask: () => ['get', '/api/checks'],
      code: 'sessions.required',
      status: 401,
    },
    {
      says: 'another site',
      who: atOther,
      ask: () => ['get', `/api/checks/${valid.id}`],
      code: 'checks.not-found',
      status: 404,
    },
    {
      says: 'unknown id',
      who: 'auditor',
      ask: () => ['get', '/api/checks/99999'],
      code: 'checks.not-found',
      status: 404,
    },
    {
      says: 'a stage that is none',
      who: 'auditor',
      ask: () => ['get', '/api/checks?stage=before'],
      code: 'request.invalid',
      status: 422,
      issue: 'query.stage',
    },
    {
      says: 'a cursor of another list',
      who: 'auditor',
      ask: () => ['get', '/api/checks?cursor=WyJhIiwxXQ'],
      code: 'request.cursor-invalid',
      status: 422,
    },
    {
      says: 'nobody changes one',
      who: 'manager',
      ask: () => ['patch', `/api/checks/${valid.id}`, { errorPercent: 0 }],
      code: 'request.not-found',
      status: 404,
    },
    {
      says: 'nobody deletes one',
      who: 'administrator',
      ask: () => ['delete', `/api/checks/${valid.id}`],
      code: 'request.not-found',
      status: 404,
    },
  ],
);

describe('comparisons', () => {
  it('are listed newest first, valid or not, each with its reason', async () => {
    const agent = await app.as('operator');
    const { body } = await agent.get(`/api/checks?probeId=${probe.id}`).expect(200);
    expect(body).toMatchObject({
      total: 2,
      items: [
        {
          id: unknownLot.id,
          isValid: false,
          invalidReason: 'solution-unknown',
          solution: 'KCL-9999',
          outcome: null,
        },
        {
          id: valid.id,
          isValid: true,
          probeTag: 'cip-2',
          pointName: 'Rinse return',
          outcome: 'within-clear',
          performedBy: 'Test technician',
        },
      ],
    });
  });

  it('are shown whole, with the budget', async () => {
    const agent = await app.as({ role: 'auditor', siteId: site.id });
    const { body } = await agent.get(`/api/checks/${valid.id}`).expect(200);
    expect(body).toMatchObject({
      errorPercent: 0.5,
      expandedUncertaintyPercent: 0.4,
      coverageFactor: 2,
      tolerancePercent: 3,
      budget: [{ name: 'lot', sharePercent: 25 }],
    });
  });

  it('stay with the site where they were made when the probe moves on', async () => {
    const here = await (
      await app.as({ role: 'auditor', siteId: site.id })
    )
      .get(`/api/checks/${moved.id}`)
      .expect(200);
    expect(here.body.siteId).toBe(site.id);
    await (await app.as(atOther())).get(`/api/checks/${moved.id}`).expect(404);
  });

  it('are filtered by lot, site and stage, and paged', async () => {
    const agent = await app.as('operator');
    const ids = async (query: string): Promise<number[]> =>
      (await agent.get(`/api/checks?${query}`).expect(200)).body.items.map((one: { id: number }) => one.id);
    expect(await ids(`standardId=${lot.id}`)).toEqual([valid.id, moved.id]);
    expect(await ids(`siteId=${site.id}&stage=as-found`)).toEqual([valid.id]);
    expect(await ids(`siteId=${other.id}`)).toEqual([]);
    const first = await agent.get('/api/checks?limit=2').expect(200);
    expect(await ids(`limit=2&cursor=${first.body.nextCursor}`)).toEqual([moved.id]);
  });
});
