/** From bytes to a checked message: size, text, JSON, version, schema. Whatever fails gets a code and a sentence. */
import { isUtf8 } from 'node:buffer';
import type { z } from 'zod';
import {
  birthMessage,
  eventMessage,
  maxMessageBytes,
  payloadVersion,
  readingsMessage,
  replyMessage,
  stateMessage,
  type MqttReading,
  type ReadingsMessage,
} from '../../shared/contracts/mqtt.ts';
import { decodePlainReadings } from './fast-decode.ts';
import type { Content, IncomingReading, ReadingsContent, Refusal } from './message.ts';
import type { DeviceKind } from './topic-rules.ts';

export type Decoded = { content: Content } | { refusal: Refusal };

const refuse = (code: Refusal['code'], reason: string): Decoded => ({ refusal: { code, reason } });

/** Issues beyond these add nothing a person would read. */
const maxIssuesNamed = 5;

export function decode(kind: DeviceKind, payload: Buffer, deviceName: string): Decoded {
  if (payload.length > maxMessageBytes) {
    return refuse(
      'too-large',
      `The message has ${payload.length} bytes; at most ${maxMessageBytes} are accepted.`,
    );
  }
  if (!isUtf8(payload)) return refuse('not-json', 'The message is not UTF-8 text.');
  let value: unknown;
  try {
    value = JSON.parse(payload.toString('utf8'));
  } catch (error) {
    return refuse('not-json', `The message is not JSON: ${(error as Error).message}`);
  }
  if (typeof value !== 'object' || value === null || Array.isArray(value)) {
    return refuse('schema-invalid', 'The message is not a JSON object.');
  }
  const { v } = value as { v?: unknown };
  if (v !== payloadVersion) {
    const found = v === undefined ? 'carries no version' : `is of version ${JSON.stringify(v).slice(0, 40)}`;
    return refuse('version-unknown', `The message ${found}; this server reads version ${payloadVersion}.`);
  }
  return decodeVersion1(kind, value, deviceName);
}

function decodeVersion1(kind: DeviceKind, value: object, deviceName: string): Decoded {
  try {
    switch (kind) {
      case 'readings':
      case 'late': {
        const isBuffered = kind === 'late';
        const plain = decodePlainReadings(value, isBuffered);
        if (plain) return { content: plain };
        return checked(readingsMessage, value, (message) => readingsContent(message, isBuffered));
      }
      case 'birth': {
        const decoded = checked(birthMessage, value, (birth) => ({ kind: 'birth', birth }));
        if (
          'content' in decoded &&
          decoded.content.kind === 'birth' &&
          decoded.content.birth.device !== deviceName
        ) {
          const claimed = decoded.content.birth.device;
          return refuse('device-wrong', `${deviceName} sent a birth that calls itself ${claimed}.`);
        }
        return decoded;
      }
      case 'state':
        return checked(stateMessage, value, (state) => ({ kind: 'state', state }));
      case 'event':
        return checked(eventMessage, value, (event) => ({
          kind: 'event',
          event,
          atMs: Date.parse(event.at),
        }));
      case 'reply':
        return checked(replyMessage, value, (reply) => ({ kind: 'reply', reply }));
    }
  } catch (error) {
    // Nesting that JSON.parse survives can still exhaust the stack of what comes after it.
    return refuse('schema-invalid', `The message cannot be read: ${(error as Error).message}`);
  }
}

function checked<T>(schema: z.ZodType<T>, value: object, toContent: (message: T) => Content): Decoded {
  const result = schema.safeParse(value);
  if (result.success) return { content: toContent(result.data) };
  const { issues } = result.error;
  const named = issues
    .slice(0, maxIssuesNamed)
    .map((issue) => `${issue.path.join('.') || 'message'}: ${issue.message}`);
  const more = issues.length > maxIssuesNamed ? ` (and ${issues.length - maxIssuesNamed} more)` : '';
  return refuse('schema-invalid', `${named.join('; ')}${more}`);
}

const knownMessageKeys = new Set(Object.keys(readingsMessage.shape));
const knownReadingKeys = new Set(Object.keys(readingsMessage.shape.readings.element.shape));

/** Null-prototype, so that a field called `__proto__` stays a field. */
function unknownFields(fields: object, known: ReadonlySet<string>): Record<string, unknown> | null {
  const found: Record<string, unknown> = Object.create(null) as Record<string, unknown>;
  let isAny = false;
  for (const [key, value] of Object.entries(fields)) {
    if (known.has(key)) continue;
    found[key] = value;
    isAny = true;
  }
  return isAny ? found : null;
}

/** Fields of the message that nobody knows are kept once, with its first reading, under `message`. */
function readingsContent(message: ReadingsMessage, isBuffered: boolean): ReadingsContent {
  const ofMessage = unknownFields(message, knownMessageKeys);
  return {
    kind: 'readings',
    isBuffered,
    boot: message.boot,
    sentMs: Date.parse(message.sent),
    clockSource: message.clock?.source ?? null,
    settingsHash: message.settings ?? null,
    readings: message.readings.map((reading, index) => toIncoming(reading, index === 0 ? ofMessage : null)),
  };
}

function toIncoming(reading: MqttReading, ofMessage: Record<string, unknown> | null): IncomingReading {
  const own = unknownFields(reading, knownReadingKeys);
  const extra = ofMessage ? { ...own, message: ofMessage } : own;
  return {
    n: reading.n,
    atMs: Date.parse(reading.at),
    context: reading.context,
    conductivityUsCm: reading.conductivity_us_cm,
    temperatureC: reading.temperature_c,
    conductanceUs: reading.conductance_us ?? null,
    solution: reading.solution ?? null,
    quality: reading.quality,
    flags: reading.flags,
    extraJson: extra ? JSON.stringify(extra) : null,
  };
}
