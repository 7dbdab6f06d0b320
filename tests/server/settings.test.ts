import { afterAll, beforeAll, expect, it } from 'vitest';
import { Mail, Notice, QuarantinedMessage, Setting } from '../../server/db/models/index.ts';
import { startTestApp, type TestApp } from '../support/app.ts';
import { refusals } from '../support/refusals.ts';
import { aProbe, aSite } from '../support/rows.ts';

let app: TestApp;
let siteId: number;
let otherSiteId: number;
let notice: Notice;
let message: QuarantinedMessage;

beforeAll(async () => {
  app = await startTestApp();
  siteId = (await aSite()).id;
  otherSiteId = (await aSite()).id;
  const probe = await aProbe(siteId);
  notice = await Notice.create({
    kind: 'cell-constant-without-record',
    at: app.clock.now(),
    detail: { from: 1, to: 1.1 },
    closedAt: null,
    deviceId: null,
    probeId: probe.id,
    closedBy: null,
  });
  message = await QuarantinedMessage.create({
    deviceName: 'device-1',
    clientId: 'device-1',
    topic: 'saltmark/1/device-1/readings',
    code: 'not-json',
    reason: 'The message is not JSON.',
    payload: Buffer.from([0x7b, 0xff, 0x00]),
    payloadBytes: 3,
    receivedAt: app.clock.now(),
    resolvedAt: null,
    resolution: null,
    resolvedBy: null,
  });
});
afterAll(() => app.stop());

const fitness = {
  value: { overdueFactor: 1.2, silentIntervals: 4 },
  reason: 'agreed in the weekly meeting',
  version: 0,
};

refusals(
  () => app,
  [
    {
      says: 'no session',
      who: null,
      ask: () => ['get', '/api/settings'],
      code: 'sessions.required',
      status: 401,
    },
    {
      says: 'a manager changes no setting',
      who: 'manager',
      ask: () => ['put', '/api/settings/check-fitness', fitness],
      code: 'settings.forbidden',
      status: 403,
    },
    {
      says: 'an administrator of one site changes no setting',
      who: () => ({ role: 'administrator', siteId }),
      ask: () => ['put', '/api/settings/check-fitness', fitness],
      code: 'settings.forbidden',
      status: 403,
    },
    {
      says: 'a setting that does not exist',
      who: 'administrator',
      ask: () => ['put', '/api/settings/colour', fitness],
      code: 'settings.unknown',
      status: 404,
    },
    {
      says: 'a value of the wrong shape',
      who: 'administrator',
      ask: () => [
        'put',
        '/api/settings/check-fitness',
        { ...fitness, value: { overdueFactor: 9, silentIntervals: 4 } },
      ],
      code: 'request.invalid',
      status: 422,
      issue: 'value.overdueFactor',
    },
    {
      says: 'a change of what somebody else changed',
      who: 'administrator',
      ask: () => ['put', '/api/settings/check-fitness', { ...fitness, version: 3 }],
      code: 'settings.changed-meanwhile',
      status: 409,
    },
    {
      says: 'an auditor reads no quarantine',
      who: 'auditor',
      ask: () => ['get', '/api/quarantine'],
      code: 'quarantine.forbidden',
      status: 403,
    },
    {
      says: 'an administrator of one site reads no quarantine',
      who: () => ({ role: 'administrator', siteId }),
      ask: () => ['get', '/api/quarantine'],
      code: 'quarantine.forbidden',
      status: 403,
    },
    {
      says: 'an unknown message',
      who: 'administrator',
      ask: () => ['post', '/api/quarantine/999999/resolve', { reason: 'seen' }],
      code: 'quarantine.not-found',
      status: 404,
    },
    {
      says: 'a manager reads no mail',
      who: 'manager',
      ask: () => ['get', '/api/mails'],
      code: 'mails.forbidden',
      status: 403,
    },
    {
      says: 'an operator closes no notice',
      who: 'operator',
      ask: () => ['post', `/api/notices/${notice.id}/close`, { reason: 'seen' }],
      code: 'probes.forbidden',
      status: 403,
    },
    {
      says: 'a manager of another site',
      who: () => ({ role: 'manager', siteId: otherSiteId }),
      ask: () => ['post', `/api/notices/${notice.id}/close`, { reason: 'seen' }],
      code: 'notices.not-found',
      status: 404,
    },
  ],
);

it('a setting changes with its reason, old and new value in the trail, and the next change needs the new version', async () => {
  const administrator = await app.as('administrator');
  const changed = await administrator.put('/api/settings/check-fitness').send(fitness).expect(200);
  expect(changed.body).toMatchObject({ value: fitness.value, version: 1 });
  expect((await Setting.findByPk('check-fitness'))!.value).toEqual(fitness.value);
  expect(await app.audited('settings.changed')).toMatchObject({
    oldValue: { overdueFactor: 1, silentIntervals: 5 },
    newValue: fitness.value,
    reason: fitness.reason,
  });
  expect(app.events).toContainEqual({
    slice: 'settings',
    id: 'check-fitness',
    kind: 'changed',
    siteId: null,
  });
  expect((await administrator.put('/api/settings/check-fitness').send(fitness)).body.code).toBe(
    'settings.changed-meanwhile',
  );
});

it('a quarantined message is shown byte for byte, settled once with a reason, and stays', async () => {
  const administrator = await app.as('administrator');
  const list = (await administrator.get('/api/quarantine?open=1').expect(200)).body;
  expect(list.items).toMatchObject([{ code: 'not-json', payloadBytes: 3, payloadBase64: 'e/8A' }]);
  const settle = () =>
    administrator.post(`/api/quarantine/${message.id}/resolve`).send({ reason: 'device replaced' });
  await settle().expect(200);
  expect((await settle()).body.code).toBe('quarantine.resolved');
  expect(await app.audited('quarantine.resolved')).toMatchObject({ reason: 'device replaced' });
  expect((await administrator.get('/api/quarantine?open=1')).body.total).toBe(0);
  expect((await administrator.get('/api/quarantine')).body.total).toBe(1);
});

it('a notice is closed by the manager of its site and seen by nobody of another', async () => {
  const elsewhere = await app.as({ role: 'operator', siteId: otherSiteId });
  expect((await elsewhere.get('/api/notices')).body.total).toBe(0);
  const manager = await app.as({ role: 'manager', siteId });
  await manager.post(`/api/notices/${notice.id}/close`).send({ reason: 'constant put back' }).expect(200);
  expect((await notice.reload()).closedAt).not.toBeNull();
  expect(await app.audited('notices.closed')).toMatchObject({
    siteId,
    actingRole: 'manager',
    reason: 'constant put back',
  });
});

it('the outbox is read by an administrator', async () => {
  await Mail.create({
    toAddress: 'a@plant.example',
    subject: 'Hello',
    textBody: 'Text',
    kind: 'tests',
    htmlBody: null,
    dedupeKey: null,
    lastError: null,
    sentAt: null,
  });
  const list = (await (await app.as('administrator')).get('/api/mails').expect(200)).body;
  expect(list.items).toMatchObject([{ to: 'a@plant.example', subject: 'Hello', sentAt: null }]);
});
