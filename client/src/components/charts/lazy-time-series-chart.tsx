import { lazy, Suspense } from 'react';
import { LoadingFace } from '../ui/faces.tsx';
import type { TimeSeriesChartProps } from './time-series-chart.tsx';

const Chart = lazy(async () => ({ default: (await import('./time-series-chart.tsx')).TimeSeriesChart }));

/** The chart, with its library fetched when the first one is shown. Use this one on pages. */
export function LazyTimeSeriesChart(props: TimeSeriesChartProps) {
  return (
    <Suspense
      fallback={<LoadingFace label="Fetching the chart" rows={1} rowHeight={(props.height ?? 190) + 62} />}
    >
      <Chart {...props} />
    </Suspense>
  );
}
