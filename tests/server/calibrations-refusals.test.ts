import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import {
  Calibration,
  Capture,
  Device,
  DeviceBoot,
  Procedure,
  Signature,
} from '../../server/db/models/index.ts';
import { startTestApp, testNow, testPassword, type TestApp } from '../support/app.ts';
import {
  aBench,
  aBottle,
  aRun,
  aThermometer,
  captureBody,
  shownIn,
  startBody,
  stepBody,
  type Bench,
  type RunStory,
} from '../support/calibration-run.ts';
import { refusals, type Refusal } from '../support/refusals.ts';
import { aDevice, aPoint, aProbe, aStandard, installed, someReadings } from '../support/rows.ts';

// A whole run is some thirty requests; several are made in one test.
vi.setConfig({ testTimeout: 120_000 });

let app: TestApp;
/** A bench nobody has begun at, one with a run at its first capture, one signed. */
let fresh: Bench;
let busy: Bench;
let run: RunStory;
let signed: RunStory;
let captureId: number;
const odd = { spare: 0, inductive: 0, expired: 0, dilute: 0, overdue: 0, foreignBottle: 0, elsewhere: 0 };
let colleague: number;
let otherSite: number;

const errors = { asFound: 0.2, cleaned: 0.2 };

beforeAll(async () => {
  app = await startTestApp();
  [fresh, busy] = [await aBench(app), await aBench(app)];
  run = await aRun(app, { bench: busy, errors, decision: 'leave' });
  await run.goTo('as-found');
  captureId = (await run.capture('as-found')).captures.at(-1)!.id;
  signed = await aRun(app, { bench: await aBench(app), errors, decision: 'leave' });
  await signed.sign();
  odd.spare = (await aProbe(fresh.site.id)).id;
  odd.expired = (await aStandard({ expiresOn: '2026-11-30' })).id;
  odd.dilute = (
    await aStandard({
      basis: 'other',
      nominal: null,
      certifiedConductivityUsCm: 25,
      expandedUncertaintyUsCm: 0.2,
      coverageFactor: 2,
    })
  ).id;
  odd.overdue = (await aThermometer({ dueOn: '2026-11-30' })).id;
  odd.foreignBottle = (await aBottle(busy.secondLot, busy.site.id)).id;
  const elsewhere = await aBench(app);
  otherSite = elsewhere.site.id;
  odd.elsewhere = elsewhere.probe.id;
  colleague = (await app.person('operator')).id;
}, 120_000);
afterAll(() => app.stop());

const start = (more: object = {}) =>
  ['post', '/api/calibrations', startBody(fresh, more)] as ['post', string, object];
const deed = (path: string, body: object, story = () => run) =>
  ['post', `/api/calibrations/${story().id}/${path}`, body] as ['post', string, object];
const theSigned = () => signed;
const asFound = () => captureBody('as-found', { conductivityUsCm: shownIn(busy.lot, 0.2) });
const exclusion = () => ({ key: randomUUID(), code: 'bubble', capturedAt: testNow });
const review = { decision: 'approve', password: testPassword };
const amendment = { aspect: 'note', text: 'A word more.', reason: 'asked for', password: testPassword };
const elsewhereOnly = () => ({ role: 'technician', siteId: otherSite }) as const;

const writes: [says: string, ask: Refusal['ask']][] = [
  ['start', () => start()],
  ['finish a step', () => deed('steps', stepBody({ step: 'as-found' }))],
  ['capture', () => deed('captures', asFound())],
  ['exclude', () => deed(`captures/${captureId}/exclude`, exclusion())],
  ['stop', () => deed('stop', { reason: 'no reason', capturedAt: testNow })],
  ['hand over', () => deed('hand-over', { toUserId: colleague, reason: 'no reason' })],
  ['sign', () => deed('sign', { password: testPassword, capturedAt: testNow })],
  ['review', () => deed('review', review, theSigned)],
  ['amend', () => deed('amend', amendment, theSigned)],
  ['order again', () => deed('command', {}, theSigned)],
];

