import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { Probe } from '../../server/db/models/index.ts';
import {
  aBirth,
  aMessage,
  aReading,
  aState,
  at,
  eventually,
  publish,
  startPlant,
  type Plant,
  type Station,
} from './plant.ts';

let plant: Plant;

beforeAll(async () => {
  plant = await startPlant();
});
afterAll(() => plant.stop());
beforeEach(() => {
  plant.events.length = 0;
});

const deviceRow = async (station: Station) => {
  const [row] = await plant.rows('select * from devices where id = $1', [station.device.id]);
  return row;
};
const earlier = '01JE6M0T6X';
const boot = '01JE6M0T6Y';
const later = '01JE6M0T6Z';

describe('birth and state', () => {
  it('a birth brings identity, settings and presence', async () => {
    const station = await plant.station();
    const client = await plant.connect(station);
    await publish(client, station.name, 'birth', aBirth(station, { interval_s: 5 }), true);
    expect(await deviceRow(station)).toMatchObject({
      firmware: '2.4.1',
      settings_hash: 'sha256:9b1c4e00',
      reported_cell_constant_per_cm: 1,
      reading_interval_s: 5,
      boot_text: boot,
      is_online: true,
      online_why: 'start',
    });
    const settings = await plant.rows('select * from device_settings where device_id = $1', [
      station.device.id,
    ]);
    expect(settings).toMatchObject([{ settings_hash: 'sha256:9b1c4e00', cell_constant_per_cm: 1 }]);
    expect(plant.events).toContainEqual({
      slice: 'devices',
      id: station.device.id,
      kind: 'changed',
      siteId: station.site.id,
    });
  });

  it('a lost line is told by the will', async () => {
    const station = await plant.station();
    const will = {
      topic: `saltmark/1/${station.name}/state`,
      payload: Buffer.from(JSON.stringify(aState(false, 'lost'))),
      qos: 1 as const,
      retain: true,
    };
    const client = await plant.connect(station, { will });
    await publish(client, station.name, 'state', aState(true, 'start'), true);
    expect(await deviceRow(station)).toMatchObject({ is_online: true });
    client.stream.destroy();
    await eventually(async () =>
      expect(await deviceRow(station)).toMatchObject({ is_online: false, online_why: 'lost' }),
    );
  });

  it('an orderly end says planned and sends no will', async () => {
    const station = await plant.station();
    const will = {
      topic: `saltmark/1/${station.name}/state`,
      payload: Buffer.from(JSON.stringify(aState(false, 'lost'))),
      qos: 1 as const,
    };
    const client = await plant.connect(station, { will });
    await publish(client, station.name, 'state', aState(true, 'start'), true);
    await publish(client, station.name, 'state', aState(false, 'planned'), true);
    await client.endAsync();
    // Whatever the broker had to say of the first connection, it has said before the second one's message.
    const again = await plant.connect(station);
    await publish(again, station.name, 'readings', aMessage([aReading(1)]));
    expect(await deviceRow(station)).toMatchObject({ is_online: false, online_why: 'planned' });
  });
});

it('a device whose will went down with the broker is found out', async () => {
  const [gone, there] = await Promise.all([plant.station(), plant.station()]);
  for (const station of [gone, there]) {
    await publish(await plant.connect(station), station.name, 'state', aState(true, 'start'), true);
  }
  await plant.restartIngest({ sweepMs: 100 }, async () => {
    // As a crash leaves it: online on record, and nobody left to publish a will.
    expect(await deviceRow(gone)).toMatchObject({ is_online: true });
  });
  const client = await plant.connect(there);
  await eventually(async () =>
    expect(await deviceRow(gone)).toMatchObject({ is_online: false, online_why: 'lost' }),
  );
  await publish(client, there.name, 'state', aState(true, 'start'), true);
  expect(await deviceRow(there)).toMatchObject({ is_online: true });
  await plant.restartIngest();
});

describe('the order of boots decides, never arrival', () => {
  it.each([
    ['one after the other', false],
    ['in one group', true],
  ])('an old offline after a newer online changes nothing (%s)', async (_says, together) => {
    const station = await plant.station();
    const client = await plant.connect(station);
    const messages = [
      aState(true, 'start', later),
      aState(false, 'lost', boot),
      aState(false, 'planned', earlier),
    ];
    if (together)
      await Promise.all(messages.map((body) => publish(client, station.name, 'state', body, true)));
    else for (const body of messages) await publish(client, station.name, 'state', body, true);
    expect(await deviceRow(station)).toMatchObject({
      is_online: true,
      online_why: 'start',
      boot_text: later,
    });
  });

  it('an old birth changes nothing', async () => {
    const station = await plant.station();
    const client = await plant.connect(station);
    await publish(client, station.name, 'birth', aBirth(station, { boot: later, firmware: '3.0.0' }), true);
    await publish(client, station.name, 'birth', aBirth(station, { boot, firmware: '2.0.0' }), true);
    expect(await deviceRow(station)).toMatchObject({ firmware: '3.0.0', boot_text: later });
  });

  it('after a restart of the server too', async () => {
    const station = await plant.station();
    await publish(await plant.connect(station), station.name, 'state', aState(true, 'start', later), true);
    await plant.restartIngest();
    await publish(await plant.connect(station), station.name, 'state', aState(false, 'lost', boot), true);
    expect(await deviceRow(station)).toMatchObject({ is_online: true, boot_text: later });
  });
});

