import type { ChartDataset, ChartOptions, Plugin } from 'chart.js';
import { Chart, Filler, LinearScale, LineController, LineElement, PointElement } from 'chart.js';
import { formatNumber } from '../../../../shared/format/numbers.ts';
import type { ChartColours } from './chart-colours.ts';
import { readChartColours, withAlpha } from './chart-colours.ts';
import type { SeriesDatum, SeriesLimit } from './series-model.ts';
import { valueExtent } from './series-model.ts';
import { timeTicks } from './time-axis.ts';
import { valueTicks } from './value-axis.ts';

Chart.register(LineController, LineElement, PointElement, LinearScale, Filler);

export interface SeriesPlotState {
  points: readonly SeriesDatum[];
  from: number;
  to: number;
  limits: readonly SeriesLimit[];
  timeZone: string;
}

export interface SeriesPlot {
  draw: (state: SeriesPlotState) => void;
  /** Read the theme's colours again. */
  recolour: () => void;
  /** Time at a horizontal place, px from the left of the canvas. */
  timeAt: (x: number) => number;
  xAt: (t: number) => number;
}

export type SeriesPoint = { x: number; y: number };
type Line = ChartDataset<'line', SeriesPoint[]>;

const FONT = { family: "'Roboto Mono', monospace", size: 12 };
/** Room for one time label, px. */
const LABEL_WIDTH = 110;

/** What each chart shows now: the limit lines are drawn by a plugin, which is given the chart and nothing else. */
const shown = new WeakMap<Chart, { state: SeriesPlotState; colours: ChartColours }>();

/** Limits over the plot, as posts of the strip. */
export const limitLines: Plugin<'line'> = {
  id: 'limit-lines',
  afterDatasetsDraw: (chart) => {
    const now = shown.get(chart);
    if (now) drawLimits(chart, now.state.limits, now.colours);
  },
};

/** Options of one chart; a fresh object for each, because the axes are written into it. */
export const seriesPlotOptions = (): ChartOptions<'line'> => ({
  animation: false,
  responsive: true,
  maintainAspectRatio: false,
  parsing: false,
  normalized: true,
  events: [],
  layout: { padding: { top: 8, right: 12 } },
  scales: {
    x: { type: 'linear', grid: { drawOnChartArea: false, tickLength: 5 }, ticks: { font: FONT } },
    y: {
      type: 'linear',
      grid: { tickLength: 0 },
      border: { display: false },
      ticks: { font: FONT, padding: 10 },
    },
  },
});

/** Draws a line with its bands on a mounted chart. Data sets are replaced in place and redrawn without animation. */
export function createSeriesPlot(chart: Chart<'line', SeriesPoint[]>): SeriesPlot {
  let colours = readChartColours(chart.canvas);
  let state: SeriesPlotState = { points: [], from: 0, to: 1, limits: [], timeZone: 'UTC' };

  const applyAxes = () => {
    const { x, y } = chart.options.scales ?? {};
    if (!x || !y) return;
    const most = Math.max(2, Math.floor(chart.width / LABEL_WIDTH));
    const times = timeTicks(state.from, state.to, most, state.timeZone);
    const extent = valueExtent(state.points, state.limits) ?? { low: 0, high: 1 };
    const values = valueTicks(extent.low, extent.high, 4);
    Object.assign(x, {
      min: state.from,
      max: state.to,
      border: { color: colours.ink },
      afterBuildTicks: (axis: { ticks: { value: number; label?: string }[] }) => {
        axis.ticks = times.map((tick) => ({ value: tick.t, label: tick.text }));
      },
      ticks: { font: FONT, color: colours.ink2, autoSkip: false, maxRotation: 0, callback: labelAt(times) },
      grid: { drawOnChartArea: false, tickLength: 5, color: colours.ink },
    });
    Object.assign(y, {
      min: extent.low,
      max: extent.high,
      afterBuildTicks: (axis: { ticks: { value: number }[] }) => {
        axis.ticks = values.ticks.map((value) => ({ value }));
      },
      ticks: {
        font: FONT,
        color: colours.ink2,
        padding: 10,
        callback: (value: number | string) => formatNumber(Number(value), { decimals: values.decimals }),
      },
      grid: { color: colours.rule, tickLength: 0 },
    });
  };
  const redraw = () => {
    shown.set(chart, { state, colours });
    chart.data.datasets = linesOf(state.points, colours);
    applyAxes();
    chart.update('none');
  };
  chart.options.onResize = () => applyAxes();
  // Labels measured in the fallback face would be cut once the real one arrives.
  void document.fonts?.ready.then(() => {
    if (chart.ctx) redraw();
  });
  return {
    draw: (next) => {
      state = next;
      redraw();
    },
    recolour: () => {
      colours = readChartColours(chart.canvas);
      redraw();
    },
    timeAt: (x) => chart.scales['x']?.getValueForPixel(x) ?? 0,
    xAt: (t) => chart.scales['x']?.getPixelForValue(t) ?? 0,
  };
}

