/** What travels through the pipeline, from the broker's hook to the committed row. */
import type { BirthMessage, EventMessage, ReplyMessage, StateMessage } from '../../shared/contracts/mqtt.ts';
import type {
  QuarantineCode,
  ReadingContext,
  ReadingFlag,
  ReadingQuality,
} from '../../shared/contracts/vocabulary.ts';

/** A publish as it arrived. */
export interface Envelope {
  topic: string;
  payload: Buffer;
  /** The name the device signed in with; with an outside broker, the one in the topic. */
  deviceName: string | null;
  clientId: string | null;
  receivedAtMs: number;
}

export interface IncomingReading {
  n: number;
  atMs: number;
  context: ReadingContext;
  conductivityUsCm: number | null;
  temperatureC: number | null;
  conductanceUs: number | null;
  solution: string | null;
  quality: ReadingQuality;
  flags: readonly ReadingFlag[];
  /** Fields this version does not know, as JSON text; kept, never read. */
  extraJson: string | null;
}

export interface ReadingsContent {
  kind: 'readings';
  /** Came on the `late` topic: stored, never live, however young. */
  isBuffered: boolean;
  boot: string;
  sentMs: number;
  clockSource: string | null;
  settingsHash: string | null;
  readings: IncomingReading[];
}

export type Content =
  | ReadingsContent
  | { kind: 'birth'; birth: BirthMessage }
  | { kind: 'state'; state: StateMessage }
  | { kind: 'event'; event: EventMessage; atMs: number }
  | { kind: 'reply'; reply: ReplyMessage };

/** Why a message, or a part of it, cannot be used. */
export interface Refusal {
  code: QuarantineCode;
  reason: string;
}

/** One publish on its way to the database: what can be used of it, and what has to go to quarantine. */
export interface Arrival {
  envelope: Envelope;
  content: Content | null;
  refusals: Refusal[];
}
