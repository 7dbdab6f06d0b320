/** Carries one device over MQTT 3.1.1: birth, state with will, readings, late readings, events, replies. */
import { connect, type MqttClient } from 'mqtt';
import {
  commandMessage,
  maxReadingsPerMessage,
  topicOf,
  type MqttReading,
  type TopicKind,
} from '../shared/contracts/mqtt.ts';
import type { SimulatedDevice } from './device.ts';
import { damage } from './faults.ts';
import { seedFor, uniformAt } from './random.ts';
import type { Ticker } from './ticker.ts';

/** Messages on their way at once; beyond it readings wait and travel together, so a slow server meets fewer messages. */
const IN_FLIGHT_LIMIT = 4;
/** Readings a device can buffer without a network: a week at one every five seconds would be more than a demo needs. */
const BACKLOG_LIMIT = 20_000;
const RECONNECT_MIN_MS = 1000;
const RECONNECT_SPREAD_MS = 4000;
const KEEPALIVE_S = 30;

export interface PublisherCounts {
  readingsAcknowledged: number;
  messagesAcknowledged: number;
  connections: number;
}

export interface PublisherOptions {
  device: SimulatedDevice;
  secret: string;
  url: string;
  seed: number;
  ticker: Ticker;
  wall: () => number;
  report: (device: string, trouble: string) => void;
  counts: PublisherCounts;
  /** Called when a setting or the probe changed for good, so that it can be kept on disk. */
  onLastingChange: () => void;
}

export class Publisher {
  readonly device: SimulatedDevice;
  private readonly options: PublisherOptions;
  private client: MqttClient | null = null;
  private isCutOff = false;
  private isStopping = false;
  private hasConnected = false;
  private nextToken = 1;
  /** Messages sent and not acknowledged, with the readings in them. */
  private readonly pending = new Map<number, MqttReading[]>();
  private damageTurn = 0;
  private lastTrouble = '';
  private fresh: MqttReading[] = [];
  private backlog: MqttReading[] = [];

  constructor(options: PublisherOptions) {
    this.options = options;
    this.device = options.device;
  }

  get isConnected(): boolean {
    return this.client?.connected === true && !this.isCutOff;
  }

  connect(): void {
    const { device, options } = this;
    const jitter = uniformAt(seedFor(options.seed, device.name), 0x7e7) * RECONNECT_SPREAD_MS;
    const client = connect(options.url, {
      // The embedded broker speaks 3.1.1 only.
      protocolVersion: 4,
      clientId: device.name,
      username: device.name,
      password: options.secret,
      clean: true,
      keepalive: KEEPALIVE_S,
      // A fleet that lost its broker must not come back as one wave.
      reconnectPeriod: Math.round(RECONNECT_MIN_MS + jitter),
      reconnectOnConnackError: true,
      queueQoSZero: false,
      will: {
        topic: topicOf(device.name, 'state'),
        payload: Buffer.from(JSON.stringify(device.stateMessage(false, 'lost'))),
        qos: 1,
        retain: true,
      },
      timerVariant: {
        set: (run, everyMs) => options.ticker.every(everyMs ?? KEEPALIVE_S * 1000, () => run()),
        clear: (id) => options.ticker.cancel(id),
      },
    });
    this.client = client;
    client.on('connect', () => this.introduce(client));
    client.on('message', (_topic, payload) => this.receive(payload.toString('utf8')));
    client.on('close', () => this.backlog.push(...this.fresh.splice(0)));
    client.on('error', (error) => this.note(error.message));
  }

  /** Says a trouble once, not at every attempt. */
  private note(trouble: string): void {
    if (trouble === this.lastTrouble || this.isStopping) return;
    this.lastTrouble = trouble;
    this.options.report(this.device.name, trouble);
  }

  private introduce(client: MqttClient): void {
    this.options.counts.connections += 1;
    this.hasConnected = true;
    this.lastTrouble = '';
    client.subscribe(topicOf(this.device.name, 'command'), { qos: 1 }, (error) => {
      if (error) this.note(`the broker refused the command topic: ${error.message}`);
    });
    this.sendBirth();
    this.send('state', this.device.stateMessage(true, 'start'), true);
    this.flush();
  }

  private sendBirth(): void {
    this.send('birth', this.device.birth(this.options.wall()), true);
  }

