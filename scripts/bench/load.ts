/** Devices of the benchmark: as fast as they are answered, or at a steady rate whatever the answers do. */
import { connectAsync, type MqttClient } from 'mqtt';
import { topicOf } from '../../shared/contracts/mqtt.ts';
import { summarise, type Latencies } from './figures.ts';

export interface BenchDevice {
  name: string;
  client: MqttClient;
  boot: string;
  nextN: number;
}

export const benchSecret = 'bench-secret';
/** A server is slow until its code is compiled; nobody runs one for six seconds. */
export const warmUpMs = 4000;

/** Sockets are opened a few at a time: a thousand at once measures the listen queue. */
export async function connectDevices(url: string, names: readonly string[]): Promise<BenchDevice[]> {
  const devices: BenchDevice[] = [];
  // Each phase is a later start of the same devices, or its readings would be taken for repeats.
  const boot = `B${Date.now().toString(36)}`;
  const atOnce = 50;
  for (let start = 0; start < names.length; start += atOnce) {
    const opened = names.slice(start, start + atOnce).map(async (name): Promise<BenchDevice> => {
      const client = await connectAsync(url, {
        clientId: name,
        username: name,
        password: benchSecret,
        reconnectPeriod: 0,
      });
      return { name, client, boot, nextN: 0 };
    });
    devices.push(...(await Promise.all(opened)));
  }
  return devices;
}

export const disconnect = async (devices: readonly BenchDevice[]): Promise<void> => {
  await Promise.all(devices.map(({ client }) => client.endAsync()));
};

/** An ordinary message. The conductivity carries the reading's identity, so that it can be found again in a live update. */
export function message(device: BenchDevice, readings: number, conductivityUsCm = 1061): string {
  const now = new Date().toISOString();
  const list = Array.from({ length: readings }, () => ({
    n: device.nextN++,
    at: now,
    context: 'process',
    conductivity_us_cm: conductivityUsCm,
    temperature_c: 13.02,
    conductance_us: 1061,
    solution: null,
    quality: 'good',
    flags: [],
  }));
  return JSON.stringify({
    v: 1,
    boot: device.boot,
    sent: now,
    clock: { source: 'ntp', offset_ms: 12 },
    settings: 'sha256:9b1c4e00',
    readings: list,
  });
}

function publish(device: BenchDevice, payload: string): Promise<void> {
  return new Promise((resolve, reject) => {
    device.client.publish(topicOf(device.name, 'readings'), payload, { qos: 1 }, (error) =>
      error ? reject(error) : resolve(),
    );
  });
}

/** Each device keeps `window` messages on their way. Answers readings acknowledged a second, after a warm-up. */
export async function measureThroughput(options: {
  devices: readonly BenchDevice[];
  window: number;
  seconds: number;
  readingsPerMessage?: number;
}): Promise<{ perSecond: number; total: number }> {
  const { devices, window, seconds, readingsPerMessage = 1 } = options;
  let acknowledged = 0;
  let isOver = false;
  const lane = async (device: BenchDevice): Promise<void> => {
    while (!isOver) {
      await publish(device, message(device, readingsPerMessage));
      acknowledged += readingsPerMessage;
    }
  };
  const lanes = devices.flatMap((device) => Array.from({ length: window }, () => lane(device)));
  await pause(warmUpMs);
  const before = acknowledged;
  const started = performance.now();
  await pause(seconds * 1000);
  const perSecond = (acknowledged - before) / ((performance.now() - started) / 1000);
  isOver = true;
  await Promise.all(lanes);
  return { perSecond, total: acknowledged };
}

/** Sends at a steady rate in turn over the devices. `onSend` may mark the message; times are from publish to acknowledgement. */
export async function measureLatency(options: {
  devices: readonly BenchDevice[];
  perSecond: number;
  seconds: number;
  conductivityFor?: (index: number) => number;
}): Promise<Latencies & { offeredPerSecond: number }> {
  const { devices, perSecond, seconds, conductivityFor } = options;
  const samples: number[] = [];
  const pending: Promise<void>[] = [];
  const total = perSecond * seconds;
  const warmUp = (perSecond * warmUpMs) / 1000;
  const started = performance.now();
  for (let sent = 0; sent < total + warmUp;) {
    const due = Math.min(total + warmUp, Math.floor(((performance.now() - started) / 1000) * perSecond));
    for (; sent < due; sent += 1) {
      const device = devices[sent % devices.length]!;
      const payload = message(device, 1, conductivityFor?.(sent));
      const isCounted = sent >= warmUp;
      const at = performance.now();
      pending.push(
        publish(device, payload).then(() => void (isCounted && samples.push(performance.now() - at))),
      );
    }
    await pause(1);
  }
  const offeredPerSecond = (total + warmUp) / ((performance.now() - started) / 1000);
  await Promise.all(pending);
  return { ...summarise(samples), offeredPerSecond };
}

export const pause = (ms: number): Promise<void> => new Promise((resolve) => void setTimeout(resolve, ms));
