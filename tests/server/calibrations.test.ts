import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import {
  Bottle,
  Check,
  DeviceCommand,
  Hold,
  Probe,
  ProbeEvent,
  Prompt,
} from '../../server/db/models/index.ts';
import { canonicalJson, sha256Hex } from '../../server/lib/hashing.ts';
import type { Calibration, CalibrationRecord } from '../../shared/contracts/calibrations.ts';
import { startTestApp, testNow, testPassword, type TestApp } from '../support/app.ts';
import { aBench, aRun, captureBody, stepBody, type Bench } from '../support/calibration-run.ts';

// A whole run is some thirty requests; several are made in one test.
vi.setConfig({ testTimeout: 120_000 });

let app: TestApp;
beforeAll(async () => {
  app = await startTestApp();
});
afterAll(() => app.stop());

const approve = async (id: number): Promise<Calibration> => {
  const manager = await app.as('manager');
  const answer = await manager
    .post(`/api/calibrations/${id}/review`)
    .send({ decision: 'approve', password: testPassword });
  expect(answer.body).toMatchObject({ status: 'approved' });
  return answer.body as Calibration;
};
const recordOf = async (id: number): Promise<CalibrationRecord> =>
  (await (await app.as('auditor')).get(`/api/calibrations/${id}/record.json`).expect(200)).body;

