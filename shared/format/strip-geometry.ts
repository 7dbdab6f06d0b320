import type { Outcome } from '../contracts/vocabulary.ts';
import { formatNumber, formatWithUncertainty, MINUS, NO_BREAK_SPACE } from './numbers.ts';
import type { StripMeasures, StripSize } from './strip-sizes.ts';
import { STRIP_MEASURES } from './strip-sizes.ts';
import { stripWords } from './strip-words.ts';

/** What is known about one comparison. All numbers share one unit, % unless `unit` says otherwise. */
export interface StripInput {
  /** Tolerance T (maximum permissible error), above zero. */
  tolerance: number;
  /** Guard band w of the decision rule in force; drawn up to T. */
  guardBand: number;
  /** Error e of the last result; absent before the first. */
  error?: number | null;
  /** Expanded uncertainty U of that error. */
  expandedUncertainty?: number | null;
  coverageFactor?: number;
  /** The outcome as decided by the server; without it the guard band decides here. */
  outcome?: Outcome | null;
  /** Up to three earlier errors, newest first. */
  earlier?: readonly number[];
  /** Where the drift forecast puts the error today. */
  forecast?: number | null;
  /** Words on a cover plate while the result must stay hidden; nothing that betrays it is drawn or spoken. */
  closed?: string | null;
  /** `%` or the unit of an absolute error. */
  unit?: string;
  /** What was compared: `As left`, `Check`, `As found`. */
  what?: string;
}

export interface Marker {
  shape: string;
  /** The filled half; null when the whole shape is filled. */
  half: string | null;
}

export interface StripResult {
  outcome: Outcome;
  x: number;
  isOffScale: boolean;
  whisker: { from: number; to: number; caps: readonly number[] } | null;
  marker: Marker;
  /** Outward chevrons of an off-scale result. */
  chevrons: readonly string[];
  /** The figure: under the dot, or in the channel of a row when off scale. */
  figure: { x: number; y: number; text: string; anchor: 'start' | 'middle' | 'end'; fontSize: number } | null;
  leader: { y1: number; y2: number } | null;
}

export interface StripGeometry {
  measures: StripMeasures;
  centre: number;
  posts: readonly [number, number];
  ends: readonly [number, number];
  hatchInside: string;
  hatchOutside: string;
  result: StripResult | null;
  wake: readonly { x: number; y: number; r: number; opacity: number }[];
  caret: string | null;
  scale: readonly { x: number; text: string }[];
  words: string;
}

/** The wake fades so that drift reads as a direction in time. */
const WAKE_OPACITY = [0.62, 0.4, 0.24] as const;
/** A lozenge of the same area as the dot looks smaller; this evens them out. */
const LOZENGE = 1.22;
/** A scale figure gives way when it is closer than this to the result's, px; zero is short and may come closer. */
const FIGURE_ROOM = 92;
const ZERO_ROOM = 74;

/** The outcome by guard band: |e| ≤ T−w, ≤ T, ≤ T+w, beyond [JCGM 106, 8.3]. */
export function outcomeByGuardBand(error: number, tolerance: number, guardBand: number): Outcome {
  const size = Math.abs(error);
  if (size <= tolerance - guardBand) return 'within-clear';
  if (size <= tolerance) return 'within-unsure';
  return size <= tolerance + guardBand ? 'outside-unsure' : 'outside-clear';
}

/** Where everything of a strip stands; pure, so that screen, record and tests share one drawing. */
export function stripGeometry(input: StripInput, size: StripSize): StripGeometry {
  const z = STRIP_MEASURES[size];
  const T = input.tolerance;
  const w = Math.min(Math.max(input.guardBand, 0), T);
  const centre = z.width / 2;
  const limit = z.domain * T;
  const x = (value: number) => centre + (Math.max(-limit, Math.min(limit, value)) / T) * z.unit;
  const [top, bottom] = z.channel;
  const outside = Math.min(w, limit - T);
  const isOpen = !input.closed;
  const result = isOpen ? placeResult(input, w, z, x, limit) : null;
  return {
    measures: z,
    centre,
    posts: [x(-T), x(T)],
    ends: [x(-limit), x(limit)],
    hatchInside:
      hatchPath(x(T - w), x(T), top, bottom, z.hatchStep, 'rising') +
      hatchPath(x(-T), x(w - T), top, bottom, z.hatchStep, 'falling'),
    hatchOutside:
      hatchPath(x(T), x(T + outside), top, bottom, z.hatchStep * 2, 'falling') +
      hatchPath(x(-T - outside), x(-T), top, bottom, z.hatchStep * 2, 'rising'),
    result,
    wake: isOpen ? placeWake(input.earlier ?? [], z, x) : [],
    caret: isOpen ? caretPath(input.forecast, z, x, limit, size) : null,
    scale: z.figures ? scaleFigures(input, z.figures, centre, x, result) : [],
    words: stripWords(input, result?.outcome ?? null),
  };
}

