import { useQuery } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';
import type { LiveBoard } from '../../../../../shared/contracts/readings.ts';
import { Answer } from '../../../components/ui/answer.tsx';
import { EmptyFace, LoadingFace } from '../../../components/ui/faces.tsx';
import { PageHead, SectionTitle } from '../../../components/ui/page-head.tsx';
import { Clock } from '../../../components/ui/time.tsx';
import { useWatchSites } from '../../../lib/live-updates.ts';
import { paths } from '../../../paths.ts';
import { liveBoard } from '../api.ts';
import { allSitesSentence, siteLine } from '../sentence.ts';
import { AlarmSlips } from './alarm-slips.tsx';
import { ClockSkew } from './board-clock.tsx';
import type { LiveActions } from './live-cells.tsx';
import { LiveLedger } from './live-ledger.tsx';
import { Sentence } from './sentence.tsx';
import { Shore } from './shore.tsx';

export interface LiveAllProps extends LiveActions {
  /** The next step where no site is set up yet. */
  firstStep?: ReactNode;
}

/** All sites: what needs a person first, then each site in a line. */
export function LiveAll({ firstStep, ...actions }: LiveAllProps) {
  const query = useQuery(liveBoard(null));
  useWatchSites(query.data?.sites.map((site) => site.id) ?? []);
  const skew = query.data ? Date.parse(query.data.at) - query.dataUpdatedAt : 0;
  return (
    <ClockSkew value={skew}>
      <Answer
        query={query}
        what="the readings"
        loading={
          <>
            <PageHead name="All sites" sentence="Fetching what the probes say." isNamedInRail />
            <LoadingFace label="Fetching the readings" rows={10} />
          </>
        }
      >
        {(board) => <AllBoard board={board} firstStep={firstStep} {...actions} />}
      </Answer>
    </ClockSkew>
  );
}

function AllBoard({ board, firstStep, ...actions }: LiveAllProps & { board: LiveBoard }) {
  if (board.sites.length === 0) {
    return (
      <>
        <PageHead name="All sites" isNamedInRail />
        <EmptyFace title="No site is set up yet." actions={firstStep}>
          A site has areas, areas have measuring points, and probes are installed at points.
        </EmptyFace>
      </>
    );
  }
  return (
    <>
      <PageHead
        name="All sites"
        sentence={<Sentence parts={allSitesSentence(board.sites)} />}
        aside={<Clock timeZone={board.sites[0]?.timeZone ?? 'UTC'} />}
        isNamedInRail
      />
      <AlarmSlips rows={board.rows} namesSite onHold={actions.onHold} />
      <SectionTitle>Sites</SectionTitle>
      <ul className="site-lines">
        {board.sites.map((site) => (
          <li key={site.id}>
            <Link to={paths.liveSite.to({ siteId: site.id })}>{site.name}</Link>
            <p>
              <Sentence parts={siteLine(site.counts)} />
            </p>
            <Shore counts={site.counts} />
          </li>
        ))}
      </ul>
      <SectionTitle note="do not use, then no signal, then use with care">Needs a person first</SectionTitle>
      <LiveLedger
        label="Readings that need a person first"
        rows={board.rows}
        groupOf={(row) => row.point.siteName}
        {...actions}
        empty={
          <EmptyFace title="Nothing needs a person.">
            Every reading is fit to use, or somebody is working on it already.
          </EmptyFace>
        }
      />
    </>
  );
}
