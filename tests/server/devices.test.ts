import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { AuditEvent, Device, ProbeEvent, type Probe, type Site } from '../../server/db/models/index.ts';
import { isDeviceSecret } from '../../server/ingest/device-secrets.ts';
import { startTestApp, type TestApp } from '../support/app.ts';
import { refusals } from '../support/refusals.ts';
import { aDevice, aProbe, aSite } from '../support/rows.ts';

let app: TestApp;
let site: Site;
let other: Site;
let bare: Probe;
let speaking: Probe;
let retired: Probe;
let device: Device;
let revoked: Device;

beforeAll(async () => {
  app = await startTestApp({ PUBLIC_URL: 'http://salt.plant.example:4280' });
  site = await aSite();
  other = await aSite();
  bare = await aProbe(site.id);
  speaking = await aProbe(site.id);
  retired = await aProbe(site.id, {
    status: 'retired',
    retiredAt: new Date('2026-06-01T00:00:00Z'),
    retiredReason: 'cracked body',
  });
  device = await aDevice(speaking.id, { name: 'lwr-cip-2' });
  revoked = await aDevice(speaking.id, { name: 'lwr-lost-1', revokedAt: new Date('2026-04-01T00:00:00Z') });
});
afterAll(() => app.stop());
beforeEach(() => {
  app.events.length = 0;
});

const issue = () => ({ probeId: bare.id, name: 'lwr-new-1' });
const why = { reason: 'transmitter swapped' };
const elsewhere = () => ({ role: 'administrator' as const, siteId: other.id });

refusals(
  () => app,
  [
    {
      says: 'no session',
      who: null,
      ask: () => ['get', '/api/devices'],
      code: 'sessions.required',
      status: 401,
    },
    {
      says: 'a manager issues none',
      who: 'manager',
      ask: () => ['post', '/api/devices', issue()],
      code: 'devices.forbidden',
      status: 403,
    },
    {
      says: 'a technician replaces none',
      who: 'technician',
      ask: () => ['post', `/api/devices/${device.id}/replace`, why],
      code: 'devices.forbidden',
      status: 403,
    },
    {
      says: 'a manager withdraws none',
      who: 'manager',
      ask: () => ['post', `/api/devices/${device.id}/revoke`, why],
      code: 'devices.forbidden',
      status: 403,
    },
    {
      says: 'a probe of another site',
      who: elsewhere,
      ask: () => ['post', '/api/devices', issue()],
      code: 'probes.not-found',
      status: 404,
    },
    {
      says: 'a device of another site',
      who: elsewhere,
      ask: () => ['post', `/api/devices/${device.id}/revoke`, why],
      code: 'devices.not-found',
      status: 404,
    },
    {
      says: 'an unknown probe',
      who: 'administrator',
      ask: () => ['post', '/api/devices', { ...issue(), probeId: 99_999 }],
      code: 'probes.not-found',
      status: 404,
    },
    {
      says: 'an unknown device',
      who: 'administrator',
      ask: () => ['post', '/api/devices/99999/replace', why],
      code: 'devices.not-found',
      status: 404,
    },
    {
      says: 'a name with a slash',
      who: 'administrator',
      ask: () => ['post', '/api/devices', { ...issue(), name: 'lwr/new' }],
      code: 'request.invalid',
      status: 422,
      issue: 'name',
    },
    {
      says: 'no reason',
      who: 'administrator',
      ask: () => ['post', `/api/devices/${device.id}/revoke`, {}],
      code: 'request.invalid',
      status: 422,
      issue: 'reason',
    },
    {
      says: 'a name in use',
      who: 'administrator',
      ask: () => ['post', '/api/devices', { ...issue(), name: 'lwr-cip-2' }],
      code: 'devices.name-taken',
      status: 409,
    },
    {
      says: 'a name once used',
      who: 'administrator',
      ask: () => ['post', '/api/devices', { ...issue(), name: 'lwr-lost-1' }],
      code: 'devices.name-taken',
      status: 409,
    },
    {
      says: 'a second device for a probe',
      who: 'administrator',
      ask: () => ['post', '/api/devices', { ...issue(), probeId: speaking.id }],
      code: 'devices.exists',
      status: 409,
    },
    {
      says: 'a retired probe',
      who: 'administrator',
      ask: () => ['post', '/api/devices', { ...issue(), probeId: retired.id }],
      code: 'probes.retired',
      status: 409,
    },
    {
      says: 'replacing what was withdrawn',
      who: 'administrator',
      ask: () => ['post', `/api/devices/${revoked.id}/replace`, why],
      code: 'devices.revoked',
      status: 409,
    },
  ],
);