const labelAt = (ticks: readonly { t: number; text: string }[]) => (value: number | string) =>
  ticks.find((tick) => tick.t === Number(value))?.text ?? '';

function linesOf(points: readonly SeriesDatum[], colours: ChartColours): Line[] {
  const line = (value: (point: SeriesDatum) => number | null): SeriesPoint[] =>
    points.map((point) => ({ x: point.t, y: value(point) ?? Number.NaN }));
  const band = (upper: SeriesPoint[], lower: SeriesPoint[], fill: string): Line[] => [
    { data: upper, borderWidth: 0, pointRadius: 0 },
    { data: lower, borderWidth: 0, pointRadius: 0, fill: '-1', backgroundColor: fill },
  ];
  const hasU = points.some((point) => point.expandedUncertainty != null);
  const hasBuckets = points.some((point) => point.min != null && point.max != null);
  const U = (point: SeriesDatum, side: number) =>
    point.mean === null || point.expandedUncertainty == null
      ? null
      : point.mean + side * point.expandedUncertainty;
  const last = points.findLast((point) => point.mean !== null);
  return [
    ...(hasU
      ? band(
          line((p) => U(p, 1)),
          line((p) => U(p, -1)),
          withAlpha(colours.kelp, 0.13),
        )
      : []),
    ...(hasBuckets
      ? band(
          line((p) => p.max ?? null),
          line((p) => p.min ?? null),
          withAlpha(colours.ink, 0.2),
        )
      : []),
    { data: line((p) => p.mean), borderColor: colours.ink, borderWidth: 1.4, pointRadius: 0 },
    ...(last?.mean == null
      ? []
      : [
          {
            data: [{ x: last.t, y: last.mean }],
            pointRadius: 4,
            // Half of the last dot lies beyond the plot.
            clip: 6,
            pointBackgroundColor: colours.ink,
            pointBorderWidth: 0,
          },
        ]),
  ];
}

/** Limits as lines over the whole width, 2 px ink as the posts of the strip, with their name above. */
function drawLimits(chart: Chart<'line'>, limits: readonly SeriesLimit[], colours: ChartColours): void {
  const { ctx, chartArea, scales } = chart;
  const y = scales['y'];
  if (!y) return;
  for (const limit of limits) {
    const at = y.getPixelForValue(limit.value);
    if (at < chartArea.top - 1 || at > chartArea.bottom + 1) continue;
    ctx.save();
    ctx.strokeStyle = colours.ink;
    ctx.lineWidth = 2;
    ctx.beginPath();
    ctx.moveTo(chartArea.left, at);
    ctx.lineTo(chartArea.right, at);
    ctx.stroke();
    ctx.font = `500 ${FONT.size}px ${FONT.family}`;
    ctx.textAlign = 'right';
    ctx.lineWidth = 4;
    ctx.strokeStyle = colours.paper;
    const baseline = at - chartArea.top > 18 ? at - 6 : at + 14;
    ctx.strokeText(limit.label, chartArea.right - 4, baseline);
    ctx.fillStyle = colours.ink;
    ctx.fillText(limit.label, chartArea.right - 4, baseline);
    ctx.restore();
  }
}
