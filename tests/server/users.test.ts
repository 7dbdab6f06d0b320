import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { Mail, Membership, Session, User } from '../../server/db/models/index.ts';
import { startTestApp, testPassword, type TestApp } from '../support/app.ts';
import { refusals } from '../support/refusals.ts';
import { aSite } from '../support/rows.ts';

let app: TestApp;
let siteId: number;
let someone: User;

beforeAll(async () => {
  app = await startTestApp({ PUBLIC_URL: 'http://plant.example:4280' });
  siteId = (await aSite({ code: 'LWR', name: 'Lower Weir' })).id;
  someone = await app.person('operator');
  await app.as('administrator');
});
afterAll(() => app.stop());
beforeEach(() => {
  app.events.length = 0;
});

const newcomer = { email: 'Nia.Holt@plant.example', name: 'Nia Holt' };
const grant = { role: 'technician', endsOn: null, reason: 'joins the team' };

refusals(
  () => app,
  [
    {
      says: 'no session',
      who: null,
      ask: () => ['get', '/api/users'],
      code: 'sessions.required',
      status: 401,
    },
    {
      says: 'a manager reads no people',
      who: 'manager',
      ask: () => ['get', '/api/users'],
      code: 'users.forbidden',
      status: 403,
    },
    {
      says: 'an auditor reads no people',
      who: 'auditor',
      ask: () => ['get', `/api/users/${someone.id}`],
      code: 'users.forbidden',
      status: 403,
    },
    {
      says: 'a technician adds nobody',
      who: 'technician',
      ask: () => ['post', '/api/users', newcomer],
      code: 'users.forbidden',
      status: 403,
    },
    {
      says: 'an administrator of one site adds nobody',
      who: () => ({ role: 'administrator', siteId }),
      ask: () => ['post', '/api/users', newcomer],
      code: 'users.forbidden',
      status: 403,
    },
    {
      says: 'an unknown person',
      who: 'administrator',
      ask: () => ['get', '/api/users/999999'],
      code: 'users.not-found',
      status: 404,
    },
    {
      says: 'an address that is taken',
      who: 'administrator',
      ask: () => ['post', '/api/users', { ...newcomer, email: someone.email.toUpperCase() }],
      code: 'users.email-taken',
      status: 409,
    },
    {
      says: 'an address that is none',
      who: 'administrator',
      ask: () => ['post', '/api/users', { ...newcomer, email: 'nia' }],
      code: 'request.invalid',
      status: 422,
      issue: 'email',
    },
    {
      says: 'a change of what somebody else changed',
      who: 'administrator',
      ask: () => ['patch', `/api/users/${someone.id}`, { name: 'Other', version: 7 }],
      code: 'users.changed-meanwhile',
      status: 409,
    },
    {
      says: 'deactivating without a reason',
      who: 'administrator',
      ask: () => ['post', `/api/users/${someone.id}/deactivate`, { version: 0 }],
      code: 'request.invalid',
      status: 422,
      issue: 'reason',
    },
    {
      says: 'a manager grants no role',
      who: 'manager',
      ask: () => ['post', '/api/memberships', { ...grant, userId: someone.id, siteId }],
      code: 'memberships.forbidden',
      status: 403,
    },
    {
      says: 'an administrator of one site grants nothing at all sites',
      who: () => ({ role: 'administrator', siteId }),
      ask: () => ['post', '/api/memberships', { ...grant, userId: someone.id, siteId: null }],
      code: 'memberships.forbidden',
      status: 403,
    },
    {
      says: 'an auditor without an end',
      who: 'administrator',
      ask: () => ['post', '/api/memberships', { ...grant, role: 'auditor', userId: someone.id, siteId }],
      code: 'request.invalid',
      status: 422,
      issue: 'endsOn',
    },
    {
      says: 'a second role at the same place',
      who: 'administrator',
      ask: () => ['post', '/api/memberships', { ...grant, userId: someone.id, siteId: null }],
      code: 'memberships.exists',
      status: 409,
    },
    {
      says: 'ending an unknown grant',
      who: 'administrator',
      ask: () => ['post', '/api/memberships/999999/end', { reason: 'left' }],
      code: 'memberships.not-found',
      status: 404,
    },
    {
      says: 'a link that was never sent',
      who: null,
      ask: () => [
        'post',
        '/api/users/password-by-link',
        { token: 'x'.repeat(32), newPassword: 'a-new-long-password' },
      ],
      code: 'users.token-invalid',
      status: 422,
    },
    {
      says: 'a first administrator when there are people',
      who: null,
      ask: () => ['post', '/api/users/first', { ...newcomer, password: 'a-new-long-password' }],
      code: 'users.setup-done',
      status: 409,
    },
  ],
);

