import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { Standard, type Instrument } from '../../server/db/models/index.ts';
import { startTestApp, type TestApp } from '../support/app.ts';
import { refusals } from '../support/refusals.ts';
import { aBottle, aCheck, anInstrument, aPoint, aProbe, aSite, aStandard } from '../support/rows.ts';

let app: TestApp;
let stock: Standard;
let quarantined: Standard;
let overdue: Instrument;

beforeAll(async () => {
  app = await startTestApp();
  stock = await aStandard({
    code: 'KC-26-031',
    certifiedConductivityUsCm: 1408.2,
    expandedUncertaintyUsCm: 2.8,
    coverageFactor: 2,
  });
  quarantined = await aStandard({ state: 'quarantined' });
  overdue = await anInstrument({ kind: 'balance', uncertaintyUnit: 'g', dueOn: '2026-11-30' });
});
afterAll(() => app.stop());
beforeEach(() => {
  app.events.length = 0;
});

const weighing = { kclReadingG: 0.745513, waterReadingG: 1000, waterBlankUsCm: 0.9 };
const dilution = () => ({
  standardId: stock.id,
  stockReadingG: 100,
  waterReadingG: 900,
  waterBlankUsCm: 0.9,
  isBlankInSameState: true,
});
const prepared = {
  weighing,
  salt: 'analytical grade, dried 4 h at 110 °C',
  code: 'ih-26-001',
  expiresOn: '2027-03-01',
};

refusals(
  () => app,
  [
    {
      says: 'no session',
      who: null,
      ask: () => ['post', '/api/standards/prepared/preview', weighing],
      code: 'sessions.required',
      status: 401,
    },
    {
      says: 'an operator prepares none',
      who: 'operator',
      ask: () => ['post', '/api/standards/prepared', prepared],
      code: 'standards.forbidden',
      status: 403,
    },
    {
      says: 'an auditor dilutes none',
      who: 'auditor',
      ask: () => ['post', '/api/standards/diluted/preview', dilution()],
      code: 'standards.forbidden',
      status: 403,
    },
    {
      says: 'salt without water',
      who: 'technician',
      ask: () => ['post', '/api/standards/prepared/preview', { ...weighing, waterReadingG: 0 }],
      code: 'request.invalid',
      status: 422,
      issue: 'waterReadingG',
    },
    {
      says: 'stronger than any equation',
      who: 'technician',
      ask: () => ['post', '/api/standards/prepared/preview', { ...weighing, kclReadingG: 200 }],
      code: 'reference.outside-domain',
      status: 422,
    },
    {
      says: 'a balance past its due date',
      who: 'technician',
      ask: () => ['post', '/api/standards/prepared/preview', { ...weighing, saltBalanceId: overdue.id }],
      code: 'instruments.overdue',
      status: 409,
    },
    {
      says: 'a lot in quarantine is not diluted',
      who: 'technician',
      ask: () => ['post', '/api/standards/diluted/preview', { ...dilution(), standardId: quarantined.id }],
      code: 'standards.not-dilutable',
      status: 409,
    },
    {
      says: 'so thin that the water outweighs the salt',
      who: 'technician',
      ask: () => ['post', '/api/standards/diluted/preview', { ...dilution(), waterReadingG: 50_000 }],
      code: 'reference.outside-domain',
      status: 422,
    },
    {
      says: 'expired when made',
      who: 'technician',
      ask: () => ['post', '/api/standards/prepared', { ...prepared, expiresOn: '2026-12-01' }],
      code: 'request.invalid',
      status: 422,
      issue: 'expiresOn',
    },
    {
      says: 'a code in use',
      who: 'technician',
      ask: () => ['post', '/api/standards/prepared', { ...prepared, code: 'KC-26-031' }],
      code: 'standards.code-taken',
      status: 409,
    },
  ].map((row) => row as Parameters<typeof refusals>[1][number]),
);