/** Everything the database keeps about a device, its timeline and the trail, as text. */
async function everythingStored(): Promise<string> {
  const rows = await Promise.all([Device.findAll(), ProbeEvent.findAll(), AuditEvent.findAll()]);
  return JSON.stringify(rows);
}

describe('device credentials', () => {
  it('are issued once, shown once, and stored as a hash only', async () => {
    const agent = await app.as('administrator');

    const { body } = await agent.post('/api/devices').send(issue()).expect(201);

    expect(body).toMatchObject({
      username: 'lwr-new-1',
      brokerUrl: 'mqtt://salt.plant.example:4283',
      topicPrefix: 'saltmark/1/lwr-new-1/',
      device: {
        name: 'lwr-new-1',
        probeId: bare.id,
        isOnline: false,
        credentialsIssuedAt: '2026-12-01T12:00:00.000Z',
        revokedAt: null,
      },
    });
    // 192 bits in base64url are 32 characters.
    expect(body.password).toMatch(/^[\w-]{32}$/);
    const row = (await Device.findByPk(body.device.id))!;
    expect(isDeviceSecret(row.secretHash, body.password)).toBe(true);
    expect(await everythingStored()).not.toContain(body.password);
    expect((await agent.get(`/api/devices?probeId=${bare.id}`).expect(200)).text).not.toContain(
      body.password,
    );
    expect(await ProbeEvent.findOne({ where: { probeId: bare.id } })).toMatchObject({
      kind: 'credentials-issued',
      detail: { name: 'lwr-new-1' },
    });
    expect(await app.audited('devices.credentials-issued')).toMatchObject({
      siteId: site.id,
      newValue: { name: 'lwr-new-1', probeId: bare.id },
      actingRole: 'administrator',
    });
    expect(app.events.map(({ slice, kind }) => `${slice} ${kind}`)).toEqual([
      'devices created',
      'probes changed',
      'readings changed',
    ]);
  });

  it('are replaced under the same name; the old secret no longer counts', async () => {
    const agent = await app.as('administrator');
    const probe = await aProbe(site.id);
    const old = await aDevice(probe.id);

    const { body } = await agent.post(`/api/devices/${old.id}/replace`).send(why).expect(200);

    const row = (await Device.findByPk(old.id))!;
    expect(body.username).toBe(old.name);
    expect(isDeviceSecret(row.secretHash, body.password)).toBe(true);
    expect(isDeviceSecret(row.secretHash, 'known-only-to-tests')).toBe(false);
    expect(row.credentialsIssuedAt).toEqual(new Date('2026-12-01T12:00:00Z'));
    expect(await app.audited('devices.credentials-replaced')).toMatchObject({
      objectId: String(old.id),
      reason: 'transmitter swapped',
    });
    expect(await everythingStored()).not.toContain(body.password);
  });

  it('are withdrawn, after which the probe can be given new ones', async () => {
    const agent = await app.as({ role: 'administrator', siteId: site.id });
    const probe = await aProbe(site.id);
    const lost = await aDevice(probe.id);

    const { body } = await agent
      .post(`/api/devices/${lost.id}/revoke`)
      .send({ reason: 'stolen' })
      .expect(200);

    expect(body).toMatchObject({ id: lost.id, isOnline: false, revokedAt: '2026-12-01T12:00:00.000Z' });
    expect(await app.audited('devices.credentials-revoked')).toMatchObject({
      oldValue: { revokedAt: null },
      reason: 'stolen',
    });
    expect(await ProbeEvent.findOne({ where: { probeId: probe.id } })).toMatchObject({
      kind: 'credentials-revoked',
      detail: { reason: 'stolen' },
    });
    await agent.post('/api/devices').send({ probeId: probe.id, name: 'lwr-again-1' }).expect(201);
    const { body: list } = await agent.get(`/api/devices?probeId=${probe.id}`).expect(200);
    expect(list.items.map((one: { revokedAt: string | null }) => one.revokedAt === null).sort()).toEqual([
      false,
      true,
    ]);
  });

  it('of one probe go to one of two administrators who ask at once', async () => {
    const agent = await app.as('administrator');
    const probe = await aProbe(site.id);

    const answers = await Promise.all(
      ['twin-1', 'twin-2'].map((name) => agent.post('/api/devices').send({ probeId: probe.id, name })),
    );

    expect(answers.map(({ status }) => status).sort()).toEqual([201, 409]);
    expect(await Device.count({ where: { probeId: probe.id } })).toBe(1);
  });

  it('are listed for the sites one may read only', async () => {
    const agent = await app.as({ role: 'auditor', siteId: other.id });
    const { body } = await agent.get('/api/devices').expect(200);
    expect(body).toEqual({ items: [], total: 0, nextCursor: null });
  });
});