describe('a newcomer', () => {
  it('is added, invited by mail, sets a password by a link that works once, and signs in with the role granted', async () => {
    const administrator = await app.as('administrator');
    const created = await administrator.post('/api/users').send(newcomer).expect(201);
    expect(created.body).toMatchObject({ email: 'nia.holt@plant.example', hasPassword: false });
    expect(await app.audited('users.created')).toMatchObject({
      objectId: String(created.body.id),
      newValue: { name: 'Nia Holt' },
    });
    expect(app.events).toContainEqual({ slice: 'users', id: created.body.id, kind: 'created', siteId: null });

    const mail = await Mail.findOne({ where: { toAddress: 'nia.holt@plant.example' } });
    const token = /http:\/\/plant\.example:4280\/set-password\?token=(\S+)/.exec(mail!.textBody)![1]!;
    const body = { token, newPassword: 'four plain words here' };
    await app.nobody().post('/api/users/password-by-link').send(body).expect(204);
    expect((await app.nobody().post('/api/users/password-by-link').send(body)).body.code).toBe(
      'users.token-invalid',
    );

    await administrator
      .post('/api/memberships')
      .send({ ...grant, userId: created.body.id, siteId })
      .expect(201);
    const signedIn = await app
      .nobody()
      .post('/api/sessions')
      .send({ email: newcomer.email, password: body.newPassword });
    expect(signedIn.status).toBe(201);
    expect(signedIn.body.grants).toEqual([
      { siteId, siteName: 'Lower Weir', role: 'technician', endsOn: null },
    ]);
  });

  it('cannot use the link after a week', async () => {
    const administrator = await app.as('administrator');
    await administrator
      .post('/api/users')
      .send({ email: 'late@plant.example', name: 'Late Comer' })
      .expect(201);
    const mail = await Mail.findOne({ where: { toAddress: 'late@plant.example' } });
    const token = /token=(\S+)/.exec(mail!.textBody)![1]!;
    app.clock.advance(7 * 86_400_000 + 1);
    const answer = await app
      .nobody()
      .post('/api/users/password-by-link')
      .send({ token, newPassword: 'four plain words here' });
    expect(answer.body.code).toBe('users.token-invalid');
  });
});

describe('a person', () => {
  it('changes the own password, which ends the other sessions and not this one', async () => {
    const { email, id } = await app.person('technician');
    const [here, there] = [app.nobody(), app.nobody()];
    for (const agent of [here, there])
      await agent.post('/api/sessions').send({ email, password: testPassword }).expect(201);
    const wrong = await here
      .post('/api/users/me/password')
      .send({ currentPassword: 'no', newPassword: 'four plain words here' });
    expect(wrong.body.issues).toEqual([
      { path: 'currentPassword', message: 'This is not your current password.' },
    ]);
    const weak = await here
      .post('/api/users/me/password')
      .send({ currentPassword: testPassword, newPassword: 'aaaaaaaaaaaa' });
    expect(weak.body.code).toBe('users.password-weak');
    await here
      .post('/api/users/me/password')
      .send({ currentPassword: testPassword, newPassword: 'four plain words here' })
      .expect(204);
    expect((await here.get('/api/sessions/current')).status).toBe(200);
    expect((await there.get('/api/sessions/current')).status).toBe(401);
    expect(await app.audited('users.password-changed')).toMatchObject({ objectId: String(id) });
  });

  it('never leaves the server with a hash', async () => {
    const answer = await (await app.as('administrator')).get('/api/users').expect(200);
    expect(JSON.stringify(answer.body)).not.toMatch(/argon2|passwordHash|password_hash/);
  });

  it('is deactivated with a reason: sessions end, the row and its history stay', async () => {
    const { email, id } = await app.person({ role: 'operator', siteId });
    const agent = app.nobody();
    await agent.post('/api/sessions').send({ email, password: testPassword }).expect(201);
    const administrator = await app.as('administrator');
    await administrator
      .post(`/api/users/${id}/deactivate`)
      .send({ reason: 'left the company', version: 0 })
      .expect(200);
    expect((await agent.get('/api/sessions/current')).status).toBe(401);
    expect(await Session.count({ where: { sess: { passport: { user: id } } } as never })).toBe(0);
    expect((await User.findByPk(id))!.deactivatedAt).not.toBeNull();
    expect(await app.audited('users.deactivated')).toMatchObject({
      reason: 'left the company',
      oldValue: { deactivatedAt: null },
    });
    expect(app.disconnected).toContain(id);
  });

  it('cannot take away the own access', async () => {
    const administrator = await app.as('administrator');
    const { id } = await app.person('administrator');
    const answer = await administrator
      .post(`/api/users/${id}/deactivate`)
      .send({ reason: 'holiday', version: 0 });
    expect(answer.body.code).toBe('users.self-change');
  });
});

describe('a grant', () => {
  it('is ended with a reason, old and new in the trail, and the open pages reconnect', async () => {
    const { id } = await app.person({ role: 'manager', siteId });
    const row = (await Membership.findOne({ where: { userId: id } }))!;
    const administrator = await app.as('administrator');
    await administrator
      .post(`/api/memberships/${row.id}/end`)
      .send({ reason: 'moves to another site' })
      .expect(200);
    expect((await row.reload()).endedAt).not.toBeNull();
    expect(await app.audited('memberships.ended')).toMatchObject({
      siteId,
      reason: 'moves to another site',
      oldValue: { role: 'manager', siteId },
    });
    expect(app.disconnected).toContain(id);
  });

  it('is given by an administrator of that site for that site', async () => {
    const administrator = await app.as({ role: 'administrator', siteId });
    const { id } = await app.person('auditor');
    await administrator
      .post('/api/memberships')
      .send({ ...grant, userId: id, siteId })
      .expect(201);
    expect(await app.audited('memberships.granted')).toMatchObject({ siteId, actingRole: 'administrator' });
  });
});