describe('every write', () => {
  refusals(
    () => app,
    writes.flatMap(([says, ask]): Refusal[] => [
      { says: `nobody may ${says}`, who: null, ask, code: 'sessions.required', status: 401 },
      ...(['auditor', 'operator', 'administrator'] as const).map((who) => ({
        says: `${who}: ${says}`,
        who,
        ask,
        code: 'calibrations.forbidden' as const,
        status: 403,
      })),
      {
        says: `another site: ${says}`,
        who: elsewhereOnly,
        ask,
        code: says === 'start' ? 'probes.not-found' : 'calibrations.not-found',
        status: 404,
      },
    ]),
  );
});

describe('a start', () => {
  refusals(
    () => app,
    [
      {
        says: 'a probe on the shelf',
        who: 'technician',
        ask: () => start({ probeId: odd.spare }),
        code: 'calibrations.not-installed',
        status: 409,
      },
      {
        says: 'a probe in work',
        who: 'manager',
        ask: () => start({ probeId: busy.probe.id, bottleId: null }),
        code: 'calibrations.already-running',
        status: 409,
      },
      {
        says: 'an expired lot',
        who: 'technician',
        ask: () => start({ standardId: odd.expired, bottleId: null }),
        code: 'calibrations.lot-unusable',
        status: 409,
      },
      {
        says: 'an override by oneself',
        who: 'manager',
        ask: () =>
          start({
            standardId: odd.expired,
            bottleId: null,
            override: { byUserId: managerId(), password: testPassword, reason: 'no other lot' },
          }),
        code: 'calibrations.lot-unusable',
        status: 409,
      },
      {
        says: 'an override without the right',
        who: 'technician',
        ask: () =>
          start({
            standardId: odd.expired,
            bottleId: null,
            override: { byUserId: colleague, password: testPassword, reason: 'no other lot' },
          }),
        code: 'calibrations.lot-unusable',
        status: 409,
      },
      {
        says: 'too dilute for a beaker',
        who: 'technician',
        ask: () => start({ standardId: odd.dilute, bottleId: null }),
        code: 'calibrations.open-beaker',
        status: 409,
      },
      {
        says: 'an overdue thermometer',
        who: 'technician',
        ask: () => start({ thermometerId: odd.overdue }),
        code: 'instruments.overdue',
        status: 409,
      },
      {
        says: 'no thermometer where the sensor is checked',
        who: 'technician',
        ask: () => start({ thermometerId: null }),
        code: 'request.invalid',
        status: 422,
        issue: 'thermometerId',
      },
      {
        says: 'no second lot where a second point is verified',
        who: 'technician',
        ask: () => start({ secondStandardId: null }),
        code: 'request.invalid',
        status: 422,
        issue: 'secondStandardId',
      },
      {
        says: 'the same lot twice',
        who: 'technician',
        ask: () => start({ secondStandardId: fresh.lot.id }),
        code: 'request.invalid',
        status: 422,
        issue: 'secondStandardId',
      },
      {
        says: 'a bottle of another lot',
        who: 'technician',
        ask: () => start({ bottleId: odd.foreignBottle }),
        code: 'request.invalid',
        status: 422,
        issue: 'bottleId',
      },
      {
        says: 'a procedure for another kind',
        who: 'technician',
        ask: () => start({ procedureId: odd.inductive }),
        code: 'procedures.not-found',
        status: 404,
      },
      {
        says: 'a time to come',
        who: 'technician',
        ask: () => start({ capturedAt: '2026-12-02T12:00:00.000Z' }),
        code: 'request.invalid',
        status: 422,
        issue: 'capturedAt',
      },
      {
        says: 'an unknown probe',
        who: 'technician',
        ask: () => start({ probeId: 999_999 }),
        code: 'probes.not-found',
        status: 404,
      },
      {
        says: 'no key',
        who: 'technician',
        ask: () => start({ key: undefined }),
        code: 'request.invalid',
        status: 422,
        issue: 'key',
      },
    ],
  );
});

let manager = 0;
const managerId = () => manager;
beforeAll(async () => {
  manager = (await app.person('manager')).id;
  odd.inductive = (await Procedure.findOne({ where: { code: 'in-line-inductive' } }))!.id;
});