type Place = (value: number) => number;

function placeResult(
  input: StripInput,
  w: number,
  z: StripMeasures,
  x: Place,
  limit: number,
): StripResult | null {
  const e = input.error;
  if (e == null) return null;
  const U = input.expandedUncertainty ?? null;
  const outcome = input.outcome ?? outcomeByGuardBand(e, input.tolerance, w);
  const side = e < 0 ? -1 : 1;
  const isOffScale = Math.abs(e) > limit;
  const at = x(e);
  const y = z.axisY;
  const text = formatWithUncertainty({
    value: e,
    expandedUncertainty: U,
    unit: input.unit ?? '%',
    sign: 'always',
    decimalsWithoutUncertainty: 2,
  });
  if (isOffScale) return offScaleResult({ e, w, outcome, side, at, text: text.text, input, z, x });
  const caps = U === null ? [] : [e - U, e + U].filter((end) => Math.abs(end) <= limit).map(x);
  return {
    outcome,
    x: at,
    isOffScale,
    whisker: U === null ? null : { from: x(e - U), to: x(e + U), caps },
    marker: markerPaths(outcome, at, y, z.dotRadius, side),
    chevrons: [],
    figure: z.figures ? { ...underDot(at, text.text, z), text: text.text, anchor: 'middle' } : null,
    leader: z.figures
      ? {
          y1: y + z.dotRadius + (outcome.startsWith('outside') ? 4 : 2),
          y2: z.figures.y - z.figures.fontSize - 1,
        }
      : null,
  };
}

interface OffScale {
  e: number;
  w: number;
  outcome: Outcome;
  side: 1 | -1;
  at: number;
  text: string;
  input: StripInput;
  z: StripMeasures;
  x: Place;
}

/** Beyond the run-out: lozenge at the end stop, two chevrons outward, the figure always printed. */
function offScaleResult({ e, w, outcome, side, at, text, input, z, x }: OffScale): StripResult {
  const k = z.dotRadius * 1.1;
  const base = at - side * k * 0.2;
  const chevrons = [0, 1].map((i) => {
    const start = base + side * (i * k * 0.8 - k * 0.5);
    return `M${px(start)} ${px(z.axisY - k)}l${px(side * k * 0.85)} ${px(k)}l${px(-side * k * 0.85)} ${px(k)}`;
  });
  const inChannel = {
    x: x(side * (input.tolerance - w)) - side * 3,
    y: z.axisY + 4,
    text: formatNumber(e, { decimals: 1, sign: 'always' }),
    anchor: side > 0 ? ('end' as const) : ('start' as const),
    fontSize: 11,
  };
  return {
    outcome,
    x: at,
    isOffScale: true,
    whisker: null,
    marker: markerPaths(outcome, at - side * k * 2.1, z.axisY, z.dotRadius * 0.86, side),
    chevrons,
    figure: z.figures ? { ...underDot(at, text, z), text, anchor: 'middle' } : inChannel,
    leader: null,
  };
}

function underDot(at: number, text: string, z: StripMeasures): { x: number; y: number; fontSize: number } {
  const { y, fontSize, half } = z.figures ?? { y: 0, fontSize: 0, half: 0 };
  // A mono character is 0.6 em wide; a long absolute figure needs more room than the usual percentage.
  const room = Math.max(half, (text.length * fontSize * 0.6) / 2);
  return { x: Math.max(room, Math.min(z.width - room, at)), y, fontSize };
}

