/** How far a device's clock is from ours: the median over its last fifty messages of received minus sent. */

const windowLength = 50;

export class ClockOffset {
  private readonly samples: number[] = [];
  private next = 0;

  /** `sentMs` is the device's own time at sending; messages sent again after an outage carry a new one. */
  add(receivedAtMs: number, sentMs: number): void {
    this.samples[this.next] = receivedAtMs - sentMs;
    this.next = (this.next + 1) % windowLength;
  }

  /** Positive: the device is behind (or slow to reach us). A median, because one message held up says nothing. */
  medianMs(): number {
    const sorted = this.samples.toSorted((a, b) => a - b);
    const middle = sorted.length >> 1;
    const upper = sorted[middle] ?? 0;
    return sorted.length % 2 === 1 ? upper : ((sorted[middle - 1] ?? 0) + upper) / 2;
  }
}
