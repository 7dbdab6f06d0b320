import { connectAsync, type MqttClient } from 'mqtt';
import { afterAll, beforeAll, expect, it, vi } from 'vitest';
import { DeviceCommand, Notice, Probe } from '../../server/db/models/index.ts';
import { startIngest, type Ingest } from '../../server/ingest/start-ingest.ts';
import { topicOf, type CommandMessage } from '../../shared/contracts/mqtt.ts';
import type { Calibration } from '../../shared/contracts/calibrations.ts';
import { eventually } from '../ingest/plant.ts';
import { startTestApp, testNow, testPassword, type TestApp } from '../support/app.ts';
import { aBench, aRun, type Bench } from '../support/calibration-run.ts';

// A whole run is some thirty requests.
vi.setConfig({ testTimeout: 120_000 });

let app: TestApp;
let ingest: Ingest;
const clients: MqttClient[] = [];

beforeAll(async () => {
  app = await startTestApp({ MQTT_PORT: '0' });
  ingest = await startIngest(app.parts);
});
afterAll(async () => {
  await Promise.all(clients.map((client) => client.endAsync(true)));
  await ingest.stop();
  await app.stop();
});

const boot = '01JE6M0T6Y';

/** A transmitter that takes the order, and then announces what `announces` makes of it. */
async function aTransmitter(
  bench: Bench,
  { done = true, announces }: { done?: boolean; announces?: (asked: number) => number } = {},
): Promise<MqttClient> {
  const { name } = bench.device;
  const client = await connectAsync(ingest.brokerUrl, {
    clientId: name,
    username: name,
    password: 'known-only-to-tests',
    reconnectPeriod: 0,
  });
  clients.push(client);
  const publish = (kind: 'birth' | 'reply', body: object): Promise<unknown> =>
    client.publishAsync(topicOf(name, kind), JSON.stringify({ v: 1, boot, ...body }), { qos: 1 });
  const isBorn = (perCm: number): Promise<unknown> =>
    publish('birth', {
      sent: testNow,
      device: name,
      serial: bench.probe.serial,
      kind: bench.probe.kind,
      firmware: '2.4.1',
      cell_constant_per_cm: perCm,
      compensation: { model: 'none' },
      range_low_us_cm: 0,
      range_high_us_cm: 20_000,
      resolution_us_cm: 0.1,
      interval_s: 10,
      settings: `sha256:${perCm}`,
    });
  client.on('message', (_topic, payload) => {
    const command = JSON.parse(payload.toString()) as CommandMessage;
    if (command.do !== 'apply-cell-constant') return;
    const asked = command.cell_constant_per_cm;
    const answer = publish('reply', { id: command.id, done, text: done ? 'taken' : 'locked by its switch' });
    if (done) void answer.then(() => isBorn(announces ? announces(asked) : asked));
  });
  await client.subscribeAsync(topicOf(name, 'command'), { qos: 1 });
  await isBorn(1);
  return client;
}

async function approvedAdjustment(bench: Bench): Promise<Calibration> {
  const run = await aRun(app, { bench, errors: { asFound: 2.4, cleaned: 2.4 }, decision: 'adjust' });
  await run.sign();
  const manager = await app.as('manager');
  const answer = await manager
    .post(`/api/calibrations/${run.id}/review`)
    .send({ decision: 'approve', password: testPassword });
  expect(answer.body).toMatchObject({ status: 'approved' });
  return answer.body as Calibration;
}

const readRun = async (id: number): Promise<Calibration> =>
  (await (await app.as('auditor')).get(`/api/calibrations/${id}`)).body as Calibration;

it('an approved constant is sent at once, and counts as applied when the device announces it', async () => {
  const bench = await aBench(app);
  await aTransmitter(bench);
  const { id, cellConstantAfterPerCm } = await approvedAdjustment(bench);
  await eventually(async () => {
    expect((await readRun(id)).command).toMatchObject({
      state: 'confirmed',
      cellConstantPerCm: cellConstantAfterPerCm,
      detail: 'taken',
    });
  });
  expect((await Probe.findByPk(bench.probe.id))?.cellConstantPerCm).toBe(cellConstantAfterPerCm);
  expect(await Notice.count({ where: { probeId: bench.probe.id } })).toBe(0);
  expect(await app.audited('calibrations.command-confirmed')).toMatchObject({
    actorKind: 'device',
    actorName: bench.device.name,
  });
  expect(app.events).toContainEqual({ slice: 'calibrations', id, kind: 'changed', siteId: bench.site.id });
});

it('a device that is not there leaves an open item, and the order can be sent again', async () => {
  const bench = await aBench(app);
  const { id } = await approvedAdjustment(bench);
  await eventually(async () => expect((await readRun(id)).command?.state).toBe('failed'));
  expect((await readRun(id)).command?.detail).toContain('not connected');
  await aTransmitter(bench);
  const technician = await app.as('technician');
  const again = await technician.post(`/api/calibrations/${id}/command`).send({});
  expect(again.body.command).toMatchObject({ state: 'waiting' });
  await eventually(async () => expect((await readRun(id)).command?.state).toBe('confirmed'));
  expect(await DeviceCommand.count({ where: { calibrationId: id } })).toBe(2);
});

it('a refusal is an open item in the device’s own words', async () => {
  const bench = await aBench(app);
  await aTransmitter(bench, { done: false });
  const { id } = await approvedAdjustment(bench);
  await eventually(async () =>
    expect((await readRun(id)).command).toMatchObject({
      state: 'failed',
      detail: 'The device refused: locked by its switch',
    }),
  );
  expect((await readRun(id)).can.sendAgain).toBe(false);
  const manager = await app.as('manager');
  expect((await manager.get(`/api/calibrations/${id}`)).body.can.sendAgain).toBe(true);
});

it('a device that says yes and works with another value is found out', async () => {
  const bench = await aBench(app);
  await aTransmitter(bench, { announces: () => 0.9 });
  const { id, cellConstantAfterPerCm } = await approvedAdjustment(bench);
  await eventually(async () => expect((await readRun(id)).command?.state).toBe('failed'), 40_000);
  expect((await readRun(id)).command?.detail).toBe(
    `The device answered “taken” but announces 0.9, not ${cellConstantAfterPerCm} cm⁻¹.`,
  );
  expect(
    await Notice.count({ where: { probeId: bench.probe.id, kind: 'cell-constant-without-record' } }),
  ).toBe(1);
});
