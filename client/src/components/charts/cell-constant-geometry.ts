import type { CheckStage } from '../../../../shared/contracts/vocabulary.ts';
import { hatchPath, px } from '../../../../shared/format/strip-geometry.ts';
import type { TimeTick } from './time-axis.ts';
import { timeTicks } from './time-axis.ts';
import { valueTicks } from './value-axis.ts';

/** One determination of the cell constant in a KCl solution. Times in ms since 1970. */
export interface CellConstantPoint {
  at: number;
  cellConstantPerCm: number;
  expandedUncertaintyPerCm?: number | null;
  stage: CheckStage;
}

/** The constant the transmitter used from a time on. */
export interface ConstantInUse {
  from: number;
  cellConstantPerCm: number;
}

export interface ForecastPoint {
  at: number;
  cellConstantPerCm: number;
  standardUncertaintyPerCm: number;
}

export interface CellConstantInput {
  points: readonly CellConstantPoint[];
  constants: readonly ConstantInUse[];
  tolerancePercent: number;
  guardBandPercent: number;
  /** From the last determination on; drawn as 50, 80 and 95 % bands. */
  forecast?: readonly ForecastPoint[];
  due?: number | null;
  now: number;
  timeZone?: string;
}

export interface PlacedPoint {
  point: CellConstantPoint;
  x: number;
  y: number;
  whisker: [top: number, bottom: number] | null;
}

export interface CellConstantGeometry {
  width: number;
  height: number;
  plot: { left: number; right: number; top: number; bottom: number };
  channels: { x: number; width: number; top: number; bottom: number; hatch: string }[];
  constantLine: string;
  steps: { x: number; y: number; from: number; to: number }[];
  bands: { d: string; opacity: number }[];
  forecastLine: string | null;
  placed: PlacedPoint[];
  /** Uncleaned and cleaned of one visit, joined by a dotted line. */
  joins: { x: number; y1: number; y2: number }[];
  nowX: number;
  dueX: number | null;
  times: (TimeTick & { x: number })[];
  values: { y: number; value: number }[];
  decimals: number;
  /** Of the present channel, for the names of its limits at the right. */
  limits: { top: number; middle: number; bottom: number } | null;
}

/** Half-widths of the bands in standard uncertainties: normal quantiles for 50, 80 and 95 %. */
const BANDS = [
  { quantile: 1.96, opacity: 0.1 },
  { quantile: 1.2816, opacity: 0.13 },
  { quantile: 0.6745, opacity: 0.17 },
];
/** As found and cleaned this close together belong to one visit, ms. */
const VISIT_MS = 12 * 3_600_000;
const DAY_MS = 86_400_000;
/** Room for one time label, px. */
const TIME_LABEL = 110;

/** The strip unrolled in time: channel and posts follow the constant in use, hatching is the guard band. */
export function cellConstantGeometry(input: CellConstantInput, width: number): CellConstantGeometry {
  const isNarrow = width < 500;
  const height = isNarrow ? 330 : 392;
  const plot = {
    left: isNarrow ? 50 : 66,
    right: width - (isNarrow ? 86 : 92),
    top: 30,
    bottom: height - 42,
  };
  const { from, to } = timeExtent(input);
  const x = (t: number) => plot.left + ((t - from) / (to - from)) * (plot.right - plot.left);
  const { low, high } = constantExtent(input);
  const y = (k: number) => plot.bottom - ((k - low) / (high - low)) * (plot.bottom - plot.top);
  const channels = channelsOf(input, to, x, y);
  const placed = input.points.map((point) => place(point, x, y));
  const axis = valueTicks(low, high, 6);
  const last = channels.at(-1);
  return {
    width,
    height,
    plot,
    channels,
    constantLine: constantLine(input.constants, channelEnd(input, to), x, y),
    steps: stepsOf(input.constants, x, y),
    bands: bandsOf(input.forecast ?? [], x, y),
    forecastLine: forecastLine(input.forecast ?? [], x, y),
    placed,
    joins: joinsOf(placed),
    nowX: x(input.now),
    dueX: input.due == null ? null : x(input.due),
    times: timeTicks(from, to, Math.max(2, Math.floor(width / TIME_LABEL)), input.timeZone).map((tick) => ({
      ...tick,
      x: x(tick.t),
    })),
    values: axis.ticks.map((value) => ({ value, y: y(value) })),
    // Three at least: a cell constant is never set with fewer.
    decimals: Math.max(3, axis.decimals),
    limits: last
      ? { top: last.top, middle: y(input.constants.at(-1)?.cellConstantPerCm ?? 0), bottom: last.bottom }
      : null,
  };
}

type Scale = (value: number) => number;

