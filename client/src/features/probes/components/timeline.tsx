import { useInfiniteQuery } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import { useEffect, useMemo, useState } from 'react';
import type { ProbeEvent } from '../../../../../shared/contracts/probes.ts';
import { formatDate, formatDay, formatTime } from '../../../../../shared/format/dates.ts';
import { ToleranceStrip } from '../../../components/strip/tolerance-strip.tsx';
import { Button } from '../../../components/ui/button.tsx';
import { EmptyFace, FailedFace, LoadingFace } from '../../../components/ui/faces.tsx';
import { SectionTitle } from '../../../components/ui/page-head.tsx';
import { probeEvents } from '../api.ts';
import type { TimelineShape } from '../model.ts';
import { foldTimeline, runWords, stripInput, timelineShape } from '../model.ts';

/** About as many as stand beside the charts. */
const FIRST_LINES = 12;
const MORE_LINES = 24;

/** Everything that ever happened to a probe, newest first, each with the drawing it left. */
export function Timeline({ probeId, timeZone }: { probeId: number; timeZone: string }) {
  const query = useInfiniteQuery(probeEvents(probeId));
  const [lines, setLines] = useState(FIRST_LINES);
  const entries = useMemo(
    () => foldTimeline(query.data?.pages.flatMap((page) => page.items) ?? []),
    [query.data],
  );
  const { hasNextPage, isFetchingNextPage, fetchNextPage } = query;
  const isShort = entries.length < lines;
  useEffect(() => {
    // Routine checks fold into few lines: older events are fetched until what was asked for is there.
    if (isShort && hasNextPage && !isFetchingNextPage) void fetchNextPage();
  }, [isShort, hasNextPage, isFetchingNextPage, fetchNextPage]);
  return (
    <section>
      <SectionTitle note="newest first">Every event</SectionTitle>
      {query.isPending ? <LoadingFace label="Fetching the events" rows={6} rowHeight={64} /> : null}
      {query.isError && !query.data ? (
        <FailedFace title="Could not fetch the events." error={query.error} onRetry={() => query.refetch()} />
      ) : null}
      {query.data && entries.length === 0 ? <EmptyFace title="Nothing has happened yet." /> : null}
      <ol className="timeline">
        {entries
          .slice(0, lines)
          .map((entry) =>
            entry.kind === 'run' ? (
              <Run key={entry.key} events={entry.events} timeZone={timeZone} />
            ) : (
              <Event key={entry.event.key} event={entry.event} timeZone={timeZone} />
            ),
          )}
      </ol>
      {hasNextPage || entries.length > lines ? (
        <Button isPending={isFetchingNextPage} onClick={() => setLines(lines + MORE_LINES)}>
          Show earlier events
        </Button>
      ) : null}
    </section>
  );
}

interface LineProps {
  from: string;
  /** The day an entry over several days began. */
  until?: string;
  shape: TimelineShape;
  timeZone: string;
  children: ReactNode;
}

function Line({ from, until, shape, timeZone, children }: LineProps) {
  return (
    <li>
      <time dateTime={from}>
        {formatDate(from, { timeZone })}
        <small>{until ? `since ${formatDay(until, { timeZone })}` : formatTime(from, { timeZone })}</small>
      </time>
      <span className="timeline-glyph">
        <svg width="26" height="14" viewBox="0 0 26 14" aria-hidden="true">
          {GLYPHS[shape]}
        </svg>
      </span>
      <div>{children}</div>
    </li>
  );
}

function Event({ event, timeZone }: { event: ProbeEvent; timeZone: string }) {
  const who = [event.by, event.detail].filter(Boolean).join(' · ');
  return (
    <Line from={event.at} shape={timelineShape(event)} timeZone={timeZone}>
      <b>{event.title}</b>
      {who ? <small>{who}</small> : null}
      {event.strip ? <ToleranceStrip {...stripInput(event.strip)} /> : null}
    </Line>
  );
}

/** A run of routine checks in one line; its strip shows the newest with the ones before as its wake. */
function Run({ events, timeZone }: { events: ProbeEvent[]; timeZone: string }) {
  const [isOpen, setIsOpen] = useState(false);
  const [newest] = events;
  const oldest = events.at(-1);
  if (isOpen || !newest || !oldest) {
    return events.map((event) => <Event key={event.key} event={event} timeZone={timeZone} />);
  }
  return (
    <Line from={newest.at} until={oldest.at} shape="determined" timeZone={timeZone}>
      <b>{runWords(events)}</b>
      <Button kind="quiet" onClick={() => setIsOpen(true)}>
        Show each
      </Button>
      {newest.strip ? <ToleranceStrip {...stripInput(newest.strip)} /> : null}
    </Line>
  );
}

/** dot = determined, square = cleaning, step = adjustment; a post for where the probe stands. */
const GLYPHS: Readonly<Record<TimelineShape, ReactNode>> = {
  determined: <circle cx="13" cy="7" r="4.5" fill="var(--ink)" />,
  cleaned: (
    <rect x="9" y="3" width="8" height="8" fill="var(--sheet)" stroke="var(--ink)" strokeWidth="1.5" />
  ),
  adjusted: <path d="M4 11H13V3H22" fill="none" stroke="var(--ink)" strokeWidth="2" />,
  placed: <path d="M13 0V14M7 7H19" stroke="var(--ink)" strokeWidth="2" />,
  plain: <path d="M8 7H18" stroke="var(--ink)" strokeWidth="1.5" />,
};
