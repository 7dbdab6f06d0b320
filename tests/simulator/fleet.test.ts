import { mkdtempSync, rmSync, statSync } from 'node:fs';
import { createServer, type Server } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Aedes, type AuthenticateError } from 'aedes';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import {
  birthMessage,
  parseTopic,
  readingsMessage,
  replyMessage,
  stateMessage,
  topicOf,
  type CommandMessage,
} from '../../shared/contracts/mqtt.ts';
import { help, readCommandLine } from '../../simulator/command-line.ts';
import { askControl, openControl } from '../../simulator/control.ts';
import { faultKinds } from '../../simulator/faults.ts';
import { Fleet, type FleetOptions } from '../../simulator/fleet.ts';
import { Ticker } from '../../simulator/ticker.ts';

interface Heard {
  device: string;
  kind: string;
  text: string;
  retained: boolean;
}

/** A real broker that lets only the right password in and remembers what it heard. */
async function openBroker() {
  const heard: Heard[] = [];
  const refused: string[] = [];
  const broker = await Aedes.createBroker({
    authenticate: (client, username, password, done) => {
      const isRight = username === client.id && password?.toString() === `secret of ${client.id}`;
      if (!isRight) refused.push(client.id);
      const error = isRight ? null : Object.assign(new Error('not authorised'), { returnCode: 5 });
      done(error as AuthenticateError | null, isRight);
    },
    authorizePublish: (_client, packet, done) => {
      const topic = parseTopic(packet.topic);
      if (topic) heard.push({ ...topic, text: packet.payload.toString(), retained: packet.retain });
      done(null);
    },
  });
  const server: Server = createServer(broker.handle);
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const address = server.address();
  if (address === null || typeof address === 'string') throw new Error('no port');
  const close = () => new Promise<void>((resolve) => broker.close(() => server.close(() => resolve())));
  const command = (device: string, message: CommandMessage) =>
    new Promise<void>((resolve, reject) =>
      broker.publish(
        {
          cmd: 'publish',
          topic: topicOf(device, 'command'),
          payload: Buffer.from(JSON.stringify(message)),
          qos: 1,
          dup: false,
          retain: false,
        },
        (error) => (error ? reject(error) : resolve()),
      ),
    );
  return { url: `mqtt://127.0.0.1:${address.port}`, heard, refused, close, command };
}

const named = (count: number) =>
  Array.from({ length: count }, (_, index) => ({
    device: `probe-t-${index}`,
    secret: `secret of probe-t-${index}`,
  }));

