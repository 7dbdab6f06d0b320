/** The first day of a plant: an operator watches, an administrator brings a new probe to life. In a real browser. */
import { connectAsync, type MqttClient } from 'mqtt';
import type { Browser } from 'playwright-core';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { topicOf } from '../../shared/contracts/mqtt.ts';
import type { Role } from '../../shared/contracts/vocabulary.ts';
import { Membership, User, type Probe, type Site } from '../../server/db/models/index.ts';
import { connectDatabase } from '../../server/db/sequelize.ts';
import { hashDeviceSecret } from '../../server/ingest/device-secrets.ts';
import { hashPassword } from '../../server/lib/hashing.ts';
import { testPassword } from '../support/app.ts';
import { openBrowser, visit, type Visitor } from '../support/browser.ts';
import { freshDatabase, type TestDatabase } from '../support/database.ts';
import { aCheck, aDevice, anArea, aPoint, aProbe, aSite, aStandard, installed } from '../support/rows.ts';
import { serverProcess, type ServerProcess } from '../support/server-process.ts';

const secret = 'a-secret-that-only-this-device-has';
const dayMs = 86_400_000;

let db: TestDatabase;
let server: ServerProcess;
let browser: Browser;
let visitor: Visitor;
let site: Site;
let probe: Probe;
let deviceName: string;
const devices: MqttClient[] = [];

beforeAll(async () => {
  db = await freshDatabase();
  await furnish();
  server = await serverProcess(db.appUrl);
  await server.start();
  browser = await openBrowser();
});
beforeEach(async () => {
  visitor = await visit(browser, server.url);
});
afterEach(async ({ task }) => {
  if (task.result?.state === 'fail')
    await visitor.picture(`failed-${task.name.replaceAll(/[^a-z]+/gi, '-')}`);
  await visitor.leave();
});
afterAll(async () => {
  await Promise.all(devices.map((device) => device.endAsync(true)));
  await browser?.close();
  await server?.stop();
  await db.drop();
}, 60_000);

/** A site with one probe that is trusted, and one point that waits for its probe. */
async function furnish(): Promise<void> {
  const sequelize = connectDatabase(db.appUrl, { maxConnections: 2, applicationName: 'tests' });
  const passwordHash = await hashPassword(testPassword);
  const unset = { lockedUntil: null, passwordChangedAt: null, lastSignInAt: null, deactivatedAt: null };
  const people = new Map<Role, User>();
  for (const role of ['operator', 'administrator'] as const) {
    const user = await User.create({
      email: `${role}@plant.example`,
      name: `Test ${role}`,
      passwordHash,
      ...unset,
    });
    await Membership.create({ userId: user.id, siteId: null, role, endsOn: null, endedAt: null });
    people.set(role, user);
  }
  site = await aSite({ name: 'Mill Lane' });
  const areaId = (await anArea(site.id, { name: 'Rinse hall' })).id;
  const point = await aPoint(site.id, { areaId, name: 'Rinse return', code: 'RR-1' });
  await aPoint(site.id, { areaId, name: 'Final rinse', code: 'FR-1' });
  probe = await aProbe(site.id, { tag: 'rinse-return' });
  await installed(probe, point, people.get('administrator')!.id);
  const standardId = (await aStandard()).id;
  await aCheck({ probeId: probe.id, pointId: point.id, standardId }, { at: new Date(Date.now() - dayMs) });
  const device = await aDevice(probe.id, {
    secretHash: hashDeviceSecret(secret),
    bootText: null,
    isOnline: false,
    lastSeenAt: null,
  });
  deviceName = device.name;
  await sequelize.close();
}

/** A device as it stands in the field: signs in, says who it is, then sends what it measures. */
async function startDevice(options: {
  url: string;
  name: string;
  password: string;
  serial: string;
}): Promise<{
  measure: (conductivityUsCm: number) => Promise<void>;
}> {
  const { url, name, password, serial } = options;
  const client = await connectAsync(url, {
    clientId: name,
    username: name,
    password,
    connectTimeout: 20_000,
  });
  devices.push(client);
  const boot = `B${Date.now().toString(36)}`;
  const send = (kind: 'birth' | 'state' | 'readings', body: object, retain = false) =>
    client.publishAsync(topicOf(name, kind), JSON.stringify({ v: 1, boot, ...body }), { qos: 1, retain });
  const compensation = { model: 'none' };
  const settings = { range_low_us_cm: 0, range_high_us_cm: 20_000, resolution_us_cm: 0.1, interval_s: 10 };
  const birth = { device: name, serial, kind: 'four-electrode', firmware: '2.4.1', cell_constant_per_cm: 1 };
  await send('birth', { ...birth, compensation, ...settings, settings: 'sha256:9b1c4e00' }, true);
  await send('state', { online: true, why: 'start' }, true);
  let n = 0;
  return {
    measure: async (conductivityUsCm) => {
      n += 1;
      const now = new Date().toISOString();
      const what = {
        context: 'process',
        conductivity_us_cm: conductivityUsCm,
        temperature_c: 25,
        conductance_us: null,
      };
      await send('readings', {
        sent: now,
        readings: [{ n, at: now, ...what, solution: null, quality: 'good', flags: [] }],
      });
    },
  };
}