describe('a run', () => {
  refusals(
    () => app,
    [
      {
        says: 'cleaning before as found',
        who: 'technician',
        ask: () => deed('steps', stepBody({ step: 'clean', agent: 'water', minutes: 1 })),
        code: 'calibrations.step-order',
        status: 409,
      },
      {
        says: 'deciding before as found',
        who: 'technician',
        ask: () => deed('steps', stepBody({ step: 'decide', decision: 'adjust' })),
        code: 'calibrations.step-order',
        status: 409,
      },
      {
        says: 'a step done before',
        who: 'technician',
        ask: () => deed('steps', stepBody({ step: 'identify', by: 'scan', serial: busy.probe.serial })),
        code: 'calibrations.step-order',
        status: 409,
      },
      {
        says: 'too few replicates',
        who: 'technician',
        ask: () => deed('steps', stepBody({ step: 'as-found' })),
        code: 'calibrations.step-incomplete',
        status: 422,
        issue: 'captures',
      },
      {
        says: 'a capture of a later step',
        who: 'technician',
        ask: () => deed('captures', captureBody('as-left')),
        code: 'calibrations.step-order',
        status: 409,
      },
      {
        says: 'signing before the end',
        who: 'technician',
        ask: () => deed('sign', { password: testPassword, capturedAt: testNow }),
        code: 'calibrations.step-order',
        status: 409,
      },
      {
        says: 'somebody else at it',
        who: 'manager',
        ask: () => deed('captures', asFound()),
        code: 'calibrations.not-performer',
        status: 403,
      },
      {
        says: 'mS typed for µS',
        who: 'technician',
        ask: () => deed('captures', captureBody('as-found', { conductivityUsCm: 1.408 })),
        code: 'calibrations.order-of-magnitude',
        status: 422,
        issue: 'conductivityUsCm',
      },
      {
        says: 'a stream reading without its number',
        who: 'technician',
        ask: () => deed('captures', captureBody('as-found', { source: 'stream' })),
        code: 'request.invalid',
        status: 422,
        issue: 'n',
      },
      {
        says: 'an unknown capture',
        who: 'technician',
        ask: () => deed('captures/999999/exclude', exclusion()),
        code: 'calibrations.capture-not-found',
        status: 404,
      },
      {
        says: 'handing over to an operator',
        who: 'technician',
        ask: () => deed('hand-over', { toUserId: colleague, reason: 'tea break' }),
        code: 'calibrations.hand-over-impossible',
        status: 409,
      },
      {
        says: 'a review of what is not signed',
        who: 'manager',
        ask: () => deed('review', review),
        code: 'calibrations.not-signed',
        status: 409,
      },
      {
        says: 'an amendment of what is not signed',
        who: 'technician',
        ask: () => deed('amend', amendment),
        code: 'calibrations.not-signed',
        status: 409,
      },
      {
        says: 'a step after the signature',
        who: 'technician',
        ask: () => deed('steps', stepBody({ step: 'as-found' }), theSigned),
        code: 'calibrations.not-running',
        status: 409,
      },
      {
        says: 'a capture after the signature',
        who: 'technician',
        ask: () => deed('captures', asFound(), theSigned),
        code: 'calibrations.not-running',
        status: 409,
      },
      {
        says: 'stopping after the signature',
        who: 'technician',
        ask: () => deed('stop', { reason: 'too late', capturedAt: testNow }, theSigned),
        code: 'calibrations.not-running',
        status: 409,
      },
      {
        says: 'returning without a reason',
        who: 'manager',
        ask: () => deed('review', { ...review, decision: 'return' }, theSigned),
        code: 'request.invalid',
        status: 422,
        issue: 'reason',
      },
      {
        says: 'an order that was never made',
        who: 'technician',
        ask: () => deed('command', {}, theSigned),
        code: 'calibrations.command-not-open',
        status: 409,
      },
      {
        says: 'a run nobody knows',
        who: 'auditor',
        ask: () => ['get', '/api/calibrations/999999'],
        code: 'calibrations.not-found',
        status: 404,
      },
      {
        says: 'a run of another site',
        who: elsewhereOnly,
        ask: () => ['get', `/api/calibrations/${run.id}`],
        code: 'calibrations.not-found',
        status: 404,
      },
      {
        says: 'the record of a running one',
        who: 'auditor',
        ask: () => ['get', `/api/calibrations/${run.id}/record.json`],
        code: 'calibrations.not-signed',
        status: 409,
      },
    ],
  );

  it('has no address that edits or deletes', async () => {
    const technician = await app.as('technician');
    for (const verb of ['patch', 'put', 'delete'] as const) {
      expect((await technician[verb](`/api/calibrations/${run.id}`)).status).toBe(404);
      expect((await technician[verb](`/api/calibrations/${run.id}/captures/${captureId}`)).status).toBe(404);
    }
  });

  it('of a manager is never approved by the same manager, nor by one who had a hand in it', async () => {
    const bench = await aBench(app);
    const own = await aRun(app, { bench, errors, decision: 'leave' }, 'manager');
    await own.goTo('as-found');
    await own.send('hand-over', { toUserId: (await app.person('technician')).id, reason: 'called away' });
    const theirs = await aRun(app, { bench, errors, decision: 'leave' });
    theirs.id = own.id;
    theirs.last = own.last;
    await theirs.sign();
    expect((await own.ask('review', review)).body.code).toBe('calibrations.own-approval');
  });

  it('stops at a probe of another serial or another cell constant', async () => {
    const other = await aRun(app, { bench: await aBench(app), errors, decision: 'leave' });
    await other.start();
    const wrong = await other.ask(
      'steps',
      stepBody({ step: 'identify', by: 'scan', serial: 'SOMETHING-ELSE' }),
    );
    expect(wrong.body).toMatchObject({ code: 'calibrations.wrong-probe', status: 409 });
    const { serial } = other.options.bench.probe;
    const changed = await other.ask(
      'steps',
      stepBody({ step: 'identify', by: 'scan', serial, cellConstantPerCm: 1.02 }),
    );
    expect(changed.body).toMatchObject({ code: 'calibrations.wrong-probe', status: 409 });
  });

  it('lets another person answer for an expired lot, and keeps who and why', async () => {
    const bench = await aBench(app);
    const technician = await app.as('technician');
    const override = { byUserId: manager, password: testPassword, reason: 'no other lot on site' };
    const body = startBody(bench, { standardId: odd.expired, bottleId: null, override });
    const wrong = await technician
      .post('/api/calibrations')
      .send({ ...body, override: { ...override, password: 'guess' } });
    expect(wrong.body.code).toBe('calibrations.password-wrong');
    const answer = await technician.post('/api/calibrations').send(body);
    expect(answer.status).toBe(201);
    expect(answer.body.override).toEqual({ by: 'Test manager', reason: 'no other lot on site' });
  });

  it('refuses an adjustment beyond bounds, and one against the advice without a reason', async () => {
    const worn = await aRun(app, {
      bench: await aBench(app),
      errors: { asFound: -12, cleaned: -12 },
      decision: 'adjust',
      reason: 'try',
    });
    await worn.goTo('decide');
    expect(worn.last.judgement.advice?.decision).toBe('replace');
    const beyond = await worn.ask(
      'steps',
      stepBody({ step: 'decide', decision: 'adjust', reason: 'try it' }),
    );
    expect(beyond.body.code).toBe('calibrations.constant-out-of-bounds');
    const jump = await aRun(app, {
      bench: await aBench(app),
      errors: { asFound: 4, cleaned: 4 },
      decision: 'adjust',
    });
    await jump.goTo('decide');
    expect(jump.last.judgement.advice).toMatchObject({ decision: 'adjust', needsReason: true });
    const silent = await jump.ask('steps', stepBody({ step: 'decide', decision: 'adjust' }));
    expect(silent.body.code).toBe('calibrations.adjustment-reason');
  });
});

