import type { Deed, QueuedDeed } from './deeds.ts';

/** Where deeds lie until they are sent. IndexedDB in the browser; anything that keeps its order in a test. */
export interface DeedStore {
  all: () => Promise<QueuedDeed[]>;
  /** Gives it its place at the end. */
  add: (entry: Omit<QueuedDeed, 'order'>) => Promise<QueuedDeed>;
  replace: (entry: QueuedDeed) => Promise<void>;
  remove: (order: number) => Promise<void>;
}

/** How one attempt to send ended. */
export type SendOutcome =
  | { kind: 'accepted' }
  | { kind: 'refused'; code: string; reason: string }
  /** No network, or a server in trouble: worth another try, with growing pauses. */
  | { kind: 'unreachable' }
  /** The session has ended: the deeds wait for their person. */
  | { kind: 'signed-out' };

export interface DeedQueueOptions {
  store: DeedStore;
  send: (deed: Deed) => Promise<SendOutcome>;
  now: () => string;
  /** Calls back later; returns the way to call it off. */
  later: (callback: () => void, delayMs: number) => () => void;
}

export interface QueueSnapshot {
  entries: readonly QueuedDeed[];
  /** Becomes true when what lay on the phone has been read. */
  isRead: boolean;
  isSignedOut: boolean;
  /** When the last deed was accepted, on this phone, since the page was opened. */
  lastSentAt: string | null;
}

export interface DeedQueue {
  snapshot: () => QueueSnapshot;
  subscribe: (listener: () => void) => () => void;
  /** Resolves when the deed lies safely on the phone; sending follows. */
  add: (deed: Deed) => Promise<void>;
  /** Reads what lies on the phone and sends it under this person's session; ends with the way to stop. */
  start: (userId: number) => () => void;
  /** The network is back, or may be: try now. */
  wake: () => void;
  /** Puts the refused deeds of a run back into the line, in their old order. */
  sendAgain: (calibrationId: number) => Promise<void>;
  /** Takes a refused deed off this phone, after the person has dealt with it. */
  setAside: (order: number) => Promise<void>;
}

const FIRST_PAUSE_MS = 1000;
const LONGEST_PAUSE_MS = 60_000;

/** One line for all runs of a person: sent in order, one at a time, each until the server has answered. */
export function createDeedQueue({ store, send, now, later }: DeedQueueOptions): DeedQueue {
  const listeners = new Set<() => void>();
  let state: QueueSnapshot = { entries: [], isRead: false, isSignedOut: false, lastSentAt: null };
  let person: number | null = null;
  let isSending = false;
  let pauseMs = FIRST_PAUSE_MS;
  let callOff: (() => void) | null = null;
  /** A deed added while the store is read would be missing from what was read. */
  let reading: Promise<void> = Promise.resolve();

  const tell = (change: Partial<QueueSnapshot>): void => {
    state = { ...state, ...change };
    for (const listener of listeners) listener();
  };
  const withEntry = (entry: QueuedDeed) =>
    [...state.entries.filter((one) => one.order !== entry.order), entry].sort((a, b) => a.order - b.order);
  const nextEntry = () => state.entries.find((entry) => entry.refusal === null && entry.userId === person);

  const pause = (): void => {
    callOff?.();
    callOff = later(() => void work(), pauseMs);
    pauseMs = Math.min(LONGEST_PAUSE_MS, pauseMs * 2);
  };

  /** Settles one attempt that reached the server. */
  const settle = async (
    entry: QueuedDeed,
    outcome: Exclude<SendOutcome, { kind: 'unreachable' | 'signed-out' }>,
  ): Promise<void> => {
    pauseMs = FIRST_PAUSE_MS;
    if (outcome.kind === 'accepted') {
      await store.remove(entry.order);
      const entries = state.entries.filter((one) => one.order !== entry.order);
      return tell({ entries, isSignedOut: false, lastSentAt: now() });
    }
    const refused = { ...entry, refusal: { code: outcome.code, reason: outcome.reason, at: now() } };
    await store.replace(refused);
    tell({ entries: withEntry(refused), isSignedOut: false });
  };

  /** Sends until nothing waits or an attempt fails; says how it ended. */
  const sendAll = async (): Promise<'done' | 'unreachable' | 'signed-out'> => {
    for (let entry = nextEntry(); entry; entry = nextEntry()) {
      const outcome = await send(entry.deed);
      if (outcome.kind === 'unreachable' || outcome.kind === 'signed-out') return outcome.kind;
      await settle(entry, outcome);
    }
    return 'done';
  };

  const work = async (): Promise<void> => {
    if (isSending || person === null) return;
    isSending = true;
    callOff?.();
    callOff = null;
    let end: Awaited<ReturnType<typeof sendAll>> = 'unreachable';
    try {
      end = await sendAll();
    } finally {
      isSending = false;
    }
    // One that was added just as the last round ended.
    if (end === 'done' && nextEntry()) return work();
    if (end === 'unreachable') pause();
    if (end === 'signed-out') tell({ isSignedOut: true });
  };

  return {
    snapshot: () => state,
    subscribe: (listener) => {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
    add: async (deed) => {
      const owner = person;
      if (owner === null) throw new Error('Nobody is signed in, so nothing can be captured.');
      await reading;
      const entry = await store.add({ userId: owner, deed, refusal: null });
      tell({ entries: withEntry(entry) });
      void work();
    },
    start: (userId) => {
      person = userId;
      reading = store.all().then((entries) => {
        tell({ entries: [...entries].sort((a, b) => a.order - b.order), isRead: true, isSignedOut: false });
      });
      void reading.then(work);
      return () => {
        person = null;
        callOff?.();
        callOff = null;
      };
    },
    wake: () => {
      pauseMs = FIRST_PAUSE_MS;
      void work();
    },
    sendAgain: async (calibrationId) => {
      for (const entry of state.entries) {
        if (entry.refusal === null || entry.deed.calibrationId !== calibrationId) continue;
        const again = { ...entry, refusal: null };
        await store.replace(again);
        tell({ entries: withEntry(again) });
      }
      await work();
    },
    setAside: async (order) => {
      await store.remove(order);
      tell({ entries: state.entries.filter((entry) => entry.order !== order) });
    },
  };
}