function timeExtent(input: CellConstantInput): { from: number; to: number } {
  const times = [...input.points.map((p) => p.at), ...input.constants.map((c) => c.from)];
  const from = Math.min(input.now - 30 * DAY_MS, ...times);
  const ahead = [...(input.forecast ?? []).map((p) => p.at), input.due ?? input.now, input.now];
  const to = Math.max(...ahead);
  const air = (to - from) * 0.03;
  return { from: from - air, to: to + air };
}

function constantExtent(input: CellConstantInput): { low: number; high: number } {
  const T = input.tolerancePercent / 100;
  const all = [
    ...input.constants.flatMap((c) => [c.cellConstantPerCm * (1 - T), c.cellConstantPerCm * (1 + T)]),
    ...input.points.flatMap((p) => {
      const U = p.expandedUncertaintyPerCm ?? 0;
      return [p.cellConstantPerCm - U, p.cellConstantPerCm + U];
    }),
    ...(input.forecast ?? []).flatMap((p) => {
      const half = 1.96 * p.standardUncertaintyPerCm;
      return [p.cellConstantPerCm - half, p.cellConstantPerCm + half];
    }),
  ];
  if (all.length === 0) return { low: 0, high: 1 };
  const [low, high] = [Math.min(...all), Math.max(...all)];
  const air = (high - low || 0.01) * 0.06;
  return { low: low - air, high: high + air };
}

function channelsOf(
  input: CellConstantInput,
  to: number,
  x: Scale,
  y: Scale,
): CellConstantGeometry['channels'] {
  const T = input.tolerancePercent / 100;
  const w = Math.min(input.guardBandPercent / 100, T);
  const end = channelEnd(input, to);
  return input.constants.map((constant, i) => {
    const k = constant.cellConstantPerCm;
    const [left, right] = [x(constant.from), x(input.constants[i + 1]?.from ?? end)];
    const [top, bottom] = [y(k * (1 + T)), y(k * (1 - T))];
    return {
      x: left,
      width: Math.max(0, right - left),
      top,
      bottom,
      hatch:
        hatchPath(left, right, top, y(k * (1 + T - w)), 7, 'falling') +
        hatchPath(left, right, y(k * (1 - T + w)), bottom, 7, 'rising'),
    };
  });
}

/** The channel ends at the due date: beyond it nothing is promised. */
function channelEnd(input: CellConstantInput, to: number): number {
  return input.due != null && input.due > input.now ? input.due : to;
}

function constantLine(constants: readonly ConstantInUse[], end: number, x: Scale, y: Scale): string {
  const [first, ...later] = constants;
  if (!first) return '';
  const path = later.map((c) => `H${px(x(c.from))}V${px(y(c.cellConstantPerCm))}`).join('');
  return `M${px(x(first.from))} ${px(y(first.cellConstantPerCm))}${path}H${px(x(end))}`;
}

function stepsOf(constants: readonly ConstantInUse[], x: Scale, y: Scale): CellConstantGeometry['steps'] {
  return constants.slice(1).map((constant, i) => {
    const from = constants[i]?.cellConstantPerCm ?? 0;
    const to = constant.cellConstantPerCm;
    return { x: x(constant.from), y: y((from + to) / 2), from, to };
  });
}

function bandsOf(forecast: readonly ForecastPoint[], x: Scale, y: Scale): CellConstantGeometry['bands'] {
  if (forecast.length < 2) return [];
  return BANDS.map(({ quantile, opacity }) => {
    const edge = (side: number) =>
      forecast.map(
        (p) => `${px(x(p.at))} ${px(y(p.cellConstantPerCm + side * quantile * p.standardUncertaintyPerCm))}`,
      );
    return { d: `M${[...edge(1), ...edge(-1).reverse()].join('L')}Z`, opacity };
  });
}

function forecastLine(forecast: readonly ForecastPoint[], x: Scale, y: Scale): string | null {
  if (forecast.length < 2) return null;
  return 'M' + forecast.map((p) => `${px(x(p.at))} ${px(y(p.cellConstantPerCm))}`).join('L');
}

function place(point: CellConstantPoint, x: Scale, y: Scale): PlacedPoint {
  const U = point.expandedUncertaintyPerCm;
  return {
    point,
    x: x(point.at),
    y: y(point.cellConstantPerCm),
    whisker: U == null ? null : [y(point.cellConstantPerCm + U), y(point.cellConstantPerCm - U)],
  };
}

function joinsOf(placed: readonly PlacedPoint[]): CellConstantGeometry['joins'] {
  return placed.flatMap((found, i) => {
    const next = placed[i + 1];
    const isPair =
      found.point.stage === 'as-found' &&
      next?.point.stage === 'as-found-cleaned' &&
      next.point.at - found.point.at < VISIT_MS;
    return isPair ? [{ x: found.x, y1: found.y, y2: next.y }] : [];
  });
}
