/**
 * What the embedded broker asks us. Only `authorizePublish` comes before the acknowledgement, so it is here that
 * a publish waits for its commit. A hook that throws would end the process, and one that answers a publish with an
 * error closes the connection: MQTT 3.1.1 has no other refusal, the device would come back and send the same again,
 * for ever. A bad message is therefore accepted, quarantined and not passed on.
 */
import type { AedesOptions, AuthErrorCode, Client, PublishPacket } from 'aedes';
import type { Logger } from '../lib/logger.ts';
import { isDeviceSecret } from './device-secrets.ts';
import type { DeviceDirectory } from './device-directory.ts';
import type { Intake } from './intake.ts';
import type { Envelope } from './message.ts';
import { connectionsRefused } from './metrics.ts';
import { judgePublish, maySubscribe } from './topic-rules.ts';

export interface HookContext {
  directory: DeviceDirectory;
  intake: Intake;
  log: Logger;
  nowMs: () => number;
  /** A device has proved itself; `client` is about to take the place of whoever holds its name. */
  onSignedIn: (client: Client, deviceName: string) => void;
}

type Hooks = Required<
  Pick<
    AedesOptions,
    'preConnect' | 'authenticate' | 'authorizePublish' | 'authorizeSubscribe' | 'authorizeForward'
  >
>;

/** Where messages that must reach nobody are sent on to: no device can subscribe to it. */
const nowhere = 'saltmark/refused';

class RefusedConnection extends Error {
  readonly returnCode: AuthErrorCode;
  constructor(returnCode: AuthErrorCode, message: string) {
    super(message);
    this.returnCode = returnCode;
  }
}

export function brokerHooks(context: HookContext): Hooks {
  const complain = (error: unknown): void =>
    context.log.error({ err: error }, 'the broker failed on an answer');
  return {
    // Sessions that outlive their connection would queue in memory without bound for a device that never returns.
    // Every session therefore starts clean, and says so in CONNACK; commands reach connected devices only.
    preConnect: (_client, packet, callback) => {
      packet.clean = true;
      callback(null, true);
    },
    authenticate: (client, username, password, done) => {
      signIn(context, client, username, password)
        .then(
          () => done(null, true),
          (error: unknown) => {
            const isOurs = error instanceof RefusedConnection;
            if (!isOurs) context.log.error({ err: error }, 'a device could not be signed in');
            done(isOurs ? error : new RefusedConnection(returnCodes.unavailable, 'Try again later.'), null);
          },
        )
        .catch(complain);
    },
    authorizePublish: (client, packet, callback) => {
      takePublish(context, client, packet)
        .then(
          () => callback(null),
          (error: unknown) => callback(error instanceof Error ? error : new Error(String(error))),
        )
        .catch(complain);
    },
    authorizeSubscribe: (client, subscription, callback) => {
      const isAllowed = maySubscribe(client.id, subscription.topic);
      if (!isAllowed)
        context.log.warn({ device: client.id, topic: subscription.topic }, 'subscription refused');
      callback(null, isAllowed ? subscription : null);
    },
    // Devices hear the server's commands and nothing else; a publish of a client carries that client's id.
    authorizeForward: (client, packet) => {
      const isFromServer = (packet as { clientId?: string }).clientId === undefined;
      return isFromServer && maySubscribe(client.id, packet.topic) ? packet : null;
    },
  };
}

// The enum is `const` and has no runtime form.
const returnCodes = { identifier: 2, unavailable: 3, credentials: 4, notAuthorised: 5 } as const;

async function signIn(
  { directory, intake, log, onSignedIn }: HookContext,
  client: Client,
  username: string | undefined,
  password: Buffer | undefined,
): Promise<void> {
  const refuse = (reason: string, code: AuthErrorCode, says: string): never => {
    connectionsRefused.inc({ reason });
    log.warn({ client: client.id, username, reason }, 'device connection refused');
    throw new RefusedConnection(code, says);
  };
  if (intake.isHolding() || intake.isCrowded()) {
    refuse('busy', returnCodes.unavailable, 'The database does not take readings now; try again later.');
  }
  if (!username || !password)
    return refuse('anonymous', returnCodes.credentials, 'Sign in with name and secret.');
  const device = await directory.find(username);
  if (!device || !isDeviceSecret(device.secretHash, password)) {
    return refuse('credentials', returnCodes.credentials, 'Name and secret do not match.');
  }
  if (device.isRevoked)
    return refuse('revoked', returnCodes.notAuthorised, 'The credentials were withdrawn.');
  if (client.id !== username) {
    return refuse('client-id', returnCodes.identifier, 'The client id must be the device name.');
  }
  onSignedIn(client, username);
}

/** Resolves when the message is durable. A will arrives here like any other publish. */
async function takePublish(
  { intake, nowMs }: HookContext,
  client: Client | null,
  packet: PublishPacket,
): Promise<void> {
  const device = client?.id ?? null;
  // Aedes asks without a client for wills of brokers that are gone; this one has no such neighbours.
  if (device === null) return sendNowhere(packet);
  const payload = typeof packet.payload === 'string' ? Buffer.from(packet.payload) : packet.payload;
  const envelope: Envelope = {
    topic: packet.topic,
    payload: payload ?? Buffer.alloc(0),
    deviceName: device,
    clientId: device,
    receivedAtMs: nowMs(),
  };
  const verdict = judgePublish(device, packet.topic);
  if ('refusal' in verdict) {
    sendNowhere(packet);
    return intake.refuse(envelope, verdict.refusal);
  }
  if (!verdict.mayRetain) packet.retain = false;
  return intake.take(envelope, verdict.kind);
}

/** The broker goes on to deliver and to keep whatever the hook accepts; this makes both harmless. */
function sendNowhere(packet: PublishPacket): void {
  packet.topic = nowhere;
  packet.retain = false;
}
