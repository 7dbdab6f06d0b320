/**
 * The MQTT wire, version 1: what devices publish under `saltmark/1/{device}/…` and what the server
 * answers. Unknown fields are kept raw and ignored. Numbers are JSON numbers in the unit named.
 */
import { z } from 'zod';
import {
  deviceCompensations,
  probeKinds,
  readingContexts,
  readingFlags,
  readingQualities,
} from './vocabulary.ts';

export const payloadVersion = 1;
/** Larger messages are refused and quarantined. */
export const maxMessageBytes = 64 * 1024;
export const maxReadingsPerMessage = 60;
/** Older than this on arrival: stored and marked late, never a live alarm. */
export const lateAfterMs = 15 * 60 * 1000;
/** Further in the future than this: quarantined. */
export const futureAfterMs = 2 * 60 * 1000;

export const deviceName = z
  .string()
  .regex(/^[a-z0-9][a-z0-9-]{3,39}$/, 'Use 4 to 40 lower-case letters, digits and hyphens.');

/** Boot ids are time-ordered text (for instance ULID prefixes) and are compared as text. */
export const bootId = z
  .string()
  .min(4)
  .max(40)
  .regex(/^[0-9A-Za-z]+$/);
export const settingsHash = z.string().min(8).max(80);
const sequence = z.number().int().min(0).max(Number.MAX_SAFE_INTEGER);
const instant = z.iso.datetime({ offset: true });

export const topicKinds = ['birth', 'state', 'readings', 'late', 'event', 'command', 'reply'] as const;
export type TopicKind = (typeof topicKinds)[number];
export const topicOf = (device: string, kind: TopicKind): string => `saltmark/1/${device}/${kind}`;
const topicPattern = /^saltmark\/1\/([^/]+)\/(birth|state|readings|late|event|command|reply)$/;
/** Splits a topic of ours; null when it is not one. */
export function parseTopic(topic: string): { device: string; kind: TopicKind } | null {
  const match = topicPattern.exec(topic);
  return match ? { device: match[1]!, kind: match[2] as TopicKind } : null;
}

export const reading = z.looseObject({
  n: sequence,
  at: instant,
  context: z.enum(readingContexts),
  /** Raw: uncompensated, at `temperature_c`, with the cell constant the device has in use. */
  conductivity_us_cm: z.number().min(0).max(5_000_000).nullable(),
  temperature_c: z.number().min(-50).max(300).nullable(),
  conductance_us: z.number().min(0).max(50_000_000).nullish(),
  /** Code of the lot in the cell, with context check or calibration. */
  solution: z.string().max(80).nullish(),
  quality: z.enum(readingQualities),
  flags: z.array(z.enum(readingFlags)).max(readingFlags.length).default([]),
});
export type MqttReading = z.infer<typeof reading>;

export const readingsMessage = z.looseObject({
  v: z.literal(payloadVersion),
  boot: bootId,
  sent: instant,
  clock: z.looseObject({ source: z.string().max(20), offset_ms: z.number() }).optional(),
  settings: settingsHash.optional(),
  readings: z.array(reading).min(1).max(maxReadingsPerMessage),
});
export type ReadingsMessage = z.infer<typeof readingsMessage>;

export const birthMessage = z.looseObject({
  v: z.literal(payloadVersion),
  boot: bootId,
  sent: instant.optional(),
  device: deviceName,
  serial: z.string().min(1).max(60),
  kind: z.enum(probeKinds),
  firmware: z.string().max(60),
  cell_constant_per_cm: z.number().positive().max(1000),
  compensation: z.looseObject({
    model: z.enum(deviceCompensations),
    coefficient_percent_per_k: z.number().min(-5).max(20).nullish(),
    reference_c: z.number().min(0).max(100).nullish(),
  }),
  range_low_us_cm: z.number().min(0),
  range_high_us_cm: z.number().positive(),
  resolution_us_cm: z.number().min(0).nullish(),
  interval_s: z.number().positive().max(86_400),
  settings: settingsHash,
  clock: z.looseObject({ source: z.string().max(20), offset_ms: z.number().optional() }).optional(),
});
export type BirthMessage = z.infer<typeof birthMessage>;

export const stateMessage = z.looseObject({
  v: z.literal(payloadVersion),
  boot: bootId,
  online: z.boolean(),
  why: z.enum(['start', 'planned', 'lost']),
});
export type StateMessage = z.infer<typeof stateMessage>;

export const eventMessage = z.looseObject({
  v: z.literal(payloadVersion),
  boot: bootId,
  at: instant,
  kind: z.enum(['fault', 'context', 'settings']),
  text: z.string().max(500).optional(),
  settings: settingsHash.optional(),
});
export type EventMessage = z.infer<typeof eventMessage>;

export const commandMessage = z.discriminatedUnion('do', [
  z.object({ v: z.literal(payloadVersion), id: z.string().max(64), do: z.literal('birth') }),
  z.object({
    v: z.literal(payloadVersion),
    id: z.string().max(64),
    do: z.literal('resend'),
    boot: bootId,
    from_n: sequence,
    to_n: sequence,
  }),
  z.object({
    v: z.literal(payloadVersion),
    id: z.string().max(64),
    do: z.literal('apply-cell-constant'),
    cell_constant_per_cm: z.number().positive().max(1000),
  }),
]);
export type CommandMessage = z.infer<typeof commandMessage>;

export const replyMessage = z.looseObject({
  v: z.literal(payloadVersion),
  id: z.string().max(64),
  boot: bootId,
  done: z.boolean(),
  text: z.string().max(500).optional(),
});
export type ReplyMessage = z.infer<typeof replyMessage>;
