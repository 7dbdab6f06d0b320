/** Numbers of a run, and the table they are printed in. */

export interface Latencies {
  count: number;
  p50Ms: number;
  p99Ms: number;
  maxMs: number;
}

export function summarise(samplesMs: readonly number[]): Latencies {
  const sorted = Float64Array.from(samplesMs).sort();
  const at = (share: number): number =>
    sorted[Math.min(sorted.length - 1, Math.floor(share * sorted.length))] ?? NaN;
  return { count: sorted.length, p50Ms: at(0.5), p99Ms: at(0.99), maxMs: sorted.at(-1) ?? NaN };
}

export interface Row {
  what: string;
  perSecond: number | null;
  latencies: Latencies | null;
  /** Of the server, for each reading. */
  coreUs: number | null;
  note: string;
}

const rate = (value: number | null): string =>
  value === null ? '–' : Math.round(value).toLocaleString('en-GB');
const ms = (value: number | undefined): string =>
  value === undefined ? '–' : value.toFixed(value < 10 ? 2 : 1);

export function printTable(rows: readonly Row[]): void {
  const head = ['what', 'per second', 'p50 ms', 'p99 ms', 'max ms', 'core µs', 'note'];
  const cells = rows.map((row) => [
    row.what,
    rate(row.perSecond),
    ms(row.latencies?.p50Ms),
    ms(row.latencies?.p99Ms),
    ms(row.latencies?.maxMs),
    row.coreUs === null ? '–' : row.coreUs.toFixed(0),
    row.note,
  ]);
  const widths = head.map((title, i) => Math.max(title.length, ...cells.map((line) => line[i]!.length)));
  const line = (texts: readonly string[]): string =>
    texts
      .map((text, i) => (i === 0 || i === 6 ? text.padEnd(widths[i]!) : text.padStart(widths[i]!)))
      .join('  ')
      .trimEnd();
  console.log(`\n${line(head)}\n${widths.map((width) => '─'.repeat(width)).join('  ')}`);
  for (const texts of cells) console.log(line(texts));
}