describe('solutions made in house', () => {
  it('are worked out before anything is stored, with U and its budget', async () => {
    const agent = await app.as('technician');
    const before = await Standard.count();
    const { body } = await agent.post('/api/standards/prepared/preview').send(weighing).expect(200);

    // 0.01 mol/kg less 0.06 % for the air, at 1408.23 µS/cm (Pratt et al. 2001), and 0.9 µS/cm of water.
    expect(body.molalityMolKg).toBeCloseTo(0.009994, 6);
    expect(body.saltConductivityUsCm).toBeCloseTo(1407.4, 0);
    expect(body.conductivityUsCm - body.saltConductivityUsCm).toBeCloseTo(0.9, 9);
    expect(body.words).toBe('in-house, not certified');
    expect(
      body.budget.reduce((total: number, row: { sharePercent: number }) => total + row.sharePercent, 0),
    ).toBeCloseTo(100, 6);
    expect(body.remarks.join(' ')).toContain('independent lot');
    expect(await Standard.count()).toBe(before);
    expect(app.events).toEqual([]);
  });

  it('become a quarantined lot that says how it was made and is never called certified', async () => {
    const balance = await anInstrument({
      code: 'BAL-02',
      kind: 'balance',
      uncertaintyUnit: 'g',
      expandedUncertainty: 0.0004,
    });
    const agent = await app.as('technician');
    const { body } = await agent
      .post('/api/standards/prepared')
      .send({ ...prepared, weighing: { ...weighing, saltBalanceId: balance.id }, openedLifeDays: 30 })
      .expect(201);

    expect(body).toMatchObject({
      code: 'IH-26-001',
      isInHouse: true,
      state: 'quarantined',
      isUsable: false,
      basis: 'molal',
      nominal: 0.01,
      issuedOn: '2026-12-01',
      openedLifeDays: 30,
      preparation: { method: 'weighed', preparedBy: 'Test technician', source: null },
    });
    expect(body.label).toContain('in-house value');
    expect(`${body.label} ${body.product}`).not.toContain('certified');
    expect(body.traceability).toContain('In-house, not certified.');
    expect(body.traceability).toContain('BAL-02');
    expect(body.certifiedConductivityUsCm).toBe(body.preparation.conductivityUsCm);
    expect(await app.audited('standards.prepared')).toMatchObject({
      newValue: { code: 'IH-26-001', preparation: { given: { kclReadingG: 0.745513 } } },
    });
    const history = await agent.get(`/api/standards/${body.id}/history`).expect(200);
    expect(history.body.items).toMatchObject([{ state: 'quarantined', by: 'Test technician' }]);
  });

  it('dilute a lot into a check solution with a table of its own, and name where it came from', async () => {
    const agent = await app.as('technician');
    const { body } = await agent
      .post('/api/standards/diluted')
      .send({ dilution: dilution(), code: 'ih-26-147', expiresOn: '2026-12-15', openedLifeDays: 1 })
      .expect(201);

    // 0.001 mol/L at 146.9 S cm²/mol (CRC Handbook) and 0.9 µS/cm of water, to 0.2 %.
    expect(Math.abs(body.certifiedConductivityUsCm / 147.2 - 1)).toBeLessThan(2e-3);
    expect(body).toMatchObject({
      basis: 'other',
      isInHouse: true,
      preparation: { method: 'diluted', source: { standardId: stock.id, code: 'KC-26-031' } },
    });
    expect(body.temperatureTable.map((row: { temperatureC: number }) => row.temperatureC)).toContain(20);
    const uses = await agent.get(`/api/standards/${stock.id}/uses`).expect(200);
    expect(uses.body.derivedLots).toMatchObject([{ code: 'IH-26-147', state: 'quarantined' }]);
  });
});

describe('where a lot was used', () => {
  it('says which probes rest on it, at the sites one may read', async () => {
    const [site, other] = [await aSite(), await aSite()];
    const [old, newer] = [await aStandard(), await aStandard()];
    const point = await aPoint(site.id);
    const [resting, moved, far] = [await aProbe(site.id), await aProbe(site.id), await aProbe(other.id)];
    const at = (probeId: number, standardId: number, day: string) =>
      aCheck(
        { probeId, pointId: probeId === resting.id ? point.id : null, standardId },
        { at: new Date(`2026-11-${day}T09:00:00Z`) },
      );
    await at(resting.id, old.id, '10');
    await at(resting.id, old.id, '20');
    await at(moved.id, old.id, '11');
    await at(moved.id, newer.id, '21');
    await at(far.id, old.id, '12');
    await aBottle(old.id);

    const here = await app.as({ role: 'auditor', siteId: site.id });
    const { body } = await here.get(`/api/standards/${old.id}/uses`).expect(200);

    expect(body.probes).toMatchObject([
      {
        probeId: resting.id,
        pointName: point.name,
        checkCount: 2,
        restsOnThisLot: true,
        lastOutcome: 'within-clear',
      },
      { probeId: moved.id, checkCount: 1, restsOnThisLot: false },
    ]);
    expect(body.ifRecalled).toEqual({
      checkCount: 3,
      calibrationCount: 0,
      probeCount: 2,
      probesWithoutOtherEvidence: 1,
    });
    expect(body.bottles).toEqual({ total: 1, unopened: 1, open: 0 });
    const everywhere = await (await app.as('manager')).get(`/api/standards/${old.id}/uses`).expect(200);
    expect(everywhere.body.ifRecalled).toMatchObject({ probeCount: 3, probesWithoutOtherEvidence: 2 });
  });
});
