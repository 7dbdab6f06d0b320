/** The one door into the pipeline: a publish goes in, and the promise resolves when it is durable. */
import { splitByTime, judgeAge } from './time-rules.ts';
import type { Logger } from '../lib/logger.ts';
import { isRefusal } from './database-errors.ts';
import { decode } from './decode.ts';
import { GroupCommit } from './group-commit.ts';
import type { Arrival, Content, Envelope, Refusal } from './message.ts';
import { messagesWaiting } from './metrics.ts';
import { setAside } from './quarantine.ts';
import type { Store } from './store.ts';
import type { DeviceKind } from './topic-rules.ts';

export interface Intake {
  /** Resolves when the message, or its place in quarantine, is committed. Rejects with NotTakenError when the sender must keep it. */
  take: (envelope: Envelope, kind: DeviceKind) => Promise<void>;
  /** A message on a topic that its sender may not use: to quarantine unread. */
  refuse: (envelope: Envelope, refusal: Refusal) => Promise<void>;
  isHolding: () => boolean;
  isCrowded: () => boolean;
  waiting: () => { items: number; bytes: number };
  stop: () => Promise<void>;
}

/** What a waiting message costs beside its payload: promise, envelope, decoded readings. */
const overheadBytes = 1024;
/** One line for the first, then one for every so many: a night without database must not fill the disk with log. */
const holdLinesEvery = 12;

export function createIntake(
  store: Store,
  log: Logger,
  limits: { maxGroupWeight?: number; maxWaitingBytes?: number } = {},
): Intake {
  const group: GroupCommit<Arrival> = new GroupCommit({
    ...limits,
    commit: async (arrivals) => {
      await store.commit(arrivals);
      messagesWaiting.set(group.waiting().items);
    },
    isRefusal,
    setAside: (arrival, error) => {
      const aside = setAside(arrival, error);
      const { topic, payload } = arrival.envelope;
      if (aside) log.warn({ err: error, topic }, 'the database refused a message; it goes to quarantine');
      // Last resort of "never thrown away": the log keeps what even quarantine would not.
      else
        log.error({ err: error, topic, payload: payload.toString('base64') }, 'quarantine refused a message');
      return aside;
    },
    weigh: ({ content }) => (content?.kind === 'readings' ? content.readings.length : 1),
    bytesOf: ({ envelope }) => envelope.payload.length + overheadBytes,
    onHold: (error, attempt) => {
      if (attempt % holdLinesEvery === 0)
        log.error({ err: error, attempt }, 'the database does not take readings; holding');
    },
  });
  return {
    take: (envelope, kind) => group.add(toArrival(envelope, kind)),
    refuse: (envelope, refusal) => group.add({ envelope, content: null, refusals: [refusal] }),
    isHolding: () => group.isHolding(),
    isCrowded: () => group.isCrowded(),
    waiting: () => group.waiting(),
    stop: () => group.stop(),
  };
}

function toArrival(envelope: Envelope, kind: DeviceKind): Arrival {
  const decoded = decode(kind, envelope.payload, envelope.deviceName ?? '');
  if ('refusal' in decoded) return { envelope, content: null, refusals: [decoded.refusal] };
  return { envelope, ...keepInTime(decoded.content, envelope.receivedAtMs) };
}

function keepInTime(content: Content, receivedAtMs: number): Pick<Arrival, 'content' | 'refusals'> {
  if (content.kind === 'readings') {
    const { kept, refusals } = splitByTime(content.readings, receivedAtMs);
    if (refusals.length === 0) return { content, refusals };
    return { content: kept.length > 0 ? { ...content, readings: kept } : null, refusals };
  }
  if (content.kind === 'event') {
    const verdict = judgeAge(content.atMs, receivedAtMs);
    if (verdict === 'time-in-future' || verdict === 'time-too-old') {
      return {
        content: null,
        refusals: [{ code: verdict, reason: `The event is dated ${content.event.at}.` }],
      };
    }
  }
  return { content, refusals: [] };
}
