/**
 * Ingest behind somebody else's broker. This one does not share: each of our connections gets every message, the
 * hardest redelivery there is, and still each reading must be stored once.
 */
import { createServer, type AddressInfo, type Server } from 'node:net';
import { Aedes } from 'aedes';
import { connectAsync, type MqttClient } from 'mqtt';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { aMessage, aReading, eventually, publish, startPlant, type Plant } from './plant.ts';

let broker: Aedes;
let server: Server;
let plant: Plant;
let url: string;
let fleet: MqttClient;
const acknowledged: string[] = [];

beforeAll(async () => {
  broker = await Aedes.createBroker({
    concurrency: 1000,
    authorizeSubscribe: (_client, subscription, callback) => {
      subscription.topic = subscription.topic.replace(/^\$share\/[^/]+\//, '');
      callback(null, subscription);
    },
  });
  broker.on('ack', (packet, client) => {
    if (packet && 'topic' in packet) acknowledged.push(`${client.id} ${String(packet.topic)}`);
  });
  server = createServer(broker.handle);
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  url = `mqtt://127.0.0.1:${(server.address() as AddressInfo).port}`;
  plant = await startPlant({ environment: { MQTT_URL: url } });
  fleet = await connectAsync(url, { clientId: 'fleet' });
});
afterAll(async () => {
  await fleet.endAsync(true);
  await plant.stop();
  await new Promise<void>((resolve) => broker.close(() => resolve()));
  server.close();
});

const numbersOf = async (deviceId: number): Promise<number[]> => {
  const rows = await plant.rows<{ n: number }>('select n from readings where device_id = $1 order by n', [
    deviceId,
  ]);
  return rows.map(({ n }) => Number(n));
};
const duplicatesOf = async (deviceId: number): Promise<number> => {
  const [row] = await plant.rows('select duplicate_count from devices where id = $1', [deviceId]);
  return Number(row?.duplicate_count);
};

describe('an outside broker', () => {
  it('a reading delivered many times at once is stored once and every repeat counted', async () => {
    const station = await plant.station();
    await Promise.all(
      [1, 2, 3].map((n) => publish(fleet, station.name, 'readings', aMessage([aReading(n)]))),
    );
    await eventually(async () => expect(await duplicatesOf(station.device.id)).toBe(3 * 31));
    expect(await numbersOf(station.device.id)).toEqual([1, 2, 3]);
    expect(await plant.rows('select 1 from notices where device_id = $1', [station.device.id])).toEqual([]);
  });

  it('messages are acknowledged to it only after their commit', async () => {
    const station = await plant.station();
    const holder = await plant.pool.connect();
    await holder.query('begin; lock table readings in share row exclusive mode');
    await publish(fleet, station.name, 'readings', aMessage([aReading(1)]));
    const topic = `saltmark/1/${station.name}/readings`;
    await eventually(async () => {
      const waiting = await plant.rows(
        `select 1 from pg_stat_activity where application_name = 'saltmark ingest' and wait_event_type = 'Lock'`,
      );
      expect(waiting).toHaveLength(1);
    });
    expect(acknowledged.filter((line) => line.endsWith(topic))).toEqual([]);
    await holder.query('rollback');
    holder.release();
    await eventually(() => expect(acknowledged.filter((line) => line.endsWith(topic))).toHaveLength(32));
    expect(await numbersOf(station.device.id)).toEqual([1]);
  });

  it('a device that nobody registered is quarantined, not lost', async () => {
    await publish(fleet, 'stranger-1', 'readings', aMessage([aReading(1)]));
    await eventually(async () => {
      const rows = await plant.rows(
        `select distinct code from quarantined_messages where device_name = 'stranger-1'`,
      );
      expect(rows).toEqual([{ code: 'device-unknown' }]);
    });
  });

  it('what came while the server was away waits in its session', async () => {
    const station = await plant.station();
    await plant.restartIngest({}, () => publish(fleet, station.name, 'readings', aMessage([aReading(1)])));
    await publish(fleet, station.name, 'readings', aMessage([aReading(2)]));
    await eventually(async () => expect(await numbersOf(station.device.id)).toEqual([1, 2]));
  });

  it('commands and replies pass through it', async () => {
    const station = await plant.station();
    const device = await connectAsync(url, { clientId: station.name });
    device.on('message', (_topic, payload) => {
      const { id } = JSON.parse(payload.toString()) as { id: string };
      void publish(device, station.name, 'reply', { v: 1, id, boot: '01JE6M0T6Y', done: true });
    });
    await device.subscribeAsync(`saltmark/1/${station.name}/command`, { qos: 1 });
    expect(await plant.ingest.commands.send(station.name, { do: 'birth' })).toMatchObject({ done: true });
    await device.endAsync();
  });
});