describe('a running fleet', () => {
  let broker: Awaited<ReturnType<typeof openBroker>>;
  let fleet: Fleet | null;
  let folder: string;
  let troubles: string[];
  const of = (kind: string, device = 'probe-t-0') =>
    broker.heard.filter((one) => one.kind === kind && one.device === device);
  const parsed = <T>(schema: { parse: (value: unknown) => T }, list: Heard[]): T[] =>
    list.map((one) => schema.parse(JSON.parse(one.text)));

  function startFleet(more: Partial<FleetOptions> = {}): Fleet {
    fleet = new Fleet({
      file: {
        devices: named(1),
        solutions: [
          {
            code: 'KC-26-031',
            basis: 'molal',
            nominal: 0.01,
            certified25UsCm: 1408.2,
            table: null,
            deviation: 0,
          },
        ],
      },
      url: broker.url,
      rate: 20,
      speed: 1,
      seed: 1,
      statePath: null,
      isMarked: true,
      report: (line) => troubles.push(line),
      ...more,
    });
    fleet.start();
    return fleet;
  }

  beforeEach(async () => {
    broker = await openBroker();
    troubles = [];
    fleet = null;
    folder = mkdtempSync(join(tmpdir(), 'saltmark-simulator-'));
  });

  afterEach(async () => {
    await fleet?.stop();
    await broker.close();
    rmSync(folder, { recursive: true });
  });

  it('introduces each device: retained birth and state, then readings', async () => {
    startFleet({ file: { devices: named(3) } });
    await vi.waitFor(
      () =>
        expect(
          new Set(broker.heard.filter((one) => one.kind === 'readings').map((one) => one.device)).size,
        ).toBe(3),
      8000,
    );
    const [birth] = parsed(birthMessage, of('birth'));
    expect(birth!.interval_s).toBe(0.05);
    expect(of('birth')[0]!.retained).toBe(true);
    expect(parsed(stateMessage, of('state'))[0]).toMatchObject({
      online: true,
      why: 'start',
      boot: birth!.boot,
    });
    const messages = parsed(readingsMessage, of('readings'));
    expect(messages.every((one) => one.settings === birth!.settings)).toBe(true);
  });

  it('says goodbye when it is stopped, and the will stays unspoken', async () => {
    startFleet();
    await vi.waitFor(() => expect(of('readings').length).toBeGreaterThan(0), 8000);
    await fleet!.stop();
    fleet = null;
    expect(parsed(stateMessage, of('state')).map((one) => one.why)).toEqual(['start', 'planned']);
  });

  it('leaves its will when the line breaks, and sends what it buffered late, without losing a number', async () => {
    const running = startFleet();
    await vi.waitFor(() => expect(of('readings').length).toBeGreaterThan(3), 8000);
    running.perform({ do: 'fault', device: 'probe-t-0', fault: 'offline', minutes: 0.01 });
    await vi.waitFor(() => expect(of('late').length).toBeGreaterThan(0), 12_000);
    expect(parsed(stateMessage, of('state')).map((one) => one.why)).toEqual(['start', 'lost', 'start']);
    const numbersHeard = () => {
      const messages = parsed(
        readingsMessage,
        broker.heard.filter((one) => one.kind === 'readings' || one.kind === 'late'),
      );
      return [...new Set(messages.flatMap((one) => one.readings.map(({ n }) => n)))].sort((a, b) => a - b);
    };
    await vi.waitFor(() => {
      const numbers = numbersHeard();
      expect(numbers.length).toBeGreaterThan(20);
      expect(numbers).toEqual(numbers.map((_, index) => numbers[0]! + index));
    }, 8000);
  });

  it('obeys over the wire: applies a cell constant, replies, is born anew with another hash', async () => {
    startFleet();
    await vi.waitFor(() => expect(of('readings').length).toBeGreaterThan(0), 8000);
    const before = parsed(birthMessage, of('birth')).at(-1)!;
    await broker.command('probe-t-0', {
      v: 1,
      id: 'cmd-7',
      do: 'apply-cell-constant',
      cell_constant_per_cm: before.cell_constant_per_cm * 1.01,
    });
    await vi.waitFor(() => expect(of('birth')).toHaveLength(2), 5000);
    expect(parsed(replyMessage, of('reply'))).toMatchObject([{ id: 'cmd-7', done: true }]);
    const after = parsed(birthMessage, of('birth')).at(-1)!;
    expect(after.settings).not.toBe(before.settings);
    expect(after.cell_constant_per_cm / before.cell_constant_per_cm).toBeCloseTo(1.01, 4);
    expect(of('event').map((one) => JSON.parse(one.text) as { kind: string })).toMatchObject([
      { kind: 'settings' },
    ]);
  });

  it('sends readings again on command, word for word', async () => {
    startFleet();
    await vi.waitFor(() => expect(of('readings').length).toBeGreaterThan(4), 8000);
    const first = parsed(readingsMessage, of('readings'))
      .flatMap((one) => one.readings)
      .slice(0, 4);
    const { boot } = parsed(birthMessage, of('birth'))[0]!;
    await broker.command('probe-t-0', {
      v: 1,
      id: 'cmd-8',
      do: 'resend',
      boot,
      from_n: first[1]!.n,
      to_n: first[3]!.n,
    });
    await vi.waitFor(() => expect(of('late')).toHaveLength(1), 5000);
    expect(parsed(readingsMessage, of('late'))[0]!.readings).toEqual(first.slice(1));
  });

  it('keeps an applied cell constant over a restart, and forgets it when another history is loaded', async () => {
    const statePath = join(folder, 'state.json');
    const state = {
      at: Date.UTC(2026, 10, 1),
      quantum: 83_000,
      lnAgeing: 0,
      deposit: 0,
      cellConstantInUsePerCm: 0.5,
      n: 10,
    };
    const withState = (at: number) => ({
      devices: named(1).map((one) => ({ ...one, state: { ...state, at } })),
    });
    const used = () => parsed(birthMessage, of('birth')).at(-1)!.cell_constant_per_cm;
    startFleet({ statePath, file: withState(state.at) }).perform({
      do: 'cell-constant',
      device: 'probe-t-0',
      perCm: 0.55,
    });
    await fleet!.stop();
    startFleet({ statePath, file: withState(state.at) });
    await vi.waitFor(() => expect(used()).toBe(0.55), 8000);
    await fleet!.stop();
    startFleet({ statePath, file: withState(state.at + 1) });
    await vi.waitFor(() => expect(used()).toBe(0.5), 8000);
  });

  it('reports a refused password once, in words, and never gets in', async () => {
    startFleet({ file: { devices: [{ device: 'probe-t-0', secret: 'wrong' }] } });
    await vi.waitFor(() => expect(troubles).toHaveLength(1), 8000);
    expect(troubles[0]).toContain('probe-t-0');
    expect(broker.heard).toEqual([]);
  });

  it('duplicates, floods and damages when asked', async () => {
    const running = startFleet({ rate: 4 });
    await vi.waitFor(() => expect(of('readings').length).toBeGreaterThan(0), 8000);
    running.perform({ do: 'fault', device: 'probe-t-0', fault: 'duplicate', minutes: 1 });
    await vi.waitFor(() => {
      const texts = of('readings').map((one) => one.text);
      expect(texts.length - new Set(texts).size).toBeGreaterThan(1);
    }, 5000);
    running.perform({ do: 'heal', device: 'probe-t-0' });
    running.perform({ do: 'fault', device: 'probe-t-0', fault: 'malformed', minutes: 1 });
    const isValid = (text: string) => {
      try {
        return readingsMessage.safeParse(JSON.parse(text)).success;
      } catch {
        return false;
      }
    };
    await vi.waitFor(() => expect(of('readings').some((one) => !isValid(one.text))).toBe(true), 8000);
    running.perform({ do: 'heal', device: 'probe-t-0' });
    const before = of('readings').length;
    running.perform({ do: 'fault', device: 'probe-t-0', fault: 'flood', minutes: 1 });
    await vi.waitFor(() => {
      const readings = parsed(
        readingsMessage,
        of('readings')
          .slice(before)
          .filter((one) => isValid(one.text)),
      ).flatMap((one) => one.readings);
      expect(readings.length).toBeGreaterThan(150);
      expect(new Set(readings.map(({ n }) => n)).size).toBe(readings.length);
    }, 8000);
  });

  it('is asked over a local socket that only its owner may open', async () => {
    const running = startFleet();
    const path = join(folder, 'control.sock');
    const control = await openControl(path, (deed) => running.perform(deed));
    expect(statSync(path).mode & 0o777).toBe(0o600);
    const bench = await askControl(path, {
      do: 'bench',
      device: 't-0',
      solution: 'KC-26-031',
      temperatureC: 24.8,
      context: 'calibration',
    });
    expect(bench).toEqual({
      isDone: true,
      text: expect.stringContaining('probe-t-0 is in KC-26-031 at 24.8 °C'),
    });
    await vi.waitFor(() => {
      const readings = parsed(readingsMessage, of('readings')).flatMap((one) => one.readings);
      expect(readings.at(-1)).toMatchObject({ context: 'calibration', solution: 'KC-26-031' });
    }, 8000);
    expect(await askControl(path, { do: 'clean', device: 'nobody' })).toEqual({
      isDone: false,
      text: expect.stringContaining('No device "nobody"'),
    });
    expect(
      await askControl(path, { do: 'bench', device: 't-0', solution: 'KC-00-000', context: 'check' }),
    ).toMatchObject({ isDone: false, text: expect.stringContaining('KC-26-031') });
    await new Promise((resolve) => control.close(resolve));
    await expect(askControl(path, { do: 'list' })).rejects.toThrow('No simulator answers');
  });

  it('refuses more probes than it has credentials for', () => {
    expect(() => startFleet({ probes: 2 })).toThrow(
      '2 probes were asked for, but the credentials file names 1',
    );
  });
});

