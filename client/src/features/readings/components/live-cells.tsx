import { useQueryClient } from '@tanstack/react-query';
import { useEffect } from 'react';
import type { LiveRow } from '../../../../../shared/contracts/readings.ts';
import { formatDateTime, formatDuration } from '../../../../../shared/format/dates.ts';
import { formatNumber } from '../../../../../shared/format/numbers.ts';
import { Trace } from '../../../components/charts/trace.tsx';
import { ToleranceStrip } from '../../../components/strip/tolerance-strip.tsx';
import { Button } from '../../../components/ui/button.tsx';
import { Figure, Quantity } from '../../../components/ui/figure.tsx';
import { TrustMark } from '../../../components/ui/marks.tsx';
import { useLatestReading } from '../../../lib/live-readings.ts';
import {
  isQuiet,
  isSurprising,
  quantityOf,
  readingNow,
  stripInput,
  tracePoints,
  traceState,
  valueState,
} from '../live-row.ts';
import { useServerNow } from './board-clock.tsx';

const TRACE_MS = 2 * 3_600_000;

export interface LiveValueProps {
  row: LiveRow;
  isStacked?: boolean;
  /** Characters that the column keeps for its figures. */
  room?: { whole: number; fraction: number };
}

/** Value and U, followed live; asks for the board again when a reading brings something new about its trust. */
export function LiveValue({ row, isStacked = false, room }: LiveValueProps) {
  const latest = useLatestReading(row.probe?.id);
  const isNews = isSurprising(row, latest);
  const queryClient = useQueryClient();
  useEffect(() => {
    if (isNews) void queryClient.invalidateQueries({ queryKey: ['readings', 'list'] });
  }, [isNews, queryClient]);
  return (
    <Quantity
      quantity={quantityOf(row, readingNow(row, latest))}
      state={valueState(row)}
      isStacked={isStacked}
      isLive
      {...room}
    />
  );
}

export function LiveTemperature({ row }: { row: LiveRow }) {
  const latest = useLatestReading(row.probe?.id);
  const isGone = row.trust.level === 'no-signal';
  const temperatureC = isGone ? null : readingNow(row, latest)?.temperatureC;
  const text = temperatureC == null ? null : formatNumber(temperatureC, { decimals: 1 });
  return (
    <span className="live-temperature">
      <Figure text={text} whole={3} fraction={2} />
      <small>°C</small>
    </span>
  );
}

export function LiveAge({ row }: { row: LiveRow }) {
  const latest = useLatestReading(row.probe?.id);
  const now = useServerNow();
  const at = readingNow(row, latest)?.at;
  if (!at) return <span className="live-age">–</span>;
  return (
    <time className="live-age" dateTime={at} title={formatDateTime(at, { seconds: true, offset: true })}>
      {formatDuration((now - Date.parse(at)) / 1000)}
    </time>
  );
}

export function LiveTrace({ row }: { row: LiveRow }) {
  const latest = useLatestReading(row.probe?.id);
  const now = useServerNow();
  return (
    <Trace
      points={tracePoints(row, readingNow(row, latest))}
      from={now - TRACE_MS}
      to={now}
      state={traceState(row)}
    />
  );
}

export function LiveTrust({ row }: { row: LiveRow }) {
  return <TrustMark trust={row.trust.level} isHeld={isQuiet(row)} reason={row.trust.text} />;
}

export function LiveStrip({ row }: { row: LiveRow }) {
  const input = stripInput(row.strip);
  return input ? <ToleranceStrip {...input} /> : <span className="live-no-result">no result yet</span>;
}

export interface LiveActions {
  onHold: (row: LiveRow) => void;
  onRelease: (row: LiveRow) => void;
}

/** Who works there, and the way to take a point or to put it back. */
export function LiveWork({ row, onHold, onRelease }: { row: LiveRow } & LiveActions) {
  if (row.hold) {
    return (
      <span className="live-work">
        <b>{row.hold.userName}</b>
        {row.can.release ? (
          <Button kind="quiet" onClick={() => onRelease(row)}>
            Put back…
          </Button>
        ) : (
          <small>{row.hold.reason}</small>
        )}
      </span>
    );
  }
  if (!row.can.hold) return null;
  return (
    <span className="live-work live-work-offer">
      <Button kind="quiet" aria-label={`Hold ${row.point.name}`} onClick={() => onHold(row)}>
        Hold…
      </Button>
    </span>
  );
}
