import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Membership, Session, Setting, User } from '../../server/db/models/index.ts';
import { startTestApp, testPassword, type TestApp } from '../support/app.ts';
import { refusals } from '../support/refusals.ts';

let app: TestApp;

beforeAll(async () => {
  app = await startTestApp();
});
afterAll(() => app.stop());

const signIn = (email: string, password: string) =>
  app.nobody().post('/api/sessions').send({ email, password });

refusals(
  () => app,
  [
    {
      says: 'nobody asks who is signed in',
      who: null,
      ask: () => ['get', '/api/sessions/current'],
      code: 'sessions.required',
      status: 401,
    },
    {
      says: 'nobody signs out',
      who: null,
      ask: () => ['delete', '/api/sessions/current'],
      code: 'sessions.required',
      status: 401,
    },
    {
      says: 'an address that is none',
      who: null,
      ask: () => ['post', '/api/sessions', { email: 'nobody', password: 'x' }],
      code: 'request.invalid',
      status: 422,
      issue: 'email',
    },
    {
      says: 'no password',
      who: null,
      ask: () => ['post', '/api/sessions', { email: 'a@plant.example' }],
      code: 'request.invalid',
      status: 422,
      issue: 'password',
    },
  ],
);

describe('signing in', () => {
  it('answers 201 with what the person may start, and a cookie no script can read', async () => {
    const { email } = await app.person('manager');
    const answer = await signIn(email, testPassword);
    expect(answer.status).toBe(201);
    expect(answer.body).toMatchObject({
      user: { email },
      can: { readAudit: true, registerProbe: true, managePeople: false },
    });
    const [cookie] = answer.get('set-cookie') as unknown as string[];
    expect(cookie).toMatch(/^saltmark\.sid=.*HttpOnly/);
    expect(cookie).toMatch(/SameSite=Lax/);
    expect(await app.audited('sessions.signed-in')).toMatchObject({
      actorName: 'Test manager',
      actingRole: 'manager',
    });
  });

  it('starts every session under a new id, so that a planted one is worth nothing', async () => {
    const { email } = await app.person('operator');
    const agent = app.nobody();
    const first = (await agent.post('/api/sessions').send({ email, password: testPassword })).get(
      'set-cookie',
    );
    const second = (await agent.post('/api/sessions').send({ email, password: testPassword })).get(
      'set-cookie',
    );
    expect(String(second)).not.toBe(String(first));
  });

  it('does not say whether the address or the password was wrong', async () => {
    const { email } = await app.person('manager');
    const wrongPassword = await signIn(email, 'not-the-password');
    const wrongAddress = await signIn('nobody@plant.example', testPassword);
    expect(wrongPassword.status).toBe(401);
    expect({ ...wrongPassword.body, requestId: '' }).toEqual({ ...wrongAddress.body, requestId: '' });
    expect(await app.audited('sessions.sign-in-failed')).toMatchObject({
      newValue: { email: 'nobody@plant.example' },
    });
  });

  it('locks a person after five wrong passwords in a row, says so, records it, and opens again after a quarter of an hour', async () => {
    const { email, id } = await app.person('technician');
    for (let attempt = 0; attempt < 5; attempt += 1) await signIn(email, 'wrong');
    const locked = await signIn(email, testPassword);
    expect(locked.status).toBe(429);
    expect(locked.body.code).toBe('sessions.locked');
    expect(await app.audited('users.locked')).toMatchObject({ objectId: String(id) });
    app.clock.advance(15 * 60_000 + 1);
    expect((await signIn(email, testPassword)).status).toBe(201);
  });

  it('refuses somebody whose last grant has run out, and one who was deactivated', async () => {
    const { email, id } = await app.person('auditor');
    await Membership.update({ endsOn: '2026-11-30' }, { where: { userId: id } });
    expect((await signIn(email, testPassword)).body.code).toBe('sessions.no-grants');
    await User.update({ deactivatedAt: app.clock.now() }, { where: { id } });
    expect((await signIn(email, testPassword)).body.code).toBe('sessions.credentials-wrong');
  });

  it('takes rights from the database on every request: an ended grant ends them at once', async () => {
    const who = { role: 'administrator', siteId: null } as const;
    const agent = await app.as(who);
    expect((await agent.get('/api/users')).status).toBe(200);
    await Membership.update({ endedAt: app.clock.now() }, { where: { userId: (await app.person(who)).id } });
    expect((await agent.get('/api/users')).body.code).toBe('users.forbidden');
  });
});

describe('signing out', () => {
  it('ends this session only', async () => {
    const { email } = await app.person('operator');
    const [here, there] = [app.nobody(), app.nobody()];
    for (const agent of [here, there])
      await agent.post('/api/sessions').send({ email, password: testPassword });
    await here.delete('/api/sessions/current').expect(204);
    expect((await here.get('/api/sessions/current')).status).toBe(401);
    expect((await there.get('/api/sessions/current')).status).toBe(200);
    expect(await app.audited('sessions.signed-out')).toBeDefined();
  });

  it('ends every session everywhere, and the live connections with them', async () => {
    const { email, id } = await app.person('operator');
    const [here, there] = [app.nobody(), app.nobody()];
    for (const agent of [here, there])
      await agent.post('/api/sessions').send({ email, password: testPassword });
    await here.delete('/api/sessions').expect(204);
    expect((await there.get('/api/sessions/current')).status).toBe(401);
    expect(await Session.count({ where: { sess: { passport: { user: id } } } as never })).toBe(0);
    expect(app.disconnected).toContain(id);
  });
});

describe('writes from elsewhere', () => {
  const body = { email: 'a@plant.example', password: 'x' };
  it.each([
    ['a page of another site', { 'sec-fetch-site': 'cross-site' }],
    ['a page of a neighbouring name', { 'sec-fetch-site': 'same-site' }],
    ['a foreign origin', { origin: 'https://elsewhere.example' }],
    ['an opaque origin', { origin: 'null' }],
  ])('refuses %s', async (_says, headers) => {
    const answer = await app.nobody().post('/api/sessions').set(headers).send(body);
    expect(answer.status).toBe(403);
    expect(answer.body.code).toBe('request.forgery-suspected');
  });

  it('refuses a form post, which needs no permission to cross sites', async () => {
    const answer = await app.nobody().post('/api/sessions').type('form').send(body);
    expect(answer.body.code).toBe('request.unparsable');
  });
});

describe('the sign-in page', () => {
  it('shows demo sign-ins only while the demo is loaded', async () => {
    expect((await app.nobody().get('/api/sessions/welcome')).body.demo).toBeNull();
    await Setting.create({ key: 'demo', value: {} });
    const { demo } = (await app.nobody().get('/api/sessions/welcome')).body;
    expect(demo.signIns.map((one: { role: string }) => one.role)).toEqual([
      'technician',
      'manager',
      'operator',
      'auditor',
      'administrator',
    ]);
  });

  it('sends a strict content policy and no word about what runs here', async () => {
    const answer = await app.nobody().get('/api/sessions/welcome');
    expect(answer.get('content-security-policy')).toMatch(
      /default-src 'none';script-src 'self';style-src 'self'/,
    );
    expect(answer.get('x-powered-by')).toBeUndefined();
    expect(answer.get('cache-control')).toBe('no-store');
  });
});