describe('a probe that is left as it is', () => {
  let bench: Bench;
  let signed: Calibration;

  it('is walked through in order, each result known only when its step is finished', async () => {
    bench = await aBench(app);
    const run = await aRun(app, { bench, errors: { asFound: -1.68, cleaned: -0.5 }, decision: 'leave' });
    const started = await run.goTo('as-found');
    expect(started.plan).toMatchObject({ canDecide: true });
    expect(started.currentStep).toBe('as-found');
    await run.captureReplicates('as-found', bench.lot, -1.68);
    expect(run.last.captures.filter(({ step }) => step === 'as-found')).toHaveLength(3);
    expect(run.last.judgement.asFound).toBeNull();
    expect(JSON.stringify(run.last)).not.toMatch(/referenceUsCm":\d/);
    await run.send('steps', stepBody({ step: 'as-found' }));
    expect(run.last.judgement.asFound?.errorPercent).toBeCloseTo(-1.68, 6);
    signed = await run.sign();
    expect(signed.steps.map(({ step }) => step)).not.toContain('as-left');
  });

  it('holds its point meanwhile and gives it back with the probe', async () => {
    const hold = await Hold.findOne({ where: { pointId: bench.point.id } });
    expect(hold?.reason).toBe('being calibrated by Test technician');
    expect(hold?.endedAt).not.toBeNull();
  });

  it('says that as left equals cleaned, and what dirt did', () => {
    const { judgement } = signed;
    expect(judgement.asLeftEqualsCleaned).toBe(true);
    expect(judgement.asLeft).toEqual(judgement.cleaned);
    expect(judgement.fouling?.changePercent).toBeCloseTo(-1.18, 6);
    expect(judgement.fouling?.isSignificant).toBe(true);
    expect(judgement.advice).toMatchObject({ decision: 'leave', needsReason: true });
    expect(judgement.secondPointAgrees).toBe(true);
    expect(judgement.temperatureErrorC).toBeCloseTo(0.04, 6);
    const shares = judgement.cleaned!.budget.reduce((sum, { sharePercent }) => sum + sharePercent, 0);
    expect(shares).toBeCloseTo(100, 6);
  });

  it('gets the first number of its site and year and a record whose hash anybody can take again', async () => {
    expect(signed.number).toBe(`${bench.site.code}-2026-0001`);
    expect(signed.signatures).toMatchObject([
      { meaning: 'performed', name: 'Test technician', statement: 'I performed this work as recorded.' },
    ]);
    const { record, recordHash, signatures } = await recordOf(signed.id);
    expect(sha256Hex(canonicalJson(record))).toBe(recordHash);
    expect(signatures[0]?.recordHash).toBe(recordHash);
    expect(await app.audited('calibrations.signed')).toMatchObject({ objectId: String(signed.id) });
  });

  it('has no effect before another person approves it', async () => {
    expect(await Check.count({ where: { probeId: bench.probe.id } })).toBe(0);
    expect(signed).toMatchObject({ status: 'signed', dueOn: null });
    expect(signed.can).toMatchObject({ approve: false, return: false, continue: false });
  });

  it('then counts: three comparisons, the next due date, no order to the device', async () => {
    await Prompt.create({
      kind: 'due-soon',
      dueOn: '2026-12-10',
      raisedAt: new Date(testNow),
      probeId: bench.probe.id,
      pointId: bench.point.id,
      siteId: bench.site.id,
    });
    app.events.length = 0;
    const approved = await approve(signed.id);
    expect(approved).toMatchObject({ dueOn: '2027-03-01', isAdjusted: false, command: null });
    const checks = await Check.findAll({ where: { probeId: bench.probe.id }, order: ['id'] });
    expect(checks.map(({ stage }) => stage)).toEqual(['as-found', 'as-found-cleaned', 'as-left']);
    expect(checks[2]?.errorPercent).toBeCloseTo(-0.5, 6);
    expect(await Prompt.count({ where: { probeId: bench.probe.id, closedAt: null } })).toBe(0);
    const told = new Set(
      app.events.filter(({ siteId }) => siteId === bench.site.id).map(({ slice }) => slice),
    );
    expect([...told]).toEqual(expect.arrayContaining(['calibrations', 'checks', 'probes', 'readings']));
  });

  it('takes one portion for each comparison from its bottle, opened at the first', async () => {
    const bottle = await Bottle.findByPk(bench.bottle.id);
    expect(bottle?.remainingMl).toBe(380);
    expect(bottle?.useByOn).toBe('2026-12-31');
    expect(await ProbeEvent.count({ where: { probeId: bench.probe.id, kind: 'cleaned' } })).toBe(1);
  });

  it('shows the drift since then at the next visit', async () => {
    const at = '2026-12-11T12:00:00.000Z';
    app.clock.set(at);
    const errors = { asFound: -0.6, cleaned: -0.6 };
    const run = await aRun(app, { bench, errors, decision: 'leave', at });
    await run.goTo('as-found');
    expect(run.last.judgement.driftSinceAsLeft).toBeNull();
    await run.goTo('decide');
    expect(run.last.judgement.driftSinceAsLeft?.changePercent).toBeCloseTo(-0.1, 4);
    expect(run.last.judgement.driftSinceAsLeft?.isSignificant).toBe(false);
    await run.send('stop', { reason: 'only looking', capturedAt: at });
    app.clock.set(testNow);
  });
});

describe('a probe that is adjusted', () => {
  let bench: Bench;
  let signed: Calibration;

  it('is judged as left with the new constant from the same raw readings', async () => {
    bench = await aBench(app);
    const run = await aRun(app, { bench, errors: { asFound: 2.9, cleaned: 2.4 }, decision: 'adjust' });
    await run.goTo('decide');
    const { advice, cleaned } = run.last.judgement;
    expect(advice).toMatchObject({ decision: 'adjust', needsReason: false });
    expect(cleaned?.outcome).toBe('outside-clear');
    expect(advice?.proposedCellConstantPerCm).toBeCloseTo(1 / 1.024, 4);
    signed = await run.sign();
    expect(signed.steps.map(({ step }) => step)).toContain('as-left');
    expect(signed.judgement.asLeftEqualsCleaned).toBe(false);
    expect(signed.judgement.asLeft?.errorPercent).toBeCloseTo(0, 2);
    expect(signed.judgement.asLeft?.outcome).toBe('within-clear');
    expect(signed).toMatchObject({ isAdjusted: true, command: null });
  });

  it('changes the record of the probe and orders the device only when it is approved', async () => {
    expect((await Probe.findByPk(bench.probe.id))?.cellConstantPerCm).toBe(1);
    const approved = await approve(signed.id);
    const constant = approved.cellConstantAfterPerCm!;
    expect(constant).toBe(0.97656);
    expect((await Probe.findByPk(bench.probe.id))?.cellConstantPerCm).toBe(constant);
    expect(approved.command).toMatchObject({ state: 'waiting', cellConstantPerCm: constant });
    expect(await ProbeEvent.count({ where: { probeId: bench.probe.id, kind: 'adjusted' } })).toBe(1);
    expect(await DeviceCommand.count({ where: { calibrationId: signed.id } })).toBe(1);
  });
});

describe('a site that asks for no review', () => {
  it('lets a run take effect with its signature, and there is nothing left to approve', async () => {
    const bench = await aBench(app, { site: { policy: { reviewRequired: false } } });
    const run = await aRun(app, { bench, errors: { asFound: 0.1, cleaned: 0.1 }, decision: 'leave' });
    const signed = await run.sign();
    expect(signed).toMatchObject({ status: 'signed', dueOn: '2027-03-01' });
    expect(await Check.count({ where: { probeId: bench.probe.id } })).toBe(3);
    const manager = await app.as('manager');
    const answer = await manager
      .post(`/api/calibrations/${run.id}/review`)
      .send({ decision: 'approve', password: testPassword });
    expect(answer.body.code).toBe('calibrations.review-not-needed');
  });
});

describe('interruptions', () => {
  it('stopping for safety keeps what was recorded and the hold as it is', async () => {
    const bench = await aBench(app);
    const run = await aRun(app, { bench, errors: { asFound: 0, cleaned: 0 }, decision: 'leave' });
    await run.goTo('clean');
    const stop = { reason: 'steam leak beside the probe', capturedAt: testNow };
    const stopped = await run.send('stop', stop);
    expect(stopped).toMatchObject({ status: 'stopped', stoppedReason: stop.reason, currentStep: null });
    expect(stopped.captures).toHaveLength(4);
    expect((await Hold.findOne({ where: { pointId: bench.point.id } }))?.endedAt).toBeNull();
    expect(await app.audited('calibrations.stopped')).toMatchObject({ reason: stop.reason });
    await run.send('stop', stop);
    const after = await run.ask('steps', stepBody({ step: 'clean', agent: 'water', minutes: 1 }));
    expect(after.body.code).toBe('calibrations.not-running');
    const again = await aRun(app, { bench, errors: { asFound: 0, cleaned: 0 }, decision: 'leave' });
    expect((await again.start()).status).toBe('running');
  });

  it('a hand-over is recorded, and then only the other person goes on', async () => {
    const bench = await aBench(app);
    const other = { role: 'technician', siteId: bench.site.id } as const;
    const { id: toUserId } = await app.person(other);
    const run = await aRun(app, { bench, errors: { asFound: 0, cleaned: 0 }, decision: 'leave' });
    await run.goTo('as-found');
    const handed = await run.send('hand-over', { toUserId, reason: 'battery is flat' });
    expect(handed).toMatchObject({ performerId: toUserId, can: { continue: false } });
    expect(await app.audited('calibrations.handed-over')).toMatchObject({ reason: 'battery is flat' });
    expect((await run.ask('captures', captureBody('as-found'))).body.code).toBe('calibrations.not-performer');
    const theirs = await app.as(other);
    const resumed = await theirs.get(`/api/calibrations/${run.id}`);
    expect(resumed.body).toMatchObject({ currentStep: 'as-found', can: { continue: true } });
    const captured = await theirs.post(`/api/calibrations/${run.id}/captures`).send(captureBody('as-found'));
    expect(captured.status).toBe(200);
    await theirs
      .post(`/api/calibrations/${run.id}/stop`)
      .send({ reason: 'end of story', capturedAt: testNow });
  });
});

describe('review and amendment', () => {
  it('a returned record stays; its amendment has its own number, and brings the run into effect', async () => {
    const bench = await aBench(app);
    const run = await aRun(app, { bench, errors: { asFound: 0.3, cleaned: 0.2 }, decision: 'leave' });
    const signed = await run.sign();
    const before = await recordOf(run.id);
    const manager = await app.as('manager');
    const returned = await manager
      .post(`/api/calibrations/${run.id}/review`)
      .send({ decision: 'return', reason: 'Which acid was used?', password: testPassword });
    expect(returned.body).toMatchObject({ status: 'returned' });
    expect(returned.body.signatures[1]).toMatchObject({ meaning: 'returned', note: 'Which acid was used?' });

    const words = {
      aspect: 'cleaning agent',
      text: 'Citric acid, 5 % by mass.',
      reason: 'asked in review',
      password: testPassword,
    };
    const technician = await app.as('technician');
    const amended = await technician.post(`/api/calibrations/${run.id}/amend`).send(words);
    expect(amended.status).toBe(201);
    expect(amended.body).toMatchObject({
      number: `${bench.site.code}-2026-0002`,
      amends: { id: run.id, number: signed.number },
      status: 'signed',
    });
    const after = await recordOf(run.id);
    expect(after).toEqual({
      ...before,
      status: 'amended',
      signatures: after.signatures,
      amendedBy: amended.body.number,
    });
    const amendment = await recordOf(amended.body.id);
    expect(amendment.record).toMatchObject({
      amends: { number: signed.number, recordHash: before.recordHash },
    });

    expect(await Check.count({ where: { probeId: bench.probe.id } })).toBe(0);
    await approve(amended.body.id);
    expect(await Check.count({ where: { probeId: bench.probe.id } })).toBe(3);
    const twice = await technician.post(`/api/calibrations/${run.id}/amend`).send(words);
    expect(twice.body.code).toBe('calibrations.amended');
  });

  it('a wrong password signs nothing', async () => {
    const bench = await aBench(app);
    const run = await aRun(app, { bench, errors: { asFound: 0, cleaned: 0 }, decision: 'leave' });
    await run.goTo('sign');
    const answer = await run.ask('sign', { password: 'not-this-one', capturedAt: testNow });
    expect(answer.body.code).toBe('calibrations.password-wrong');
    expect((await run.sign()).number).toBe(`${bench.site.code}-2026-0001`);
    expect((await run.ask('sign', { password: testPassword, capturedAt: testNow })).body.number).toBe(
      `${bench.site.code}-2026-0001`,
    );
  });
});
