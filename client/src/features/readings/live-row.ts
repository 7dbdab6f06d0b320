import type { LivePoint } from '../../../../shared/contracts/realtime.ts';
import type { LiveRow } from '../../../../shared/contracts/readings.ts';
import type { ReadingContext } from '../../../../shared/contracts/vocabulary.ts';
import { capitalise, DISPLAY_UNIT_LABELS, PROBE_KIND_LABELS } from '../../../../shared/format/labels.ts';
import type { ValueWithUncertainty } from '../../../../shared/format/numbers.ts';
import { formatConductivity } from '../../../../shared/format/numbers.ts';
import type { StripInput } from '../../../../shared/format/strip-geometry.ts';
import type { QuantityProps } from '../../components/ui/figure.tsx';
import type { LedgerRowState } from '../../components/ui/ledger-parts.tsx';
import { paths } from '../../paths.ts';

/** What a row shows of its reading now. */
export interface ReadingNow {
  at: string;
  context: ReadingContext;
  /** Raw, at its own temperature. */
  conductivityUsCm: number | null;
  valueUsCm: number | null;
  expandedUncertaintyUsCm: number | null;
  temperatureC: number | null;
}

/** The newer of what was fetched and what has come live since. */
export function readingNow(row: Pick<LiveRow, 'reading'>, latest: LivePoint | null): ReadingNow | null {
  const { reading } = row;
  if (!latest || (reading && latest.at <= reading.at)) return reading;
  return {
    at: latest.at,
    context: latest.context as ReadingContext,
    conductivityUsCm: latest.conductivityUsCm,
    valueUsCm: latest.valueUsCm,
    expandedUncertaintyUsCm: scaledUncertainty(reading, latest.valueUsCm),
    temperatureC: latest.temperatureC,
  };
}

/** U of a live value until the next fetch: relative to the value it changes only with days and temperature. */
function scaledUncertainty(reading: LiveRow['reading'], valueUsCm: number | null): number | null {
  const U = reading?.expandedUncertaintyUsCm;
  if (U == null || !reading?.valueUsCm || valueUsCm === null) return null;
  return Math.abs((U / reading.valueUsCm) * valueUsCm);
}

/** Whether a live point says something that the trust on screen cannot know of yet. */
export function isSurprising(row: LiveRow, latest: LivePoint | null): boolean {
  if (!latest) return false;
  const { reading } = row;
  if (!reading) return true;
  if (latest.at <= reading.at) return false;
  return (
    row.trust.level === 'no-signal' ||
    latest.context !== reading.context ||
    latest.quality !== reading.quality ||
    latest.flags.join() !== reading.flags.join()
  );
}

/** Value and U in the unit of the point. */
export function quantityOf(row: LiveRow, reading: ReadingNow | null): ValueWithUncertainty {
  const isGone = row.trust.level === 'no-signal';
  return formatConductivity({
    conductivityUsCm: isGone ? null : reading?.valueUsCm,
    expandedUncertaintyUsCm: reading?.expandedUncertaintyUsCm ?? null,
    unit: DISPLAY_UNIT_LABELS[row.point.displayUnit],
  });
}

/** Characters that the widest figures of a ledger need before and after the point, so that columns never collide. */
export function figureRoom(rows: readonly LiveRow[]): { whole: number; fraction: number } {
  let [whole, fraction] = [5, 3];
  for (const row of rows) {
    const { value, uncertainty } = quantityOf(row, row.reading);
    for (const text of [value, uncertainty ?? '']) {
      const [before = '', after] = text.split('.');
      whole = Math.max(whole, before.length);
      fraction = Math.max(fraction, after === undefined ? 0 : after.length + 1);
    }
  }
  return { whole, fraction };
}

/** A reading that is merely away from its process (in a check solution, being cleaned) is nobody's emergency. */
export const isAway = (row: LiveRow): boolean =>
  row.trust.level === 'do-not-use' && row.trust.reason === 'not-in-process';

/** The one thing that is loud: a reading that must not be used and that nobody has taken. */
export const needsPersonNow = (row: LiveRow): boolean =>
  row.trust.level === 'do-not-use' && row.hold === null && !isAway(row);

/** Nobody has to act: somebody has it, or it comes back by itself. The gate is outlined then, not filled. */
export const isQuiet = (row: LiveRow): boolean => row.hold !== null || isAway(row);

export function valueState(row: LiveRow): NonNullable<QuantityProps['state']> {
  if (row.trust.level === 'no-signal') return 'gone';
  if (row.trust.level !== 'do-not-use') return 'plain';
  return isQuiet(row) ? 'held' : 'stop';
}

