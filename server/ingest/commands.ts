/** Questions and orders to a device, answered by id. */
import { randomUUID } from 'node:crypto';
import {
  payloadVersion,
  topicOf,
  type CommandMessage,
  type ReplyMessage,
} from '../../shared/contracts/mqtt.ts';
import { AppError } from '../errors.ts';

export type Order =
  | { do: 'birth' }
  | { do: 'resend'; boot: string; from_n: number; to_n: number }
  | { do: 'apply-cell-constant'; cell_constant_per_cm: number };

/** How a command leaves this process: through the embedded broker, or a client of the outside one. */
export interface CommandLine {
  /** False when it is known that nobody would hear; an outside broker cannot know. */
  reaches: (deviceName: string) => boolean;
  publish: (topic: string, payload: string) => Promise<void>;
}

export interface Commands {
  /** Resolves with the device's reply. Refuses with `devices.offline` when it cannot be asked or does not answer in time. */
  send: (deviceName: string, order: Order, timeoutMs?: number) => Promise<ReplyMessage>;
  /** Asks without waiting, at most once a minute per device: for the pipeline, which must not wait. */
  askForBirth: (deviceName: string) => void;
  /** A reply as it was received; null device names are ignored. */
  hear: (deviceName: string, reply: ReplyMessage) => void;
  stop: () => void;
}

const defaultTimeoutMs = 15_000;
const birthPauseMs = 60_000;

interface Waiting {
  deviceName: string;
  resolve: (reply: ReplyMessage) => void;
  reject: (error: Error) => void;
  timer: NodeJS.Timeout;
}

export function createCommands(
  line: CommandLine,
  nowMs: () => number,
  onError: (error: unknown) => void,
): Commands {
  const waiting = new Map<string, Waiting>();
  const lastAsked = new Map<string, number>();
  const publish = (deviceName: string, id: string, order: Order): Promise<void> => {
    const message: CommandMessage = { v: payloadVersion, id, ...order };
    return line.publish(topicOf(deviceName, 'command'), JSON.stringify(message));
  };
  const take = (id: string): Waiting | undefined => {
    const found = waiting.get(id);
    if (found) clearTimeout(found.timer);
    waiting.delete(id);
    return found;
  };
  const offline = (detail: string): AppError => new AppError('devices.offline', { detail });

  return {
    send: (deviceName, order, timeoutMs = defaultTimeoutMs) => {
      if (!line.reaches(deviceName)) return Promise.reject(offline(`${deviceName} is not connected.`));
      const id = randomUUID();
      return new Promise((resolve, reject) => {
        const timer = setTimeout(() => {
          take(id)?.reject(offline(`${deviceName} did not answer within ${timeoutMs / 1000} s.`));
        }, timeoutMs);
        waiting.set(id, { deviceName, resolve, reject, timer });
        publish(deviceName, id, order).catch((error: unknown) => take(id)?.reject(error as Error));
      });
    },
    askForBirth: (deviceName) => {
      const now = nowMs();
      if (now - (lastAsked.get(deviceName) ?? -Infinity) < birthPauseMs || !line.reaches(deviceName)) return;
      lastAsked.set(deviceName, now);
      publish(deviceName, randomUUID(), { do: 'birth' }).catch(onError);
    },
    // Bound to the device that was asked: another one cannot answer for it.
    hear: (deviceName, reply) => {
      if (waiting.get(reply.id)?.deviceName === deviceName) take(reply.id)?.resolve(reply);
    },
    stop: () => {
      for (const id of [...waiting.keys()]) take(id)?.reject(offline('The server is stopping.'));
    },
  };
}
