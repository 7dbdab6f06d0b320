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

export class GroupCommit<T> {
  private readonly options: GroupCommitOptions<T>;
  private readonly maxWeight: number;
  private readonly maxBytes: number;
  private queue: Waiting<T>[] = [];
  private bytes = 0;
  private lane: Promise<void> | null = null;
  private isTroubled = false;
  private isStopping = false;
  private endPause: (() => void) | null = null;

  constructor(options: GroupCommitOptions<T>) {
    this.options = options;
    this.maxWeight = options.maxGroupWeight ?? defaultGroupWeight;
    this.maxBytes = options.maxWaitingBytes ?? defaultWaitingBytes;
  }

  /** Resolves when the item is durable; rejects with NotTakenError when it was not taken. */
  add(item: T): Promise<void> {
    return new Promise((resolve, reject) => {
      const bytes = this.options.bytesOf(item);
      if (this.isStopping) return reject(new NotTakenError('The server is stopping.'));
      if (this.bytes + bytes > this.maxBytes) {
        return reject(new NotTakenError('Too much is waiting for the database.'));
      }
      this.bytes += bytes;
      this.queue.push({ item, bytes, resolve, reject });
      this.startLane();
    });
  }

  /** True while the database does not take what is offered. */
  isHolding(): boolean {
    return this.isTroubled;
  }

  /** True when so much waits that new senders should come later: half, so that those who are in have room. */
  isCrowded(): boolean {
    return this.bytes > this.maxBytes / 2;
  }

  waiting(): { items: number; bytes: number } {
    return { items: this.queue.length, bytes: this.bytes };
  }

  /** Commits what waits, then takes nothing more. While the database is down, gives up what waits. */
  async stop(): Promise<void> {
    this.isStopping = true;
    this.endPause?.();
    while (this.lane) await this.lane;
  }

  // Once per turn of the event loop: everything that one round of socket reads brings shares the first group.
  private startLane(): void {
    this.lane ??= new Promise((resolve) => setImmediate(() => void this.run().then(resolve)));
  }

  private async run(): Promise<void> {
    while (this.queue.length > 0) {
      const group = this.takeGroup();
      let failure: Error | null = null;
      try {
        await this.commitAll(group.map(({ item }) => item));
      } catch (error) {
        failure = error as Error;
      }
      for (const waiting of group) {
        this.bytes -= waiting.bytes;
        if (failure) waiting.reject(failure);
        else waiting.resolve();
      }
    }
    this.lane = null;
  }

  private takeGroup(): Waiting<T>[] {
    let weight = 0;
    let count = 0;
    for (const { item } of this.queue) {
      weight += this.options.weigh(item);
      if (count > 0 && weight > this.maxWeight) break;
      count += 1;
    }
    const group = this.queue.slice(0, count);
    this.queue = this.queue.slice(count);
    return group;
  }

  /** Halves a refused group until the refused item stands alone, so that it stops nobody else. */
  private async commitAll(items: readonly T[]): Promise<void> {
    try {
      await this.commitHolding(items);
    } catch (error) {
      if (error instanceof NotTakenError) throw error;
      const [first] = items;
      if (first === undefined) return;
      if (items.length > 1) {
        const middle = items.length >> 1;
        await this.commitAll(items.slice(0, middle));
        await this.commitAll(items.slice(middle));
        return;
      }
      const aside = this.options.setAside(first, error);
      if (aside !== null) await this.commitAll([aside]);
    }
  }

  /** Repeats until the database has taken the items or refused what they hold. */
  private async commitHolding(items: readonly T[]): Promise<void> {
    for (let attempt = 0; ; attempt += 1) {
      try {
        await this.options.commit(items);
        this.isTroubled = false;
        return;
      } catch (error) {
        if (this.options.isRefusal(error)) throw error;
        if (this.isStopping) {
          throw new NotTakenError('The database does not answer and the server is stopping.');
        }
        this.isTroubled = true;
        this.options.onHold(error, attempt);
        await this.pause(Math.min(lastRetryMs, firstRetryMs * 2 ** attempt));
      }
    }
  }

  private pause(ms: number): Promise<void> {
    return new Promise((resolve) => {
      const timer = setTimeout(resolve, ms);
      this.endPause = () => {
        clearTimeout(timer);
        resolve();
      };
    });
  }
}
