import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import type { LiveBoard, LiveRow } from '../../../../../shared/contracts/readings.ts';
import { ConnectionBanner } from '../../../components/layout/connection-banner.tsx';
import { Answer } from '../../../components/ui/answer.tsx';
import { LoadingFace } from '../../../components/ui/faces.tsx';
import { TrustMark } from '../../../components/ui/marks.tsx';
import { Clock } from '../../../components/ui/time.tsx';
import { useLatestReading } from '../../../lib/live-readings.ts';
import { useWatchSite } from '../../../lib/live-updates.ts';
import { useDocumentTitle } from '../../../lib/use-document-title.ts';
import { paths } from '../../../paths.ts';
import { liveBoard } from '../api.ts';
import {
  alarmWords,
  isQuiet,
  needsPersonNow,
  quantityOf,
  readingNow,
  rowState,
  valueState,
} from '../live-row.ts';
import { siteSentence } from '../sentence.ts';
import { ClockSkew, useServerNow } from './board-clock.tsx';
import { Sentence } from './sentence.tsx';

/** A site on a wall: the sentence large, what needs a person first, every point in one figure and one word. */
export function LiveWall({ siteId }: { siteId: number }) {
  const query = useQuery(liveBoard(siteId));
  useWatchSite(siteId);
  const skew = query.data ? Date.parse(query.data.at) - query.dataUpdatedAt : 0;
  return (
    <main className="wall">
      <ConnectionBanner />
      <ClockSkew value={skew}>
        <Answer
          query={query}
          what="the readings"
          loading={<LoadingFace label="Fetching the readings" rows={8} rowHeight={96} />}
        >
          {(board) => <Wall board={board} siteId={siteId} />}
        </Answer>
      </ClockSkew>
    </main>
  );
}

function Wall({ board, siteId }: { board: LiveBoard; siteId: number }) {
  const now = useServerNow();
  const [site] = board.sites;
  const name = site?.name ?? 'Live';
  useDocumentTitle(`${name}, wall display`);
  return (
    <>
      <header className="wall-head">
        <h1>
          <Link to={paths.liveSite.to({ siteId })}>{name}</Link>
        </h1>
        <p>
          <Sentence parts={siteSentence(board.rows, now)} />
        </p>
        <Clock timeZone={site?.timeZone ?? 'UTC'} />
      </header>
      {board.rows.filter(needsPersonNow).map((row) => (
        <section key={row.point.id} className="wall-slip" role="alert">
          <b>{row.point.name}: do not use this reading.</b> {alarmWords(row)}
        </section>
      ))}
      <ul className="wall-points">
        {board.rows.map((row) => (
          <WallPoint key={row.point.id} row={row} />
        ))}
      </ul>
    </>
  );
}

function WallPoint({ row }: { row: LiveRow }) {
  const latest = useLatestReading(row.probe?.id);
  const quantity = quantityOf(row, readingNow(row, latest));
  const state = valueState(row);
  return (
    <li className={`is-${rowState(row)}`}>
      <h2>{row.point.name}</h2>
      <p className={`wall-value is-${state}`}>
        <b>{quantity.value}</b>
        {state === 'plain' && quantity.uncertainty ? <span>± {quantity.uncertainty}</span> : null}
        <small>{quantity.unit}</small>
      </p>
      <p className="wall-trust">
        <TrustMark trust={row.trust.level} isHeld={isQuiet(row)} />
        {row.trust.level === 'fit' ? null : <span>{row.hold ? row.hold.userName : row.trust.text}</span>}
      </p>
    </li>
  );
}