describe('the cell constant in the device', () => {
  const noticesOf = (station: Station) =>
    plant.rows<{ kind: string; detail: Record<string, unknown> }>(
      'select kind, detail from notices where device_id = $1',
      [station.device.id],
    );

  it('that no record asked for raises one notice and tells the page', async () => {
    const station = await plant.station({ probe: { cellConstantPerCm: 0.1021 } });
    const client = await plant.connect(station);
    const birth = aBirth(station, { cell_constant_per_cm: 0.112 });
    await publish(client, station.name, 'birth', birth, true);
    await publish(client, station.name, 'birth', birth, true);
    expect(await noticesOf(station)).toMatchObject([
      {
        kind: 'cell-constant-without-record',
        detail: { reportedCellConstantPerCm: 0.112, recordedCellConstantPerCm: 0.1021 },
      },
    ]);
    expect(plant.events.map(({ slice }) => slice)).toEqual(
      expect.arrayContaining(['notices', 'probes', 'devices']),
    );
  });

  it('that only has fewer digits than the record raises none', async () => {
    const station = await plant.station({ probe: { cellConstantPerCm: 0.102_134 } });
    const client = await plant.connect(station);
    await publish(client, station.name, 'birth', aBirth(station, { cell_constant_per_cm: 0.1021 }), true);
    expect(await noticesOf(station)).toEqual([]);
  });

  it('is compared with the record as it is now', async () => {
    const station = await plant.station();
    const client = await plant.connect(station);
    await publish(client, station.name, 'birth', aBirth(station), true);
    await Probe.update({ cellConstantPerCm: 1.05 }, { where: { id: station.probe.id } });
    await eventually(async () => {
      await publish(client, station.name, 'birth', aBirth(station, { cell_constant_per_cm: 1.05 }), true);
      await publish(client, station.name, 'birth', aBirth(station), true);
      expect((await noticesOf(station)).map(({ detail }) => detail.reportedCellConstantPerCm)).toContain(1);
    });
  });

  it('settings that no birth has explained are asked for, once', async () => {
    const station = await plant.station();
    const client = await plant.connect(station);
    const commands: unknown[] = [];
    client.on('message', (_topic, payload) => commands.push(JSON.parse(payload.toString())));
    await client.subscribeAsync(`saltmark/1/${station.name}/command`, { qos: 1 });
    const settings = { settings: 'sha256:unheard-of' };
    for (const n of [1, 2, 3])
      await publish(client, station.name, 'readings', aMessage([aReading(n)], settings));
    await eventually(() => expect(commands).toMatchObject([{ v: 1, do: 'birth' }]));
    const rows = await plant.rows(
      `select s.settings_hash, s.birth from readings r join device_settings s on s.id = r.settings_id
       where r.device_id = $1`,
      [station.device.id],
    );
    expect(rows).toHaveLength(3);
    expect(rows[0]).toEqual({ settings_hash: 'sha256:unheard-of', birth: null });
  });
});

describe('events', () => {
  it('stand in the timeline of the probe, once', async () => {
    const station = await plant.station();
    const client = await plant.connect(station);
    const fault = { v: 1, boot, at: at(-3), kind: 'fault', text: 'temperature sensor open' };
    await publish(client, station.name, 'event', fault);
    await publish(client, station.name, 'event', fault);
    const events = await plant.rows('select kind, detail, at from probe_events where probe_id = $1', [
      station.probe.id,
    ]);
    expect(events).toMatchObject([
      {
        kind: 'fault',
        at: new Date(at(-3)),
        detail: { device: station.name, text: 'temperature sensor open' },
      },
    ]);
  });

  it('from the future go to quarantine', async () => {
    const station = await plant.station();
    const client = await plant.connect(station);
    await publish(client, station.name, 'event', { v: 1, boot, at: at(600), kind: 'fault' });
    const rows = await plant.rows('select code from quarantined_messages where device_name = $1', [
      station.name,
    ]);
    expect(rows).toEqual([{ code: 'time-in-future' }]);
  });
});