export function rowState(row: LiveRow): LedgerRowState {
  if (row.hold) return 'held';
  return needsPersonNow(row) ? 'alarm' : 'plain';
}

export function traceState(row: LiveRow): 'plain' | 'stop' | 'held' | 'gone' {
  if (row.trust.level === 'no-signal') return 'gone';
  if (row.hold) return 'held';
  return needsPersonNow(row) ? 'stop' : 'plain';
}

/** Three of the two-minute steps of the trace. */
const TRACE_GAP_MS = 360_000;
type TracePoint = [t: number, valueUsCm: number | null];

/** The trace up to now; where somebody works, up to when that began: what came after is no process. */
export function tracePoints(row: LiveRow, reading: ReadingNow | null): TracePoint[] {
  const { hold } = row;
  if (hold) return row.trace.filter(([t]) => t <= Date.parse(hold.fromAt));
  if (row.trust.level === 'no-signal' || !reading) return row.trace;
  const end: TracePoint = [Date.parse(reading.at), reading.valueUsCm];
  const last = row.trace.at(-1);
  // Nothing was heard in between: a line across would claim that something was.
  const isGap = last !== undefined && end[0] - last[0] > TRACE_GAP_MS;
  return isGap ? [...row.trace, [last[0] + 1, null], end] : [...row.trace, end];
}

/** `two-electrode · sk-11`, or that there is none. */
export function probeNote(row: LiveRow): string {
  return row.probe ? `${PROBE_KIND_LABELS[row.probe.kind]} · ${row.probe.tag}` : 'no probe installed';
}

/** A row opens its probe; a bare point opens itself. */
export function rowHref(row: LiveRow): string {
  return row.probe ? paths.probe.to({ id: row.probe.id }) : paths.point.to({ id: row.point.id });
}

/** The last comparison as the strip draws it; null before the first. */
export function stripInput(strip: LiveRow['strip']): StripInput | null {
  if (!strip) return null;
  return {
    tolerance: strip.tolerancePercent,
    guardBand: strip.guardBandPercent,
    error: strip.errorPercent,
    expandedUncertainty: strip.expandedUncertaintyPercent,
    coverageFactor: strip.coverageFactor,
    outcome: strip.outcome,
    earlier: strip.earlierErrorPercent,
  };
}

/** Why the reading must not be used, and what acts on it, as sentences. */
export function alarmWords(row: LiveRow): string {
  const why =
    row.trust.reason === 'cell-constant-changed'
      ? 'The cell constant in its transmitter changed and no record asked for it.'
      : `${capitalise(row.trust.text)}.`;
  const note = row.point.controlNote?.trim();
  return note ? `${why} ${note.replace(/\.?$/, '.')}` : why;
}

/** Whether all rows are stated at 25 °C, so that the head may say so once for all. */
export function valueHead(rows: readonly LiveRow[]): string {
  const isAt25 = rows.every(
    ({ point }) => point.referenceTemperatureC === 25 && point.compensationModel !== 'none',
  );
  return isAt25 && rows.length > 0 ? 'Value, 25 °C, with U' : 'Value with U';
}

/** How values are stated, under the ledger. */
export function valueFoot(rows: readonly LiveRow[]): string {
  const opening = 'U is expanded uncertainty, k = 2.';
  if (rows.some(({ point }) => point.compensationModel === 'none')) {
    return `${opening} Values are at each point’s reference temperature by its own model; points without a model show the value as measured.`;
  }
  return valueHead(rows) === 'Value with U'
    ? `${opening} Values are at each point’s own reference temperature, by its own model.`
    : `${opening} Readings at 25 °C use each point’s own model.`;
}

/** More slabs than this would push the ledger off the screen; the rest stand out in their rows. */
const MOST_SLIPS = 3;
const WEIGHT = { critical: 0, high: 1, medium: 2, low: 3 } as const;

export interface Alarms {
  shown: LiveRow[];
  /** How many more stand in the ledger below. */
  more: number;
}

/** The alarms to be told first, the most critical points before the others. */
export function alarmsOf(rows: readonly LiveRow[]): Alarms {
  const all = rows
    .filter(needsPersonNow)
    .sort((a, b) => WEIGHT[a.point.criticality] - WEIGHT[b.point.criticality]);
  return { shown: all.slice(0, MOST_SLIPS), more: Math.max(0, all.length - MOST_SLIPS) };
}

/** What the hold dialogs need to know of a row. */
export function holdableOf({ point, hold }: LiveRow) {
  return { id: point.id, name: point.name, controlNote: point.controlNote, hold };
}
