const MINUTE_MS = 60_000;
const HOUR_MS = 60 * MINUTE_MS;
/** The newest part of the history is dense, so that charts of a day look like a live plant. */
const DENSE_MS = 48 * HOUR_MS;

/** The moments at which a probe was read, oldest first; the sequence number of a reading follows from its place. */
export interface ReadingGrid {
  from: number;
  times: number[];
  /** How many grid readings lie at or before a moment. */
  countUpTo: (at: number) => number;
}

/** Hourly up to two days before the end of the history, every minute from there. */
export function makeReadingGrid(from: number, until: number, endAt: number): ReadingGrid {
  const denseFrom = endAt - DENSE_MS;
  const times: number[] = [];
  for (let at = Math.ceil(from / HOUR_MS) * HOUR_MS; at < Math.min(until, denseFrom); at += HOUR_MS)
    times.push(at);
  const firstDense = Math.ceil(Math.max(denseFrom, from) / MINUTE_MS) * MINUTE_MS;
  for (let at = firstDense; at < until; at += MINUTE_MS) times.push(at);
  return { from, times, countUpTo: (at) => countUpTo(times, at) };
}

function countUpTo(times: number[], at: number): number {
  let low = 0;
  let high = times.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (times[middle]! <= at) low = middle + 1;
    else high = middle;
  }
  return low;
}
