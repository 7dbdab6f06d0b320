import { afterAll, beforeAll, expect, it } from 'vitest';
import { Membership, User } from '../../server/db/models/index.ts';
import { startTestApp, type TestApp } from '../support/app.ts';

let app: TestApp;
beforeAll(async () => {
  app = await startTestApp();
});
afterAll(() => app.stop());

const first = { email: 'first@plant.example', name: 'First Visitor', password: 'four plain words here' };

it('the first visitor of an empty Saltmark becomes administrator, and only the first, even when two try at once', async () => {
  expect((await app.nobody().get('/api/sessions/welcome')).body.needsFirstAdministrator).toBe(true);
  const answers = await Promise.all([
    app.nobody().post('/api/users/first').send(first),
    app
      .nobody()
      .post('/api/users/first')
      .send({ ...first, email: 'second@plant.example' }),
  ]);
  expect(answers.map((answer) => answer.status).sort()).toEqual([201, 409]);
  expect(await User.count()).toBe(1);
  expect(await Membership.findAll()).toMatchObject([{ siteId: null, role: 'administrator' }]);
  expect(await app.audited('users.first-administrator-created')).toMatchObject({
    actingRole: 'administrator',
  });
  expect((await app.nobody().get('/api/sessions/welcome')).body.needsFirstAdministrator).toBe(false);
});
