import { connect, connectAsync, type MqttClient } from 'mqtt';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Device } from '../../server/db/models/index.ts';
import { hashDeviceSecret } from '../../server/ingest/device-secrets.ts';
import { metrics } from '../../server/http/metrics.ts';
import {
  aMessage,
  aReading,
  aState,
  closed,
  eventually,
  publish,
  secret,
  startPlant,
  type Plant,
} from './plant.ts';

let plant: Plant;

beforeAll(async () => {
  plant = await startPlant();
});
afterAll(() => plant.stop());

const refusedCount = async (reason: string): Promise<number> => {
  const found = await metrics.getSingleMetric('saltmark_device_connections_refused_total')?.get();
  return found?.values.find((value) => value.labels.reason === reason)?.value ?? 0;
};
const codesOf = async (name: string): Promise<string[]> => {
  const rows = await plant.rows<{ code: string }>(
    'select code from quarantined_messages where device_name = $1 order by id',
    [name],
  );
  return rows.map(({ code }) => code);
};

describe('who may connect', () => {
  it.each([
    ['anonymous', 'anonymous', {}, { username: undefined, password: undefined }],
    ['a wrong secret', 'credentials', {}, { password: 'wrong' }],
    ['an unknown name', 'credentials', {}, { username: 'nobody-here', clientId: 'nobody-here' }],
    ['another client id', 'client-id', {}, { clientId: 'somebody-else' }],
    ['withdrawn credentials', 'revoked', { revokedAt: new Date() }, {}],
  ])('%s is refused, counted and never connected', async (_says, reason, device, options) => {
    const station = await plant.station({ device });
    const before = await refusedCount(reason);
    const attempt = connectAsync(plant.ingest.brokerUrl, {
      clientId: station.name,
      username: station.name,
      password: secret,
      reconnectPeriod: 0,
      ...options,
    });
    await expect(attempt).rejects.toThrow(/Connection refused/);
    expect(await refusedCount(reason)).toBe(before + 1);
  });

  it('withdrawing credentials ends the connection at once, and a new secret lets it in again', async () => {
    const station = await plant.station();
    const client = await plant.connect(station);
    await Device.update({ revokedAt: new Date() }, { where: { id: station.device.id } });
    await closed(client);
    await expect(plant.connect(station)).rejects.toThrow(/Connection refused/);

    await Device.update(
      { revokedAt: null, secretHash: hashDeviceSecret('a new one') },
      { where: { id: station.device.id } },
    );
    const again = await eventually(() => plant.connect(station, { password: 'a new one' }));
    expect(again.connected).toBe(true);
    await expect(plant.connect(station)).rejects.toThrow(/Connection refused/);
  });
});

describe('what a device may say', () => {
  it.each([
    ['under another name', (other: string) => `saltmark/1/${other}/readings`, 'device-wrong'],
    ['a state of another', (other: string) => `saltmark/1/${other}/state`, 'device-wrong'],
    ['a command to another', (other: string) => `saltmark/1/${other}/command`, 'topic-unknown'],
    ['somewhere else', () => 'plant/everything', 'topic-unknown'],
    ['to the broker itself', () => '$SYS/x/new/clients', 'topic-unknown'],
  ])('%s: acknowledged, reaches nobody, quarantined', async (_says, topicTo, code) => {
    const [station, other] = await Promise.all([plant.station(), plant.station()]);
    const [client, victim] = await Promise.all([plant.connect(station), plant.connect(other)]);
    const heard: string[] = [];
    victim.on('message', (topic) => heard.push(topic));
    await victim.subscribeAsync(`saltmark/1/${other.name}/command`, { qos: 1 });
    const payload = topicTo(other.name).startsWith('$SYS')
      ? other.name
      : JSON.stringify(aMessage([aReading(1)]));
    await client.publishAsync(topicTo(other.name), payload, { qos: 1, retain: true });

    expect(await codesOf(station.name)).toEqual([code]);
    expect(await plant.rows('select 1 from readings where device_id = $1', [other.device.id])).toEqual([]);
    // Both connections still work: nobody was pushed out.
    await publish(client, station.name, 'readings', aMessage([aReading(1)]));
    await publish(victim, other.name, 'readings', aMessage([aReading(1)]));
    expect(heard).toEqual([]);
  });

  it('a will under another name tells nothing about the other', async () => {
    const [station, other] = await Promise.all([plant.station(), plant.station()]);
    const victim = await plant.connect(other);
    await publish(victim, other.name, 'state', aState(true, 'start'), true);
    const will = {
      topic: `saltmark/1/${other.name}/state`,
      payload: Buffer.from(JSON.stringify(aState(false, 'lost'))),
      qos: 1 as const,
      retain: true,
    };
    const client = await plant.connect(station, { will });
    client.stream.destroy();
    await eventually(async () => expect(await codesOf(station.name)).toEqual(['device-wrong']));
    const [row] = await plant.rows('select is_online from devices where id = $1', [other.device.id]);
    expect(row).toEqual({ is_online: true });
  });
});

