import type { Chart } from 'chart.js';
import type { CSSProperties } from 'react';
import { useEffect, useMemo, useRef, useState } from 'react';
import { Line } from 'react-chartjs-2';
import { formatDateTime } from '../../../../shared/format/dates.ts';
import { formatNumber } from '../../../../shared/format/numbers.ts';
import { useTheme } from '../../lib/theme.ts';
import { ChartTable, TableToggle } from './chart-table.tsx';
import type { RangeChoice } from './range-buttons.tsx';
import { RangeButtons } from './range-buttons.tsx';
import type { SeriesDatum, SeriesLimit } from './series-model.ts';
import { nearestDatum, newerThan, seriesWords } from './series-model.ts';
import type { SeriesPlot, SeriesPoint } from './series-plot.ts';
import { createSeriesPlot, limitLines, seriesPlotOptions } from './series-plot.ts';
import { useRangeDrag } from './use-range-drag.ts';

export interface TimeSeriesChartProps {
  /** What is drawn: "Reading of Feed, train A". */
  label: string;
  unit: string;
  /** Digits after the point in the readout and the table. */
  decimals: number;
  /** Readings or buckets of the range, in order of time, at most 1 000. */
  points: readonly SeriesDatum[];
  /** Live points; those newer than `points` are drawn on. Pass useLiveReadings mapped to SeriesDatum. */
  live?: readonly SeriesDatum[];
  /** ms since 1970. */
  from: number;
  to: number;
  /** The end of the range buttons, normally the present; ms. */
  now: number;
  limits?: readonly SeriesLimit[];
  timeZone?: string;
  height?: number;
  ranges?: readonly RangeChoice[];
  /** Asked for another range, by button or by dragging over the chart: fetch it and pass it down. */
  onRangeChange?: (from: number, to: number) => void;
}

const NONE: readonly never[] = [];
/** The plot writes its data sets itself, so that live points never pass through props. */
const NO_DATA: { datasets: { data: SeriesPoint[] }[] } = { datasets: [] };
const PLUGINS = [limitLines];

/** Readings over time with U or min–max band and limits; range buttons, zoom by dragging, and the values as a table. */
export function TimeSeriesChart(props: TimeSeriesChartProps) {
  const { label, unit, decimals, points, live = NONE, from, to, now, limits = NONE } = props;
  const { timeZone = 'UTC', height = 190, ranges, onRangeChange } = props;
  const [isTable, setIsTable] = useState(false);
  const drawn = useMemo(() => [...points, ...newerThan(points, live)], [points, live]);
  const words = seriesWords({ label, unit, decimals, points: drawn, from, to, timeZone, limits });
  return (
    <figure className="chart-frame">
      {onRangeChange ? (
        <RangeButtons
          from={from}
          to={to}
          now={now}
          onRangeChange={onRangeChange}
          {...(ranges ? { choices: ranges } : {})}
        >
          <TableToggle isTable={isTable} onToggle={() => setIsTable(!isTable)} />
        </RangeButtons>
      ) : (
        <div className="chart-tools">
          <TableToggle isTable={isTable} onToggle={() => setIsTable(!isTable)} />
        </div>
      )}
      {isTable ? (
        <SeriesTable {...props} points={drawn} timeZone={timeZone} />
      ) : (
        <SeriesCanvas
          {...{ words, unit, decimals, drawn, from, to, limits, timeZone, height, onRangeChange }}
        />
      )}
    </figure>
  );
}

interface SeriesCanvasProps {
  words: string;
  unit: string;
  decimals: number;
  drawn: readonly SeriesDatum[];
  from: number;
  to: number;
  limits: readonly SeriesLimit[];
  timeZone: string;
  height: number;
  onRangeChange: ((from: number, to: number) => void) | undefined;
}

function SeriesCanvas(props: SeriesCanvasProps) {
  const { words, unit, decimals, drawn, from, to, limits, timeZone, height, onRangeChange } = props;
  const chart = useRef<Chart<'line', SeriesPoint[]>>(undefined);
  const options = useMemo(() => seriesPlotOptions(), []);
  const plot = useRef<SeriesPlot | null>(null);
  const [cursor, setCursor] = useState<{ x: number; datum: SeriesDatum } | null>(null);
  const theme = useTheme();
  const { drag, pointerProps, follow } = useRangeDrag(
    onRangeChange &&
      ((left, right) => {
        if (plot.current) onRangeChange(plot.current.timeAt(left), plot.current.timeAt(right));
      }),
  );

  useEffect(() => {
    if (!chart.current) return undefined;
    plot.current = createSeriesPlot(chart.current);
    return () => {
      plot.current = null;
    };
  }, []);
  useEffect(() => {
    plot.current?.draw({ points: drawn, from, to, limits, timeZone });
  }, [drawn, from, to, limits, timeZone]);
  useEffect(() => {
    plot.current?.recolour();
  }, [theme]);

  return (
    <>
      <div
        className="chart-canvas"
        style={{ '--chart-height': `${height}px` } as CSSProperties}
        {...pointerProps}
        onPointerMove={(event) => {
          const x = follow ? follow(event) : event.clientX - event.currentTarget.getBoundingClientRect().left;
          const datum = plot.current && nearestDatum(drawn, plot.current.timeAt(x));
          setCursor(datum && plot.current ? { x: plot.current.xAt(datum.t), datum } : null);
        }}
        onPointerLeave={() => setCursor(null)}
      >
        <Line ref={chart} data={NO_DATA} options={options} plugins={PLUGINS} aria-label={words} />
        {cursor && !drag ? <span className="chart-cursor" style={{ left: cursor.x }} /> : null}
        {drag ? (
          <span
            className="chart-selection"
            style={{ left: Math.min(drag.start, drag.end), width: Math.abs(drag.end - drag.start) }}
          />
        ) : null}
      </div>
      <p className="chart-readout" aria-hidden="true">
        {cursor ? readout(cursor.datum, { unit, decimals, timeZone }) : null}
        {!cursor && onRangeChange ? (
          <span className="chart-hint">Drag over the chart to look closer.</span>
        ) : null}
      </p>
    </>
  );
}

function readout(
  datum: SeriesDatum,
  { unit, decimals, timeZone }: { unit: string; decimals: number; timeZone: string },
) {
  const figure = (value: number | null | undefined) => formatNumber(value, { decimals, unit });
  const span =
    datum.min != null && datum.max != null ? `, between ${figure(datum.min)} and ${figure(datum.max)}` : '';
  return `${formatDateTime(datum.t, { timeZone, seconds: true })}  ${figure(datum.mean)}${span}`;
}

function SeriesTable(props: TimeSeriesChartProps & { timeZone: string }) {
  const { label, unit, decimals, points, timeZone } = props;
  const hasBuckets = points.some((point) => point.min != null);
  const figure = (value: number | null | undefined) => formatNumber(value, { decimals });
  return (
    <ChartTable
      caption={`${label}, ${unit}`}
      heads={['Time', hasBuckets ? `Mean, ${unit}` : unit, ...(hasBuckets ? ['Lowest', 'Highest'] : [])]}
      rows={points.map((point) => ({
        key: point.t,
        cells: [
          formatDateTime(point.t, { timeZone, seconds: true }),
          figure(point.mean),
          ...(hasBuckets ? [figure(point.min), figure(point.max)] : []),
        ],
      }))}
    />
  );
}