  private send(
    kind: TopicKind,
    message: object | string,
    isRetained: boolean,
    readings: MqttReading[] = [],
  ): void {
    const { client, options } = this;
    if (!client) return;
    const token = this.nextToken;
    this.nextToken += 1;
    this.pending.set(token, readings);
    const text = typeof message === 'string' ? message : JSON.stringify(message);
    client.publish(topicOf(this.device.name, kind), text, { qos: 1, retain: isRetained }, (error) => {
      // Already given up when the line was cut: its readings wait in the backlog.
      if (!this.pending.delete(token)) return;
      if (error) {
        // Not acknowledged: keep the readings; the server ignores those it already has by (device, boot, n).
        this.backlog.push(...readings);
        return;
      }
      options.counts.messagesAcknowledged += 1;
      options.counts.readingsAcknowledged += readings.length;
      if (readings.length > 0) this.flush();
    });
  }

  /** Takes a reading and sends what can be sent. */
  takeReading(now: number): void {
    // A device that never reached its broker has not started measuring: nothing to send late.
    if (!this.hasConnected) return;
    const reading = this.device.read(now);
    if (this.isConnected) this.fresh.push(reading);
    else this.backlog.push(reading);
    if (this.backlog.length > BACKLOG_LIMIT) this.backlog.splice(0, this.backlog.length - BACKLOG_LIMIT);
    this.flush();
  }

  private flush(): void {
    while (
      this.isConnected &&
      this.pending.size < IN_FLIGHT_LIMIT &&
      (this.backlog.length > 0 || this.fresh.length > 0)
    ) {
      // The newest first: a live view comes alive at once, the past fills in behind it.
      const isFresh = this.fresh.length > 0;
      const readings = (isFresh ? this.fresh : this.backlog).splice(0, maxReadingsPerMessage);
      this.sendReadings(isFresh ? 'readings' : 'late', readings);
    }
  }

  private sendReadings(kind: 'readings' | 'late', readings: MqttReading[]): void {
    for (const message of this.device.pack(readings, this.options.wall())) {
      const isDamaged = this.device.faults.has('malformed') && this.damageTurn++ % 4 === 3;
      if (isDamaged) this.send(kind, damage(message, Math.floor(this.damageTurn / 4)), false);
      else this.send(kind, message, false, message.readings);
      if (this.device.faults.has('duplicate')) this.send(kind, message, false);
    }
  }

  announce(kind: 'fault' | 'context' | 'settings', text: string): void {
    if (this.isConnected) this.send('event', this.device.event(this.options.wall(), kind, text), false);
  }

  /** A change at the device itself: event, then a new birth with the new settings hash. */
  announceSettings(text: string): void {
    this.announce('settings', text);
    if (this.isConnected) this.sendBirth();
    this.options.onLastingChange();
  }

  private receive(text: string): void {
    const parsed = commandMessage.safeParse(parseJson(text));
    if (!parsed.success) {
      this.note('a command was not understood and is ignored');
      return;
    }
    const { reply, resend, isSettingsChange } = this.device.obey(parsed.data);
    this.send('reply', reply, false);
    if (isSettingsChange) this.announceSettings(reply.text ?? 'Settings changed.');
    else if (parsed.data.do === 'birth') this.sendBirth();
    for (const message of this.device.pack(resend, this.options.wall()))
      this.send('late', message, false, message.readings);
  }

  /** Cuts the line without a goodbye, as a broken link does: the broker publishes the will. */
  cutOff(): void {
    if (this.isCutOff) return;
    this.isCutOff = true;
    this.backlog.push(...this.fresh.splice(0));
    for (const readings of this.pending.values()) this.backlog.push(...readings);
    this.pending.clear();
    // Forced: the stream is destroyed and no DISCONNECT is sent.
    this.client?.end(true);
    this.client = null;
  }

  comeBack(): void {
    if (!this.isCutOff || this.isStopping) return;
    this.isCutOff = false;
    this.connect();
  }

  /** Says goodbye, so that nobody takes a planned stop for a lost device. */
  async stop(): Promise<void> {
    this.isStopping = true;
    const { client } = this;
    if (!client) return;
    if (!client.connected) {
      await client.endAsync(true);
      return;
    }
    const goodbye = JSON.stringify(this.device.stateMessage(false, 'planned'));
    await client
      .publishAsync(topicOf(this.device.name, 'state'), goodbye, { qos: 1, retain: true })
      .catch(() => undefined);
    // Not forced: a DISCONNECT makes the broker forget the will.
    await client.endAsync(false);
  }
}

function parseJson(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return undefined;
  }
}