describe('what a device may hear', () => {
  it('its own commands, and a reply finds whoever asked', async () => {
    const station = await plant.station();
    const client = await plant.connect(station);
    client.on('message', (_topic, payload) => {
      const { id } = JSON.parse(payload.toString()) as { id: string };
      void publish(client, station.name, 'reply', {
        v: 1,
        id,
        boot: '01JE6M0T6Y',
        done: true,
        text: 'K is 0.1021',
      });
    });
    await client.subscribeAsync(`saltmark/1/${station.name}/command`, { qos: 1 });
    const reply = await plant.ingest.commands.send(station.name, {
      do: 'apply-cell-constant',
      cell_constant_per_cm: 0.1021,
    });
    expect(reply).toMatchObject({ done: true, text: 'K is 0.1021' });
  });

  it('a device that is away or silent is said to be so', async () => {
    const station = await plant.station();
    const ask = () => plant.ingest.commands.send(station.name, { do: 'birth' }, 50);
    await expect(ask()).rejects.toMatchObject({
      code: 'devices.offline',
      detail: `${station.name} is not connected.`,
    });
    await plant.connect(station);
    await expect(ask()).rejects.toMatchObject({
      code: 'devices.offline',
      detail: expect.stringContaining('not answer') as string,
    });
  });

  it.each([
    ['another device’s commands', (other: string) => `saltmark/1/${other}/command`],
    ['all commands', () => 'saltmark/1/+/command'],
    ['everything', () => '#'],
    ['its own readings', (_other: string, own: string) => `saltmark/1/${own}/readings`],
    ['a shared subscription', (_other: string, own: string) => `$share/all/saltmark/1/${own}/command`],
    ['the broker’s own topics', () => '$SYS/#'],
  ])('%s: the subscription is refused', async (_says, filterOf) => {
    const [station, other] = await Promise.all([plant.station(), plant.station()]);
    const client: MqttClient = await plant.connect(station);
    const granted = await new Promise<number[]>((resolve) => {
      client.once('packetreceive', (packet) => {
        if (packet.cmd === 'suback') resolve(packet.granted as number[]);
      });
      client.subscribe(filterOf(other.name, station.name), { qos: 1 }, () => {});
    });
    expect(granted).toEqual([128]);
  });

  it('no session outlives its connection, so nothing is queued for a device that never returns', async () => {
    const station = await plant.station();
    const first = await plant.connect(station, { clean: false });
    await first.subscribeAsync(`saltmark/1/${station.name}/command`, { qos: 1 });
    await first.endAsync();
    const again = connect(plant.ingest.brokerUrl, {
      clientId: station.name,
      username: station.name,
      password: secret,
      clean: false,
    });
    const connack = await new Promise<{ sessionPresent: boolean }>((resolve) =>
      again.once('connect', resolve),
    );
    await again.endAsync();
    expect(connack.sessionPresent).toBe(false);
  });
});

describe('two devices with one name', () => {
  it('push each other out, and after three times somebody is told once', async () => {
    const station = await plant.station();
    await plant.connect(station);
    for (let turn = 0; turn < 4; turn += 1) {
      const next = await plant.connect(station);
      await publish(next, station.name, 'readings', aMessage([aReading(turn)]));
    }
    await eventually(async () => {
      const notices = await plant.rows('select kind from notices where device_id = $1', [station.device.id]);
      expect(notices).toEqual([{ kind: 'device-replaced' }]);
    });
  });
});
