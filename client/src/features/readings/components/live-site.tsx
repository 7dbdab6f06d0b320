import { useQuery } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import type { LiveBoard } from '../../../../../shared/contracts/readings.ts';
import { Answer } from '../../../components/ui/answer.tsx';
import { EmptyFace, LoadingFace } from '../../../components/ui/faces.tsx';
import { PageHead } from '../../../components/ui/page-head.tsx';
import { Clock } from '../../../components/ui/time.tsx';
import { useWatchSite } from '../../../lib/live-updates.ts';
import { liveBoard } from '../api.ts';
import { siteSentence } from '../sentence.ts';
import { AlarmSlips } from './alarm-slips.tsx';
import { ClockSkew, useServerNow } from './board-clock.tsx';
import type { LiveActions } from './live-cells.tsx';
import { LiveLedger } from './live-ledger.tsx';
import { Sentence } from './sentence.tsx';

export interface LiveSiteProps extends LiveActions {
  siteId: number;
  /** Shown while the board is on its way. */
  name: string;
  /** The next step where no point is set up yet. */
  firstStep?: ReactNode;
  /** Beside the foot: the wall display. */
  more?: ReactNode;
  /** Where there is no such site, or not one this person may see. */
  missing: ReactNode;
}

/** One site: the situation in a sentence, what needs a person, every point as it reads now. */
export function LiveSite({ siteId, name, firstStep, more, missing, ...actions }: LiveSiteProps) {
  const query = useQuery(liveBoard(siteId));
  useWatchSite(siteId);
  const skew = query.data ? Date.parse(query.data.at) - query.dataUpdatedAt : 0;
  return (
    <ClockSkew value={skew}>
      <Answer
        query={query}
        what="the readings"
        missing={missing}
        loading={
          <>
            <PageHead name={name} sentence="Fetching what the probes say." isNamedInRail />
            <LoadingFace label="Fetching the readings" rows={12} />
          </>
        }
      >
        {(board) =>
          board.sites.length === 0 ? (
            missing
          ) : (
            <SiteBoard board={board} name={name} firstStep={firstStep} more={more} {...actions} />
          )
        }
      </Answer>
    </ClockSkew>
  );
}

function SiteBoard({ board, name, firstStep, more, onHold, onRelease }: SiteBoardProps) {
  const now = useServerNow();
  const [site] = board.sites;
  return (
    <>
      <PageHead
        name={site?.name ?? name}
        sentence={<Sentence parts={siteSentence(board.rows, now)} />}
        aside={<Clock timeZone={site?.timeZone ?? 'UTC'} />}
        isNamedInRail
      />
      <AlarmSlips rows={board.rows} onHold={onHold} />
      <LiveLedger
        label={`Readings at ${site?.name ?? name}`}
        rows={board.rows}
        groupOf={(row) => row.point.areaName}
        onHold={onHold}
        onRelease={onRelease}
        empty={
          <EmptyFace title="No measuring point is set up here yet." actions={firstStep}>
            A measuring point says what a reading decides and how far it may be off. Probes are installed at
            points.
          </EmptyFace>
        }
      />
      {more}
    </>
  );
}

type SiteBoardProps = Omit<LiveSiteProps, 'siteId' | 'missing'> & { board: LiveBoard };
