import { useQuery } from '@tanstack/react-query';
import { useMemo, useState } from 'react';
import type { JudgedReading } from '../../../../../shared/contracts/readings.ts';
import type { DisplayUnit } from '../../../../../shared/contracts/vocabulary.ts';
import { formatDateTime } from '../../../../../shared/format/dates.ts';
import { DISPLAY_UNIT_LABELS } from '../../../../../shared/format/labels.ts';
import { formatConductivity, formatNumber } from '../../../../../shared/format/numbers.ts';
import { LazyTimeSeriesChart } from '../../../components/charts/lazy-time-series-chart.tsx';
import type { SeriesLimit } from '../../../components/charts/series-model.ts';
import { Answer } from '../../../components/ui/answer.tsx';
import { EmptyFace, LoadingFace } from '../../../components/ui/faces.tsx';
import { SectionTitle } from '../../../components/ui/page-head.tsx';
import { useNow } from '../../../components/ui/time.tsx';
import { useLiveReadings } from '../../../lib/live-readings.ts';
import { seriesDetail } from '../api.ts';
import type { Drawing, View } from '../series.ts';
import {
  dataOf,
  FIRST_SPAN_MS,
  liveDataOf,
  periodFetched,
  periodShown,
  RANGES,
  showsBandOfU,
  spanName,
  viewOf,
} from '../series.ts';

export interface ReadingChartProps {
  probeId: number;
  name: string;
  reading: JudgedReading | null;
  timeZone: string;
  /** Of the point the probe stands at. */
  point: {
    displayUnit: DisplayUnit;
    lowLimitUsCm: number | null;
    highLimitUsCm: number | null;
  } | null;
}

/** Readings of one probe, live and over two years, at most 1 000 points at a time. */
export function ReadingChart(props: ReadingChartProps) {
  const hasLive = useLiveReadings(props.probeId).length > 0;
  if (props.reading || hasLive) return <Chart {...props} />;
  return (
    <section>
      <SectionTitle>Reading</SectionTitle>
      <EmptyFace title="Never heard.">
        The first reading that its device sends opens this chart, without reloading the page.
      </EmptyFace>
    </section>
  );
}

function Chart({ probeId, name, reading, timeZone, point }: ReadingChartProps) {
  const [view, setView] = useState<View>({ kind: 'following', spanMs: FIRST_SPAN_MS });
  const now = useNow();
  const shown = periodShown(view, now);
  const query = useQuery(seriesDetail(probeId, periodFetched(view, now)));
  const unit = point ? DISPLAY_UNIT_LABELS[point.displayUnit] : unitFor(reading);
  const drawing = useDrawing(reading, unit, showsBandOfU(shown));
  const points = useMemo(() => (query.data ? dataOf(query.data, drawing) : []), [query.data, drawing]);
  const live = useLiveReadings(view.kind === 'following' ? probeId : null);
  const liveData = useMemo(() => liveDataOf(live, drawing), [live, drawing]);
  const limits = useLimits(point, drawing.factor);
  const basis = query.data?.referenceTemperatureC;
  return (
    <section>
      <SectionTitle note={noteFor(unit, basis, drawing, query.data?.bucketSeconds)}>
        Reading, {spanName(view)}
      </SectionTitle>
      {view.kind === 'fixed' ? (
        <p className="chart-period">
          {formatDateTime(view.from, { timeZone })} to {formatDateTime(view.to, { timeZone, offset: true })}
        </p>
      ) : null}
      <Answer
        query={query}
        what="the readings"
        loading={<LoadingFace label="Fetching the readings" rows={1} rowHeight={270} />}
      >
        {() => (
          <>
            {points.length + liveData.length === 0 ? (
              <p className="chart-empty">No reading was received in this period.</p>
            ) : null}
            <LazyTimeSeriesChart
              label={`Reading of ${name}`}
              unit={unit}
              decimals={decimalsFor(reading, unit)}
              points={points}
              live={liveData}
              from={shown.from}
              to={shown.to}
              now={now}
              limits={limits}
              timeZone={timeZone}
              height={210}
              ranges={RANGES}
              onRangeChange={(from, to) => setView(viewOf({ from, to }, now))}
            />
          </>
        )}
      </Answer>
    </section>
  );
}

type Unit = 'µS/cm' | 'mS/cm';
const factorOf = (unit: Unit) => (unit === 'mS/cm' ? 1000 : 1);

function unitFor(reading: JudgedReading | null): Unit {
  return formatConductivity({ conductivityUsCm: reading?.conductivityUsCm }).unit as Unit;
}

function decimalsFor(reading: JudgedReading | null, unit: Unit): number {
  if (!reading?.valueUsCm || !reading.expandedUncertaintyUsCm) return unit === 'mS/cm' ? 3 : 1;
  const { decimals } = formatConductivity({
    conductivityUsCm: reading.valueUsCm,
    expandedUncertaintyUsCm: reading.expandedUncertaintyUsCm,
    unit,
  });
  // One digit more than U deserves, so that the trace can be read between its steps.
  return decimals + 1;
}

function useDrawing(reading: JudgedReading | null, unit: Unit, isBandOfU: boolean): Drawing {
  const U = reading?.expandedUncertaintyUsCm ?? null;
  const value = reading?.valueUsCm ?? null;
  const relative = isBandOfU && U !== null && value ? Math.abs(U / value) : null;
  // Rounded, so that the drawing is not made again for every new reading.
  const relativeUncertainty = relative === null ? null : Math.round(relative * 1e4) / 1e4;
  return useMemo(() => ({ factor: factorOf(unit), relativeUncertainty }), [unit, relativeUncertainty]);
}

function useLimits(point: ReadingChartProps['point'], factor: number): readonly SeriesLimit[] {
  const low = point?.lowLimitUsCm ?? null;
  const high = point?.highLimitUsCm ?? null;
  return useMemo(
    () => [
      ...(low === null ? [] : [{ value: low / factor, label: 'low limit' }]),
      ...(high === null ? [] : [{ value: high / factor, label: 'high limit' }]),
    ],
    [low, high, factor],
  );
}

function noteFor(
  unit: Unit,
  basisC: number | null | undefined,
  drawing: Drawing,
  bucketSeconds: number | null | undefined,
): string {
  const at = basisC == null ? '' : ` at ${formatNumber(basisC, { unit: '°C' })}`;
  if (drawing.relativeUncertainty !== null) return `${unit}${at}, band is U`;
  return bucketSeconds == null ? `${unit}${at}` : `${unit}${at}, band is lowest to highest`;
}