async function signIn(email: string): Promise<void> {
  const { page } = visitor;
  await page.goto('/');
  await page.getByLabel('E-mail').fill(email);
  await page.getByLabel('Password').fill(testPassword);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.getByRole('navigation', { name: 'Areas' }).waitFor();
}

/** Survives everything but a reload. */
const markPage = () =>
  visitor.page.evaluate(() => void ((window as { neverReloaded?: boolean }).neverReloaded = true));
const wasNeverReloaded = () =>
  visitor.page.evaluate(() => (window as { neverReloaded?: boolean }).neverReloaded === true);

describe('the operator', () => {
  it('signs in and sees a reading change without a reload', async () => {
    const { page } = visitor;
    const device = await startDevice({
      url: server.mqttUrl,
      name: deviceName,
      password: secret,
      serial: probe.serial,
    });
    await device.measure(812);
    await page.goto('/');
    await page.getByRole('button', { name: 'Sign in' }).waitFor();
    expect(await visitor.accessibility()).toEqual([]);
    await visitor.picture('sign-in');

    await signIn('operator@plant.example');
    const main = page.getByRole('main');
    await main.getByRole('link', { name: 'Mill Lane' }).first().click();
    await main.getByText('Rinse return').first().waitFor();
    await main.getByText('812').first().waitFor();
    await markPage();
    await device.measure(934);
    await main.getByText('934').first().waitFor();
    expect(await main.getByText('812').count()).toBe(0);
    expect(await wasNeverReloaded()).toBe(true);
    await visitor.picture('live');
    expect(await visitor.accessibility()).toEqual([]);
    expect(visitor.complaints).toEqual([]);
  });

  it('is offered nothing that the role may not do', async () => {
    const { page } = visitor;
    await signIn('operator@plant.example');
    await page.getByRole('link', { name: 'Probes', exact: true }).click();
    await page
      .getByRole('link', { name: /rinse-return/ })
      .first()
      .click();
    await page.getByRole('heading', { name: /Rinse return/, level: 1 }).waitFor();
    expect(await page.getByRole('button', { name: /credentials|install|retire/i }).count()).toBe(0);
    expect(visitor.complaints).toEqual([]);
  });
});

describe('the administrator', () => {
  it('registers a probe, installs it, issues its credentials, and sees it live once it sends', async () => {
    const { page } = visitor;
    await signIn('administrator@plant.example');
    await page.getByRole('link', { name: 'Probes', exact: true }).click();
    await page
      .getByRole('link', { name: /rinse-return/ })
      .first()
      .waitFor();
    expect(await visitor.accessibility()).toEqual([]);
    await visitor.picture('probes');

    await page
      .getByRole('link', { name: /Register a probe/ })
      .first()
      .click();
    const kept = page.getByLabel('Kept at');
    await kept.waitFor();
    if ((await kept.inputValue()) === '') await kept.selectOption({ label: 'Mill Lane' });
    await page.getByLabel('Serial number').fill('SN-4711');
    await page.getByLabel('Tag').fill('final-rinse');
    await page.getByLabel('Kind').selectOption('four-electrode');
    await page.getByLabel('Nominal cell constant').fill('1');
    await page.getByLabel('Range to').fill('20000');
    await visitor.picture('register');
    await page.getByRole('button', { name: 'Register probe' }).click();
    await page.getByRole('heading', { name: /final-rinse/, level: 1 }).waitFor();

    await page.getByRole('button', { name: 'Install…' }).click();
    const install = page.getByRole('dialog', { name: 'Install final-rinse' });
    await install
      .getByLabel('Measuring point')
      .selectOption({ label: 'Mill Lane · Rinse hall · Final rinse (FR-1)' });
    await install.getByRole('button', { name: 'Install' }).click();
    await page.getByRole('heading', { name: /Final rinse/, level: 1 }).waitFor();

    await page.getByRole('button', { name: 'Issue device credentials…' }).click();
    const issue = page.getByRole('dialog', { name: /Issue credentials/ });
    await issue.getByRole('button', { name: 'Issue credentials' }).click();
    const shown = page.getByRole('dialog', { name: /Credentials of final-rinse/ });
    const password = await shown.locator('code').innerText();
    const valueOf = (term: string) => shown.locator(`dt:has-text("${term}") + dd`).innerText();
    const [name, url] = [await valueOf('User name'), await valueOf('Broker')];
    expect(name).toBe('final-rinse');
    await shown.getByRole('button', { name: 'I have stored it' }).click();
    await shown.waitFor({ state: 'detached' });
    expect(await page.getByText(password).count(), 'The password is shown once.').toBe(0);

    await markPage();
    const device = await startDevice({ url, name, password, serial: 'SN-4711' });
    await device.measure(1432);
    const main = page.getByRole('main');
    await main
      .getByText(/1[\s,\u202f\u2009]?432/)
      .first()
      .waitFor();
    await main.getByText('connected', { exact: true }).waitFor();
    await device.measure(1507);
    await main
      .getByText(/1[\s,\u202f\u2009]?507/)
      .first()
      .waitFor();
    expect(await wasNeverReloaded()).toBe(true);
    expect(await visitor.accessibility()).toEqual([]);
    await visitor.picture('probe');
    expect(visitor.complaints).toEqual([]);
  });
});
