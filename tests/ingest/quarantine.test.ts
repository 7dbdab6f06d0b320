import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { MqttClient } from 'mqtt';
import {
  aBirth,
  aMessage,
  closed,
  aReading,
  at,
  eventually,
  publish,
  startPlant,
  type Plant,
  type Station,
} from './plant.ts';

let plant: Plant;
let station: Station;
let client: MqttClient;

beforeAll(async () => {
  plant = await startPlant();
});
afterAll(() => plant.stop());
beforeEach(async () => {
  plant.events.length = 0;
  station = await plant.station();
  client = await plant.connect(station);
});

const quarantined = () =>
  plant.rows<{ code: string; reason: string; topic: string; payload: Buffer; payload_bytes: number }>(
    'select * from quarantined_messages where device_name = $1 order by id',
    [station.name],
  );
const storedCount = async (): Promise<number> => {
  const [row] = await plant.rows<{ count: number }>('select count(*) from readings where device_id = $1', [
    station.device.id,
  ]);
  return Number(row?.count);
};

const nested = (depth: number): string => '['.repeat(depth) + ']'.repeat(depth);

describe('a message that cannot be used is acknowledged and kept with its reason', () => {
  it.each<[string, string, () => unknown, RegExp]>([
    ['not-json', 'broken text', () => '{"v":1,', /not JSON/],
    ['not-json', 'bytes that are no text', () => Buffer.from([0x7b, 0xff, 0xfe, 0x7d]), /not UTF-8/],
    ['schema-invalid', 'a list', () => '[]', /not a JSON object/],
    ['version-unknown', 'no version', () => ({ ...aMessage([aReading(1)]), v: undefined }), /no version/],
    ['version-unknown', 'a later version', () => aMessage([aReading(1)], { v: 2 }), /version 2/],
    ['schema-invalid', 'no readings', () => aMessage([]), /readings/],
    [
      'schema-invalid',
      'sixty-one readings',
      () => aMessage(Array.from({ length: 61 }, (_, n) => aReading(n))),
      /readings/,
    ],
    [
      'schema-invalid',
      'text for a number',
      () => aMessage([aReading(1, { conductivity_us_cm: '1061' })]),
      /conductivity/,
    ],
    [
      'schema-invalid',
      'a negative number',
      () => aMessage([aReading(1, { conductivity_us_cm: -1 })]),
      /conductivity/,
    ],
    [
      'schema-invalid',
      'a day that no month has',
      () => aMessage([aReading(1, { at: '2026-11-31T10:00:00Z' })]),
      /at/,
    ],
    ['schema-invalid', 'an unknown context', () => aMessage([aReading(1, { context: 'lunch' })]), /context/],
    ['too-large', 'over 64 kB', () => aMessage([aReading(1, { note: 'x'.repeat(65_536) })]), /65536/],
    // Refused by the database alone: neither zero bytes nor lone surrogates can be stored as text or JSON.
    [
      'schema-invalid',
      'a zero byte in text',
      () => aMessage([aReading(1, { solution: 'LOT\u0000' })]),
      /database/,
    ],
    [
      'schema-invalid',
      'a zero byte in a raw field',
      () => aMessage([aReading(1, { note: 'a\u0000' })]),
      /database/,
    ],
    [
      'schema-invalid',
      'half a character',
      () => `{"v":1,"boot":"01JE6M0T6Y","sent":"${at(0)}","x":"\\ud800",
      "readings":[${JSON.stringify(aReading(1))}]}`,
      /database/,
    ],
    [
      'schema-invalid',
      'nesting without end',
      () => JSON.stringify(aMessage([aReading(1)])).replace('{"v":1', `{"x":${nested(20_000)},"v":1`),
      /cannot be read|database/,
    ],
  ])('%s: %s', async (code, _says, body, reason) => {
    await publish(client, station.name, 'readings', body());
    const rows = await quarantined();
    expect(rows.map((row) => row.code)).toEqual([code]);
    expect(rows[0]?.reason).toMatch(reason);
    expect(rows[0]?.payload_bytes).toBeGreaterThan(0);
    expect(await storedCount()).toBe(0);
    expect(client.connected).toBe(true);
    // The same connection goes on, and the number is free for a good message.
    await publish(client, station.name, 'readings', aMessage([aReading(1)]));
    expect(await storedCount()).toBe(1);
  });

  it('device-wrong: a birth that calls itself somebody else', async () => {
    await publish(client, station.name, 'birth', aBirth(station, { device: 'another-device' }), true);
    expect((await quarantined()).map((row) => row.code)).toEqual(['device-wrong']);
  });

  it('is kept byte for byte, up to 64 kB', async () => {
    const body = Buffer.concat([Buffer.from([0, 255, 192]), Buffer.alloc(70_000, 'z')]);
    await publish(client, station.name, 'readings', body);
    const [row] = await quarantined();
    expect(row?.payload_bytes).toBe(body.length);
    expect(row?.payload).toEqual(body.subarray(0, 65_536));
  });

  it('tells the page, but a flood of them tells it twice a second at most', async () => {
    const flood = Array.from({ length: 200 }, () => publish(client, station.name, 'readings', 'no'));
    await Promise.all(flood);
    expect(await quarantined()).toHaveLength(200);
    await eventually(() => expect(plant.events.some(({ slice }) => slice === 'quarantine')).toBe(true));
    expect(plant.events.filter(({ slice }) => slice === 'quarantine').length).toBeLessThan(20);
  });
});

it('one message that the database refuses leaves the others of its group alone', async () => {
  const others = await Promise.all(Array.from({ length: 5 }, () => plant.station()));
  const clients = await Promise.all(others.map((other) => plant.connect(other)));
  const good = clients.flatMap((one, index) =>
    Array.from({ length: 20 }, (_, n) =>
      publish(one, others[index]!.name, 'readings', aMessage([aReading(n)])),
    ),
  );
  const bad = [3, 7].map((n) =>
    publish(client, station.name, 'readings', aMessage([aReading(n, { solution: 'LOT\u0000' })])),
  );
  await Promise.all([...good, ...bad]);

  const [stored] = await plant.rows<{ count: number }>(
    'select count(*) from readings where device_id = any($1)',
    [others.map(({ device }) => device.id)],
  );
  expect(Number(stored?.count)).toBe(100);
  expect((await quarantined()).map((row) => row.code)).toEqual(['schema-invalid', 'schema-invalid']);
});

it('a packet far beyond any message is not even read', async () => {
  const ended = closed(client);
  client.publish(`saltmark/1/${station.name}/readings`, Buffer.alloc(3_000_000), { qos: 1 }, () => {});
  await ended;
  expect(await quarantined()).toEqual([]);
});
