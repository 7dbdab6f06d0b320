/**
 * The same pipeline behind somebody else's broker. A subscriber's client takes one message at a time, so that a
 * group is as large as there are connections: 32 of them share the load of all servers through `$share`, each
 * acknowledging only after its message's commit. Sessions outlive their connection (fixed client ids), so that what
 * comes while this server is down waits in the broker.
 */
import { createHash } from 'node:crypto';
import { hostname } from 'node:os';
import mqtt, { type IPublishPacket, type MqttClient } from 'mqtt';
import { parseTopic, topicKinds } from '../../shared/contracts/mqtt.ts';
import type { Parts } from '../parts.ts';
import type { CommandLine } from './commands.ts';
import type { Intake } from './intake.ts';

export interface OutsideBroker {
  line: CommandLine;
  connectedCount: () => number;
  close: () => Promise<void>;
}

const connections = 32;
const reconnectMs = 1000;
const everyDevice = (kind: string): string => `saltmark/1/+/${kind}`;
/** Shared by all servers. Commands are ours to send, and a reply must reach the server that asked: see below. */
const sharedFilters = topicKinds
  .filter((kind) => kind !== 'command' && kind !== 'reply')
  .map((kind) => `$share/saltmark/${everyDevice(kind)}`);

export async function joinOutsideBroker(options: {
  parts: Pick<Parts, 'config' | 'clock' | 'log'>;
  url: string;
  intake: Intake;
}): Promise<OutsideBroker> {
  const { parts, url, intake } = options;
  const { log } = parts;
  // The same server finds its sessions again, and two servers on one machine do not share one.
  const identity = createHash('sha256')
    .update(`${hostname()}:${parts.config.httpPort}`)
    .digest('hex')
    .slice(0, 8);

  const open = (index: number): MqttClient => {
    const client = mqtt.connect(url, {
      clientId: `saltmark-${identity}-${index}`,
      clean: false,
      protocolVersion: 4,
      reconnectOnConnackError: true,
      // Without a spread, all connections would come back in the same instant after an outage.
      reconnectPeriod: reconnectMs + index * 40,
      resubscribe: true,
    });
    client.handleMessage = (packet, done) => {
      takeMessage(intake, packet, parts.clock.now().getTime()).then(
        () => done(),
        (error: unknown) => done(error as Error),
      );
    };
    client.on('error', (error) => log.warn({ err: error, index }, 'outside broker'));
    return client;
  };
  const clients = Array.from({ length: connections }, (_, index) => open(index));
  const [first] = clients as [MqttClient, ...MqttClient[]];
  const close = async (): Promise<void> => {
    await Promise.all(clients.map((client) => client.endAsync(true)));
  };
  try {
    await Promise.all(clients.map((client) => client.subscribeAsync(sharedFilters, { qos: 1 })));
    await first.subscribeAsync(everyDevice('reply'), { qos: 1 });
  } catch (error) {
    await close();
    throw error;
  }
  return {
    line: {
      reaches: () => first.connected,
      publish: async (topic, payload) => void (await first.publishAsync(topic, payload, { qos: 1 })),
    },
    connectedCount: () => clients.filter((client) => client.connected).length,
    close,
  };
}

/** Here the topic alone says who spoke: checking credentials and topic rights is the outside broker's part. */
function takeMessage(intake: Intake, packet: IPublishPacket, receivedAtMs: number): Promise<void> {
  const { topic } = packet;
  const payload = typeof packet.payload === 'string' ? Buffer.from(packet.payload) : packet.payload;
  const parsed = parseTopic(topic);
  const envelope = { topic, payload, deviceName: parsed?.device ?? null, clientId: null, receivedAtMs };
  if (!parsed || parsed.kind === 'command') {
    return intake.refuse(envelope, { code: 'topic-unknown', reason: `Nothing is expected on ${topic}.` });
  }
  return intake.take(envelope, parsed.kind);
}
