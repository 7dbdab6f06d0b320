/** Time is asked for, never taken: tests move it. */
export interface Clock {
  now(): Date;
}

export const systemClock: Clock = { now: () => new Date() };

export class SettableClock implements Clock {
  private time: number;
  constructor(start: Date | string) {
    this.time = new Date(start).getTime();
  }
  now(): Date {
    return new Date(this.time);
  }
  set(to: Date | string): void {
    this.time = new Date(to).getTime();
  }
  advance(milliseconds: number): void {
    this.time += milliseconds;
  }
}