describe('thousands of probes', () => {
  it('share one timer', () => {
    const timers = () => process.getActiveResourcesInfo().filter((one) => one === 'Timeout').length;
    const before = timers();
    const fleet = new Fleet({
      file: { devices: named(3000) },
      url: 'mqtt://127.0.0.1:9',
      speed: 1,
      seed: 1,
      statePath: null,
      isMarked: true,
      report: () => undefined,
      wall: () => 0,
    });
    fleet.start();
    expect(fleet.ticker.size).toBeGreaterThan(6000);
    expect(timers() - before).toBe(1);
    fleet.ticker.stop();
  });

  it('run what is due once after a hold-up, and keep their phase', () => {
    let now = 0;
    const ticker = new Ticker(() => now);
    const runs: number[] = [];
    ticker.every(100, (at) => runs.push(at), 40);
    for (now of [30, 50, 139, 140, 1000, 1039, 1041]) ticker.tick(now);
    expect(runs).toEqual([50, 140, 1000, 1041]);
  });
});

describe('the command line', () => {
  it('explains every fault and every command', () => {
    for (const kind of Object.keys(faultKinds)) expect(help).toContain(kind);
    for (const command of [
      'bench',
      'air',
      'check',
      'clean',
      'process',
      'cell-constant',
      'list',
      '--probes',
      '--rate',
      '--speed',
      '--seed',
      '--url',
      '--credentials',
    ]) {
      expect(help).toContain(command);
    }
  });

  it('understands the commands it explains', () => {
    expect(readCommandLine(['fault', 'sk', 'flood', '--minutes', '3'])).toMatchObject({
      kind: 'ask',
      deed: { do: 'fault', device: 'sk', fault: 'flood', minutes: 3 },
    });
    expect(
      readCommandLine([
        'bench',
        'sk',
        '--solution',
        'X',
        '--basis',
        'molal',
        '--nominal',
        '0.01',
        '--temperature',
        '24.8',
      ]),
    ).toMatchObject({
      deed: {
        do: 'bench',
        temperatureC: 24.8,
        context: 'calibration',
        solution: { code: 'X', basis: 'molal', nominal: 0.01 },
      },
    });
    expect(readCommandLine(['--probes', '2000', '--rate', '1'])).toMatchObject({
      kind: 'run',
      options: { probes: 2000, rate: 1, speed: 1 },
    });
  });

  it('says what is wrong and what to do', () => {
    expect(() => readCommandLine(['fault', 'sk', 'gremlins'])).toThrow('flat-line, spikes');
    expect(() => readCommandLine(['bench', 'sk'])).toThrow('--solution');
    expect(() => readCommandLine(['--rate', 'fast'])).toThrow('--rate must be a number');
    expect(() => readCommandLine(['clean'])).toThrow('needs a device');
    expect(() => readCommandLine(['dance', 'sk'])).toThrow('"dance" is no command');
  });
});
