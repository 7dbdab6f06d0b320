/**
 * Commits what arrives in groups, one group at a time, and answers each item only when its group is durable.
 *
 * Self-clocked: the next group is whatever has come while the last one was being committed. A timer would add its
 * own delay at low rates and save nothing at high ones (measured at 2 000 messages a second: p50 0.97 ms without
 * a timer, 8.2 ms with one of 10 ms). One lane: a second one pays only above 100 000 rows a second and loses order.
 *
 * Bounded: what waits is what devices have sent without an acknowledgement, and the transport stops reading a device
 * whose publishes are held. `maxWaitingBytes` bounds the sum over all devices; beyond it an item is turned away
 * unacknowledged, and its device sends it again later.
 */

export interface GroupCommitOptions<T> {
  /** Makes all of them durable, or throws and leaves no trace. */
  commit: (items: readonly T[]) => Promise<void>;
  /** True when the database refuses what one of the items holds; false when the database itself is in trouble. */
  isRefusal: (error: unknown) => boolean;
  /** What to commit in the place of an item that the database refused; null when nothing is left to try. */
  setAside: (item: T, error: unknown) => T | null;
  /** Readings and rows in an item, at least 1. */
  weigh: (item: T) => number;
  bytesOf: (item: T) => number;
  onHold: (error: unknown, attempt: number) => void;
  maxGroupWeight?: number;
  maxWaitingBytes?: number;
}

/** The item was turned away or given up unacknowledged: whoever sent it still has it. */
export class NotTakenError extends Error {
  override readonly name = 'NotTakenError';
}

export interface GroupCommit<T> {
  /** Resolves when the item is durable; rejects with NotTakenError when it was not taken. */
  add: (item: T) => Promise<void>;
  /** True while the database does not take what is offered. */
  isHolding: () => boolean;
  /** True when so much waits that new senders should come later. */
  isCrowded: () => boolean;
  waiting: () => { items: number; bytes: number };
  /** Commits what waits, then takes nothing more. While the database is down, gives up what waits. */
  stop: () => Promise<void>;
}

interface Waiting<T> {
  item: T;
  bytes: number;
  resolve: () => void;
  reject: (error: Error) => void;
}

/** Longest statement kept near 20 ms, so that a publish never waits for more than two of them. */
const defaultGroupWeight = 2000;
const defaultWaitingBytes = 64 * 1024 * 1024;
const firstRetryMs = 100;
const lastRetryMs = 5000;

export function createGroupCommit<T>(options: GroupCommitOptions<T>): GroupCommit<T> {
  const { maxGroupWeight = defaultGroupWeight, maxWaitingBytes = defaultWaitingBytes } = options;
  let queue: Waiting<T>[] = [];
  let bytes = 0;
  let lane: Promise<void> | null = null;
  let isHolding = false;
  let isStopping = false;
  let endPause: (() => void) | null = null;

  const takeGroup = (): Waiting<T>[] => {
    let weight = 0;
    let count = 0;
    for (const { item } of queue) {
      weight += options.weigh(item);
      if (count > 0 && weight > maxGroupWeight) break;
      count += 1;
    }
    const group = queue.slice(0, count);
    queue = queue.slice(count);
    return group;
  };

  const pause = (ms: number): Promise<void> =>
    new Promise((resolve) => {
      const timer = setTimeout(resolve, ms);
      endPause = () => {
        clearTimeout(timer);
        resolve();
      };
    });

  /** Repeats until the database has taken the items or refused what they hold. */
  const commitHolding = async (items: readonly T[]): Promise<void> => {
    for (let attempt = 0; ; attempt += 1) {
      try {
        await options.commit(items);
        isHolding = false;
        return;
      } catch (error) {
        if (options.isRefusal(error)) throw error;
        if (isStopping) throw new NotTakenError('The database does not answer and the server is stopping.');
        isHolding = true;
        options.onHold(error, attempt);
        await pause(Math.min(lastRetryMs, firstRetryMs * 2 ** attempt));
      }
    }
  };

  /** Halves a refused group until the refused item stands alone, so that it stops nobody else. */
  const commitAll = async (items: readonly T[]): Promise<void> => {
    try {
      await commitHolding(items);
    } catch (error) {
      if (error instanceof NotTakenError) throw error;
      const [first] = items;
      if (first === undefined) return;
      if (items.length > 1) {
        const middle = items.length >> 1;
        await commitAll(items.slice(0, middle));
        await commitAll(items.slice(middle));
        return;
      }
      const aside = options.setAside(first, error);
      if (aside !== null) await commitAll([aside]);
    }
  };

  const run = async (): Promise<void> => {
    while (queue.length > 0) {
      const group = takeGroup();
      let failure: Error | null = null;
      try {
        await commitAll(group.map(({ item }) => item));
      } catch (error) {
        failure = error as Error;
      }
      for (const waiting of group) {
        bytes -= waiting.bytes;
        if (failure) waiting.reject(failure);
        else waiting.resolve();
      }
    }
    lane = null;
  };

  // Once per turn of the event loop: everything that one round of socket reads brings shares the first group.
  const startLane = (): void => {
    lane ??= new Promise((resolve) => setImmediate(() => void run().then(resolve)));
  };

  return {
    add: (item) =>
      new Promise((resolve, reject) => {
        const size = options.bytesOf(item);
        if (isStopping) return reject(new NotTakenError('The server is stopping.'));
        if (bytes + size > maxWaitingBytes) {
          return reject(new NotTakenError('Too much is waiting for the database.'));
        }
        bytes += size;
        queue.push({ item, bytes: size, resolve, reject });
        startLane();
      }),
    isHolding: () => isHolding,
    // Half full: room is left for those who are connected already.
    isCrowded: () => bytes > maxWaitingBytes / 2,
    waiting: () => ({ items: queue.length, bytes }),
    stop: async () => {
      isStopping = true;
      endPause?.();
      while (lane) await lane;
    },
  };
}