describe('the same deed sent twice', () => {
  it('starts one run', async () => {
    const body = startBody(await aBench(app));
    const technician = await app.as('technician');
    const first = await technician.post('/api/calibrations').send(body);
    const second = await technician.post('/api/calibrations').send(body);
    expect(second.body).toEqual(first.body);
    const other = await technician.post('/api/calibrations').send({ ...body, thermometerId: odd.overdue });
    expect(other.body.code).toBe('calibrations.key-reused');
    expect(await Calibration.count({ where: { key: body.key } })).toBe(1);
  });

  it('captures one reading, finishes one step, excludes once', async () => {
    const story = await aRun(app, { bench: await aBench(app), errors, decision: 'leave' });
    await story.goTo('as-found');
    const body = captureBody('as-found', { conductivityUsCm: shownIn(story.options.bench.lot, 0.3) });
    const first = await story.send('captures', body);
    expect((await story.send('captures', body)).captures).toEqual(first.captures);
    expect((await story.ask('captures', { ...body, temperatureC: 24 })).body.code).toBe(
      'calibrations.key-reused',
    );
    const without = exclusion();
    const excluded = await story.send(`captures/${first.captures.at(-1)!.id}/exclude`, without);
    expect(excluded.captures.at(-1)!.excluded).toMatchObject({ code: 'bubble', by: 'Test technician' });
    expect(await story.send(`captures/${first.captures.at(-1)!.id}/exclude`, without)).toEqual(excluded);
    const again = await story.ask(`captures/${first.captures.at(-1)!.id}/exclude`, exclusion());
    expect(again.body.code).toBe('calibrations.capture-excluded');
    await story.captureReplicates('as-found', story.options.bench.lot, 0.2);
    const step = stepBody({ step: 'as-found' });
    const finished = await story.send('steps', step);
    expect(finished.judgement.asFound?.replicateCount).toBe(3);
    expect(finished.captures.at(-1)?.position).toBe(4);
    expect(await story.send('steps', step)).toEqual(finished);
    const after = await story.ask(`captures/${finished.captures.at(-1)!.id}/exclude`, exclusion());
    expect(after.body.code).toBe('calibrations.step-order');
  });

  it('takes a reading of the stream only as it was stored, and each once', async () => {
    const bench = await aBench(app);
    await Device.update({ revokedAt: new Date(testNow) }, { where: { id: bench.device.id } });
    const device = await aDevice(bench.probe.id, { reportedCellConstantPerCm: 1 });
    const conductivityUsCm = shownIn(bench.lot, 0.2);
    await someReadings(bench.probe.id, device.id, [
      { at: new Date(testNow), conductivityUsCm, temperatureC: 25 },
    ]);
    const { boot } = (await DeviceBoot.findOne({ where: { deviceId: device.id } }))!;
    const story = await aRun(app, { bench, errors, decision: 'leave' });
    await story.goTo('as-found');
    const [row] = await app.sequelize.models['Reading']!.findAll({ where: { deviceId: device.id } });
    const n = row!.get('n') as number;
    const body = captureBody('as-found', { source: 'stream', boot, n, conductivityUsCm });
    const other = await story.ask('captures', { ...body, conductivityUsCm: conductivityUsCm + 1 });
    expect(other.body.issues).toMatchObject([{ path: 'conductivityUsCm' }]);
    await story.send('captures', body);
    const twice = await story.ask('captures', { ...body, key: randomUUID() });
    expect(twice.body.issues).toMatchObject([{ path: 'n' }]);
    const capture = await Capture.findOne({ where: { calibrationId: story.id, source: 'stream' } });
    expect(capture).toMatchObject({ deviceId: device.id, n, cellConstantPerCm: 1 });
  });
});

