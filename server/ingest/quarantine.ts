/** What cannot be used is kept with its reason and the raw message, for an administrator to read. */
import { maxMessageBytes } from '../../shared/contracts/mqtt.ts';
import type { Arrival, Envelope, Refusal } from './message.ts';

export interface QuarantineRow {
  deviceName: string | null;
  clientId: string | null;
  topic: string;
  code: Refusal['code'];
  reason: string;
  payload: Buffer;
  payloadBytes: number;
  receivedAtMs: number;
}

/** The database holds neither a zero character nor half of a surrogate pair; both would have quarantine refused too. */
const storable = (text: string, maxLength: number): string =>
  Buffer.from(text.replaceAll('\u0000', '\ufffd').slice(0, maxLength)).toString('utf8');

const rowFor = (envelope: Envelope, { code, reason }: Refusal): QuarantineRow => ({
  deviceName: envelope.deviceName === null ? null : storable(envelope.deviceName, 200),
  clientId: envelope.clientId === null ? null : storable(envelope.clientId, 200),
  topic: storable(envelope.topic, 1000),
  code,
  reason: storable(reason, 4000),
  payload: envelope.payload.subarray(0, maxMessageBytes),
  payloadBytes: envelope.payload.length,
  receivedAtMs: envelope.receivedAtMs,
});

export const quarantineRows = (arrival: Arrival): QuarantineRow[] =>
  arrival.refusals.map((refusal) => rowFor(arrival.envelope, refusal));

/** The arrival as it is committed after the database has refused it: nothing of it is used, the reason is the database's. */
export function setAside(arrival: Arrival, error: unknown): Arrival | null {
  const isAsideAlready = arrival.content === null;
  if (isAsideAlready) return null;
  const words = error instanceof Error ? error.message : String(error);
  const refusal: Refusal = { code: 'schema-invalid', reason: `The database refused this message: ${words}.` };
  return { envelope: arrival.envelope, content: null, refusals: [refusal] };
}
