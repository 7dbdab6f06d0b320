/** The embedded broker: listeners, connections, and the way out for commands. What it asks is in broker-hooks.ts. */
import { readFile } from 'node:fs/promises';
import { createServer, type AddressInfo, type Server, type Socket } from 'node:net';
import { createServer as createTlsServer } from 'node:tls';
import { Aedes, type Client } from 'aedes';
import { maxMessageBytes } from '../../shared/contracts/mqtt.ts';
import { devicesConnected } from '../http/metrics.ts';
import type { Logger } from '../lib/logger.ts';
import type { Parts } from '../parts.ts';
import { brokerHooks } from './broker-hooks.ts';
import type { CommandLine } from './commands.ts';
import type { DeviceDirectory } from './device-directory.ts';
import type { Intake } from './intake.ts';
import type { Takeovers } from './takeovers.ts';

export interface Broker {
  url: string;
  /** The port it got, when it was asked for port 0. */
  port: number;
  line: CommandLine;
  isConnected: (deviceName: string) => boolean;
  /** Takes no more connections. */
  close: () => Promise<void>;
  /** Ends the connections there are. */
  end: () => Promise<void>;
}

/** Quarantine keeps 64 KiB of a message that is too large; one that is larger still is not even read. */
const maxPacketBytes = 16 * maxMessageBytes;
/** Unauthenticated sockets are cheap to open; the sign-in must follow at once. */
const connectTimeoutMs = 10_000;
/** A receiver of commands that does not read holds up its publisher this long. */
const drainTimeoutMs = 10_000;

export async function openBroker(options: {
  parts: Pick<Parts, 'config' | 'clock' | 'log'>;
  directory: DeviceDirectory;
  intake: Intake;
  takeovers: Takeovers;
}): Promise<Broker> {
  const { parts, directory, intake, takeovers } = options;
  const { config, log } = parts;
  const nowMs = (): number => parts.clock.now().getTime();
  const connected = new Map<string, Client>();

  const onSignedIn = (client: Client, name: string): void => {
    const device = directory.cached(name);
    if (!device || !connected.has(name)) return;
    const address = (client.conn as Socket).remoteAddress ?? null;
    const siteId = directory.currentPoint(device.probeId, nowMs())?.siteId ?? null;
    takeovers.seen(device, address, siteId);
  };
  const aedes = await Aedes.createBroker({
    ...brokerHooks({ directory, intake, log, nowMs, onSignedIn }),
    concurrency: 1000,
    connectTimeout: connectTimeoutMs,
    drainTimeout: drainTimeoutMs,
  });
  follow(aedes, connected, log);
  directory.onCredentialsChanged((name) => {
    log.info({ device: name }, 'credentials changed: connection closed');
    connected.get(name)?.close();
  });

  const accept = (socket: Socket): void => boundPacketSize(socket, aedes.handle(socket));
  const servers = [await listen(createServer({ noDelay: true }, accept), config.mqttPort, config.bind)];
  if (config.mqttTls) {
    const [cert, key] = await Promise.all([
      readFile(config.mqttTls.certFile),
      readFile(config.mqttTls.keyFile),
    ]);
    servers.push(
      await listen(createTlsServer({ cert, key, noDelay: true }, accept), config.mqttTlsPort, config.bind),
    );
  }
  const { port } = servers[0]!.address() as AddressInfo;

  return {
    url: `mqtt://${config.bind}:${port}`,
    port,
    line: {
      reaches: (name) => connected.has(name),
      publish: (topic, payload) =>
        new Promise((resolve, reject) => {
          aedes.publish({ cmd: 'publish', topic, payload, qos: 1, retain: false, dup: false }, (error) =>
            error ? reject(error) : resolve(),
          );
        }),
    },
    isConnected: (name) => connected.has(name),
    close: async () => {
      for (const server of servers) server.close();
    },
    end: () => new Promise((resolve) => aedes.close(() => resolve())),
  };
}

/** Keeps `connected` true to the broker, and its complaints in the log. */
function follow(aedes: Aedes, connected: Map<string, Client>, log: Logger): void {
  aedes.on('client', (client) => {
    connected.set(client.id, client);
    devicesConnected.set(connected.size);
  });
  aedes.on('clientDisconnect', (client) => {
    if (connected.get(client.id) === client) connected.delete(client.id);
    devicesConnected.set(connected.size);
  });
  aedes.on('clientError', (client, error) =>
    log.debug({ device: client.id, err: error }, 'device connection ended'),
  );
  aedes.on('connectionError', (_client, error) =>
    log.debug({ err: error }, 'connection ended before sign-in'),
  );
}

function listen(server: Server, port: number, host: string): Promise<Server> {
  return new Promise((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, host, () => {
      server.removeListener('error', reject);
      resolve(server);
    });
  });
}

/**
 * The protocol allows packets of 256 MB and the broker gathers all of one before it looks. This looks at the length
 * announced in the header, after each read; the parser has no public face, so its absence is taken as no limit.
 */
function boundPacketSize(socket: Socket, client: Client): void {
  const { _parser: parser } = client as unknown as { _parser?: { packet?: { length?: number } } };
  socket.on('readable', () => {
    const announced = parser?.packet?.length ?? 0;
    if (announced > maxPacketBytes)
      socket.destroy(new Error(`A packet of ${announced} bytes is not accepted.`));
  });
}
