import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Point, Probe, Site } from '../../server/db/models/index.ts';
import { maxHistoryPoints, type CheckHistory } from '../../shared/contracts/checks.ts';
import { startTestApp, type TestApp } from '../support/app.ts';
import { refusals } from '../support/refusals.ts';
import { aCheck, aPoint, aProbe, aSite, aStandard } from '../support/rows.ts';

let app: TestApp;
let site: Site;
let other: Site;
let point: Point;
let probe: Probe;

beforeAll(async () => {
  app = await startTestApp();
  site = await aSite({ name: 'Lower Weir' });
  other = await aSite({ name: 'Quarrybank' });
  point = await aPoint(site.id, { name: 'Rinse return' });
  probe = await aProbe(site.id, { tag: 'cip-7' });
});
afterAll(() => app.stop());

refusals(
  () => app,
  [
    {
      says: 'no session',
      who: null,
      ask: () => ['get', `/api/checks/history?probeId=${probe.id}`],
      code: 'sessions.required',
      status: 401,
    },
    {
      says: 'a probe of another site',
      who: () => ({ role: 'manager', siteId: other.id }),
      ask: () => ['get', `/api/checks/history?probeId=${probe.id}`],
      code: 'probes.not-found',
      status: 404,
    },
    {
      says: 'no probe named',
      who: 'auditor',
      ask: () => ['get', '/api/checks/history'],
      code: 'request.invalid',
      status: 422,
      issue: 'query.probeId',
    },
  ],
);

describe('the history of a cell constant', () => {
  it('keeps what people determined and thins automatic checks to what a chart can show', async () => {
    const lot = await aStandard({ code: 'KCL-0077' });
    const where = { probeId: probe.id, pointId: point.id, standardId: lot.id };
    const start = Date.parse('2025-01-01T00:00:00Z');
    const automatic = await aCheck(where, { stage: 'automatic', at: new Date(start) });
    await app.parts.sequelize.query(
      `insert into checks overriding system value select (jsonb_populate_record(c, jsonb_build_object(
           'id', nextval(pg_get_serial_sequence('checks', 'id')), 'at', c.at + i * interval '6 hours'))).*
         from checks c, generate_series(1, 1999) i where c.id = ${automatic.id}`,
    );
    const byHand = await Promise.all(
      ['2025-03-01', '2025-09-01', '2026-03-01'].map((day) =>
        aCheck(where, { stage: 'as-found-cleaned', at: new Date(`${day}T10:00:00Z`) }),
      ),
    );
    await aCheck(where, {
      at: new Date('2026-05-01T10:00:00Z'),
      isValid: false,
      invalidReason: 'solution-expired',
    });

    const agent = await app.as('operator');
    const { body } = await agent.get(`/api/checks/history?probeId=${probe.id}`).expect(200);
    const { points, total } = body as CheckHistory;

    expect(total).toBe(2003);
    expect(points.length).toBeLessThanOrEqual(maxHistoryPoints);
    expect(points.filter((one) => one.stage !== 'automatic').map((one) => one.id)).toEqual(
      byHand.map((one) => one.id),
    );
    const drawn = points.filter((one) => one.stage === 'automatic').map((one) => Date.parse(one.at));
    expect(drawn.length).toBe(500);
    const newest = start + 1999 * 6 * 3_600_000;
    expect(drawn.at(-1)).toBe(newest);
    expect(new Set(drawn.slice(1).map((at, i) => at - drawn[i]!))).toEqual(new Set([24 * 3_600_000]));
    expect(points.map((one) => one.at)).toEqual(points.map((one) => one.at).toSorted());
  });
});
