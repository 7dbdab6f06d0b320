import type { Probe, ProbeEvent, ProbeRow } from '../../../../shared/contracts/probes.ts';
import type { Strip } from '../../../../shared/contracts/readings.ts';
import { formatDate } from '../../../../shared/format/dates.ts';
import {
  capitalise,
  DECISION_RULE_LABELS,
  OUTCOME_LABELS,
  PROBE_KIND_LABELS,
  STAGE_LABELS,
} from '../../../../shared/format/labels.ts';
import {
  formatNumber,
  formatProbability,
  formatSigned,
  uncertaintyPlace,
} from '../../../../shared/format/numbers.ts';
import type { StripInput } from '../../../../shared/format/strip-geometry.ts';

/** The name a page about a probe carries: where it stands, else its tag. */
export function probeName(probe: Pick<ProbeRow, 'placement' | 'tag'>): string {
  return probe.placement?.pointName ?? probe.tag;
}

/** `four-electrode · serial 4E-2217 · sk-04 · cell constant in use 0.5118 cm⁻¹` */
export function probeMeta(probe: Pick<Probe, 'kind' | 'serial' | 'tag' | 'cellConstantPerCm'>): string {
  const constant = formatCellConstant(probe.cellConstantPerCm);
  return [
    PROBE_KIND_LABELS[probe.kind],
    `serial ${probe.serial}`,
    probe.tag,
    `cell constant in use ${constant}`,
  ].join(' · ');
}

/** A cell constant with the digits that transmitters take. */
export function formatCellConstant(perCm: number | null | undefined): string {
  return formatNumber(perCm, { decimals: 4, unit: 'cm⁻¹' });
}

/** Why the reading may or may not be used, in a sentence that follows the trust word. */
export function trustSentence(
  probe: Pick<Probe, 'trust' | 'strip' | 'device' | 'cellConstantPerCm'>,
): string {
  const { trust, strip } = probe;
  if (trust.reason === 'cell-constant-changed') {
    const reported = formatCellConstant(probe.device?.reportedCellConstantPerCm);
    return `Its transmitter works with ${reported}, and the record says ${formatCellConstant(probe.cellConstantPerCm)}. No record asked for the change.`;
  }
  if (!strip) return `${capitalise(trust.text)}.`;
  const tolerance = formatNumber(strip.tolerancePercent, { unit: '%' });
  switch (trust.reason) {
    case 'as-compared':
      return `${readsWords(strip)}, clearly within the ${tolerance} tolerance.`;
    case 'within-unsure':
      return `${readsWords(strip)}, and that is too near the ${tolerance} tolerance to be sure.`;
    case 'outside-unsure':
      return `${readsWords(strip)}, beyond the ${tolerance} tolerance, though too near it to be sure.`;
    case 'outside-clear':
      return `${readsWords(strip)}, and the tolerance is ${tolerance}.`;
    default:
      return `${capitalise(trust.text)}.`;
  }
}

/** Below this part of U a reading is as right as anybody could tell. */
const HARDLY = 0.1;

function readsWords(strip: Strip): string {
  const size = Math.abs(strip.errorPercent);
  if (size < HARDLY * strip.expandedUncertaintyPercent) return 'Read true at the last comparison';
  const error = formatNumber(size, { decimals: 1, unit: '%' });
  return `Read ${strip.errorPercent < 0 ? 'low' : 'high'} by ${error} at the last comparison`;
}

export interface ComparisonWords {
  /** `Check 8 Sep 2026: error −1.70 % ± 0.85 %,` */
  opening: string;
  outcome: string;
  /** Guard band, its rule and the probability. */
  rest: string;
}

/** The last comparison in words beside its strip. */
export function comparisonWords(strip: Strip, timeZone: string): ComparisonWords {
  const U = strip.expandedUncertaintyPercent;
  const decimals = U > 0 ? Math.max(0, uncertaintyPlace(U)) : 2;
  const guard = formatNumber(strip.guardBandPercent, { significantDigits: 2, unit: '%' });
  const rule =
    strip.decisionRule === 'simple'
      ? 'The rule is simple acceptance, without a guard band.'
      : `Guard band ${guard} (${DECISION_RULE_LABELS[strip.decisionRule]}).`;
  return {
    opening: `${capitalise(STAGE_LABELS[strip.stage])} on ${formatDate(strip.at, { timeZone })}: error ${formatSigned(strip.errorPercent, decimals, '%')}, U ${formatNumber(U, { decimals, unit: '%' })} (k = ${formatNumber(strip.coverageFactor, { significantDigits: 2 })}),`,
    outcome: OUTCOME_LABELS[strip.outcome],
    rest: `${rule} Probability that it was outside: ${formatProbability(strip.probabilityOutside)}.`,
  };
}

export function stripInput(strip: Strip): StripInput {
  return {
    tolerance: strip.tolerancePercent,
    guardBand: strip.guardBandPercent,
    error: strip.errorPercent,
    expandedUncertainty: strip.expandedUncertaintyPercent,
    coverageFactor: strip.coverageFactor,
    outcome: strip.outcome,
    earlier: strip.earlierErrorPercent,
    what: capitalise(STAGE_LABELS[strip.stage]),
  };
}

export type TimelineShape = 'determined' | 'cleaned' | 'adjusted' | 'placed' | 'plain';

const SHAPES: Readonly<Partial<Record<ProbeEvent['kind'], TimelineShape>>> = {
  check: 'determined',
  cleaned: 'cleaned',
  adjusted: 'adjusted',
  installed: 'placed',
  moved: 'placed',
  removed: 'placed',
  registered: 'placed',
  retired: 'placed',
};

export const timelineShape = (event: Pick<ProbeEvent, 'kind'>): TimelineShape =>
  SHAPES[event.kind] ?? 'plain';

export type TimelineEntry =
  | { kind: 'event'; event: ProbeEvent }
  /** Routine checks that say nothing new, folded into one line until somebody asks. */
  | { kind: 'run'; key: string; events: ProbeEvent[] };

/** From so many routine checks in a row on they are folded. */
const FOLD_FROM = 3;

/** The timeline with runs of routine automatic checks folded, so that what people did stands out. */
export function foldTimeline(events: readonly ProbeEvent[]): TimelineEntry[] {
  const entries: TimelineEntry[] = [];
  let run: ProbeEvent[] = [];
  const close = () => {
    const [first] = run;
    if (first && run.length >= FOLD_FROM) entries.push({ kind: 'run', key: `run-${first.key}`, events: run });
    else entries.push(...run.map((event) => ({ kind: 'event' as const, event })));
    run = [];
  };
  for (const event of events) {
    const isRoutine =
      event.kind === 'check' && event.strip?.stage === 'automatic' && event.strip.outcome === 'within-clear';
    if (isRoutine) run.push(event);
    else {
      close();
      entries.push({ kind: 'event', event });
    }
  }
  close();
  return entries;
}

/** `14 automatic checks, all within, clear: −0.41 to +0.12 %` */
export function runWords(events: readonly ProbeEvent[]): string {
  const errors = events.flatMap((event) => (event.strip ? [event.strip.errorPercent] : []));
  const low = formatSigned(Math.min(...errors), 2);
  const high = formatSigned(Math.max(...errors), 2, '%');
  return `${events.length} automatic checks, all within, clear: ${low} to ${high}`;
}
