/**
 * One real timer for the whole fleet. Thousands of probes, their keep-alives and their check intervals are entries in
 * a list that a single interval walks through.
 */
export type Wall = () => number;

interface Entry {
  due: number;
  everyMs: number;
  run: (now: number) => void;
}

export class Ticker {
  private readonly entries = new Map<number, Entry>();
  private nextId = 1;
  private timer: NodeJS.Timeout | null = null;
  private readonly wall: Wall;
  private readonly resolutionMs: number;

  constructor(wall: Wall = Date.now, resolutionMs = 25) {
    this.wall = wall;
    this.resolutionMs = resolutionMs;
  }

  start(): void {
    this.timer ??= setInterval(() => this.tick(this.wall()), this.resolutionMs);
  }

  stop(): void {
    if (this.timer) clearInterval(this.timer);
    this.timer = null;
    this.entries.clear();
  }

  /** Runs `run` every `everyMs`, first after `firstMs`. Returns the id that `cancel` takes. */
  every(everyMs: number, run: (now: number) => void, firstMs: number = everyMs): number {
    const id = this.nextId;
    this.nextId += 1;
    this.entries.set(id, { due: this.wall() + firstMs, everyMs, run });
    return id;
  }

  once(afterMs: number, run: (now: number) => void): number {
    const id = this.every(
      afterMs,
      (now) => {
        this.cancel(id);
        run(now);
      },
      afterMs,
    );
    return id;
  }

  cancel(id: number): void {
    this.entries.delete(id);
  }

  /** Runs what is due. A process that was held up runs each entry once, not once for every tick it missed. */
  tick(now: number): void {
    for (const entry of this.entries.values()) {
      if (entry.due > now) continue;
      const missed = Math.floor((now - entry.due) / entry.everyMs);
      entry.due += (missed + 1) * entry.everyMs;
      entry.run(now);
    }
  }

  get size(): number {
    return this.entries.size;
  }
}