describe('the database itself', () => {
  it('changes nothing of a signed record, and forgets no run', async () => {
    const row = (await Calibration.findByPk(signed.id))!;
    await expect(row.update({ permitNumber: 'W-0' })).rejects.toThrow('write an amendment');
    await row.reload();
    await expect(row.update({ tolerancePercent: 9 })).rejects.toThrow('fixed when the run starts');
    await row.reload();
    await expect(row.update({ status: 'running' })).rejects.toThrow();
    await row.reload();
    await expect(row.destroy()).rejects.toThrow('delete refused');
    await expect(Signature.destroy({ where: { calibrationId: signed.id } })).rejects.toThrow(
      'permission denied',
    );
  });

  it('numbers without gaps when many sign at once', async () => {
    const bench = await aBench(app);
    const stories: RunStory[] = [];
    for (let place = 0; place < 2; place += 1) {
      const point = await aPoint(bench.site.id, { tolerancePercent: 2 });
      const probe = await aProbe(bench.site.id);
      await installed(probe, point, manager);
      const story = await aRun(app, { bench: { ...bench, point, probe }, errors, decision: 'leave' });
      await story.goTo('sign', { bottleId: null });
      stories.push(story);
    }
    const refused = await stories[0]!.ask('sign', { password: 'wrong', capturedAt: testNow });
    expect(refused.status).toBe(422);
    const answers = await Promise.all(stories.map((story) => story.sign()));
    expect(answers.map(({ number }) => number).toSorted()).toEqual(
      [1, 2].map((n) => `${bench.site.code}-2026-000${n}`),
    );
  });
});