function placeWake(earlier: readonly number[], z: StripMeasures, x: Place): StripGeometry['wake'] {
  return earlier
    .slice(0, 3)
    .map((e, i) => ({
      x: x(e),
      y: z.axisY + (z.wake[i] ?? 0),
      r: z.wakeRadius * (1 - 0.12 * i),
      opacity: WAKE_OPACITY[i] ?? 0,
    }))
    .reverse();
}

function caretPath(
  forecast: number | null | undefined,
  z: StripMeasures,
  x: Place,
  limit: number,
  size: StripSize,
): string | null {
  if (forecast == null || Math.abs(forecast) > limit) return null;
  const k = size === 'row' ? 3.6 : z.dotRadius * 0.9;
  const top = size === 'row' ? 1 : z.post[0] - 1;
  const at = x(forecast);
  return `M${px(at - k)} ${px(top)}L${px(at)} ${px(top + k)}L${px(at + k)} ${px(top)}`;
}

function scaleFigures(
  input: StripInput,
  figures: NonNullable<StripMeasures['figures']>,
  centre: number,
  x: Place,
  result: StripResult | null,
): StripGeometry['scale'] {
  const T = input.tolerance;
  const unit = NO_BREAK_SPACE + (input.unit ?? '%');
  // "no result yet" stands right of zero and counts as a figure.
  const busy = result?.figure?.x ?? (input.closed ? -Infinity : centre + 60);
  return [
    { x: x(-T), text: MINUS + formatNumber(T) + unit, room: FIGURE_ROOM },
    { x: centre, text: '0', room: ZERO_ROOM },
    { x: x(T), text: '+' + formatNumber(T) + unit, room: FIGURE_ROOM },
  ].filter((figure) => Math.abs(figure.x - busy) > figure.room && figures.fontSize > 0);
}

/** Round = within, lozenge = outside; solid = sure, half = not sure, the open half faces the limit in doubt. */
export function markerPaths(outcome: Outcome, x: number, y: number, r: number, side: 1 | -1): Marker {
  const isOutside = outcome.startsWith('outside');
  const isUnsure = outcome.endsWith('unsure');
  const k = isOutside ? LOZENGE * r : r;
  const shape = isOutside
    ? `M${px(x - k)} ${px(y)}L${px(x)} ${px(y - k)}L${px(x + k)} ${px(y)}L${px(x)} ${px(y + k)}Z`
    : `M${px(x - r)} ${px(y)}A${r} ${r} 0 1 1 ${px(x + r)} ${px(y)}A${r} ${r} 0 1 1 ${px(x - r)} ${px(y)}Z`;
  if (!isUnsure) return { shape, half: null };
  const filled = isOutside ? side : -side;
  const half = isOutside
    ? `M${px(x)} ${px(y - k)}L${px(x + filled * k)} ${px(y)}L${px(x)} ${px(y + k)}Z`
    : `M${px(x)} ${px(y - r)}A${r} ${r} 0 0 ${filled > 0 ? 1 : 0} ${px(x)} ${px(y + r)}Z`;
  return { shape, half };
}

/**
 * 45° lines clipped to a rectangle by arithmetic. An SVG pattern would lose the theme's variables and its id would
 * collide when many strips share a page.
 */
export function hatchPath(
  x0: number,
  x1: number,
  y0: number,
  y1: number,
  step: number,
  lean: 'rising' | 'falling',
): string {
  if (x1 - x0 < 0.5) return '';
  let path = '';
  const isRising = lean === 'rising';
  const first = isRising ? x0 + y0 : x0 - y1;
  const last = isRising ? x1 + y1 : x1 - y0;
  for (let c = Math.ceil(first / step) * step; c < last; c += step) {
    const a = Math.max(x0, isRising ? c - y1 : c + y0);
    const b = Math.min(x1, isRising ? c - y0 : c + y1);
    const y = (at: number) => (isRising ? c - at : at - c);
    if (b - a > 0.3) path += `M${px(a)} ${px(y(a))}L${px(b)} ${px(y(b))}`;
  }
  return path;
}

/** A tenth of a pixel is finer than any screen shows. */
export function px(value: number): number {
  return Math.round(value * 10) / 10 + 0;
}
