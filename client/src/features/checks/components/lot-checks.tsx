import { useInfiniteQuery } from '@tanstack/react-query';
import { useCallback, useMemo } from 'react';
import type { Check } from '../../../../../shared/contracts/checks.ts';
import { formatDate, formatTime } from '../../../../../shared/format/dates.ts';
import { capitalise, STAGE_LABELS } from '../../../../../shared/format/labels.ts';
import { formatCount } from '../../../../../shared/format/numbers.ts';
import { EmptyFace, FailedFace, LoadingFace } from '../../../components/ui/faces.tsx';
import { NameCell } from '../../../components/ui/figure.tsx';
import type { LedgerColumn } from '../../../components/ui/ledger-parts.tsx';
import { PhoneRow, RowLink } from '../../../components/ui/ledger-parts.tsx';
import { SectionTitle } from '../../../components/ui/page-head.tsx';
import { VirtualLedger } from '../../../components/ui/virtual-ledger.tsx';
import { paths } from '../../../paths.ts';
import { lotChecks } from '../lot-api.ts';
import { ErrorCell, OutcomeCell } from './checks-table.tsx';

/** What was compared with a lot: the list that a recall begins with. */
export function LotChecks({ standardId }: { standardId: number }) {
  const query = useInfiniteQuery(lotChecks(standardId));
  const { fetchNextPage, hasNextPage, isFetchingNextPage } = query;
  const rows = useMemo(() => query.data?.pages.flatMap((page) => page.items) ?? [], [query.data]);
  const fetchMore = useCallback(() => {
    if (hasNextPage && !isFetchingNextPage) void fetchNextPage();
  }, [fetchNextPage, hasNextPage, isFetchingNextPage]);
  const total = query.data?.pages[0]?.total ?? 0;
  return (
    <section className="mt-10">
      <SectionTitle note={query.data ? `${formatCount(total, 'comparison')}, newest first` : undefined}>
        Compared with this lot
      </SectionTitle>
      {query.isPending ? <LoadingFace label="Fetching the comparisons" rows={6} /> : null}
      {query.isError ? (
        <FailedFace
          title="Could not fetch the comparisons."
          error={query.error}
          onRetry={() => (query.data ? fetchNextPage() : query.refetch())}
        />
      ) : null}
      {query.data ? (
        <VirtualLedger
          label="Comparisons with this lot"
          columns={COLUMNS}
          rows={rows}
          rowKey={(check) => check.id}
          rowHref={(check) => paths.probe.to({ id: check.probeId })}
          total={total}
          onNearEnd={fetchMore}
          phone={(check) => <LotCheckPhoneRow check={check} />}
          empty={
            <EmptyFace title="Nothing was compared with it yet.">
              A reading taken in this solution, or a calibration with it, stands here with its outcome.
            </EmptyFace>
          }
        />
      ) : null}
    </section>
  );
}

const COLUMNS: LedgerColumn<Check>[] = [
  {
    key: 'probe',
    head: 'Probe',
    width: 'minmax(170px, 1fr)',
    cell: (check) => <NameCell name={check.probeTag} note={check.pointName ?? 'not installed'} />,
  },
  { key: 'at', head: 'When, UTC', width: '140px', cell: (check) => <When check={check} /> },
  {
    key: 'stage',
    head: 'Stage',
    width: 'minmax(140px, .8fr)',
    cell: (check) => (
      <span className="cell-say">
        {capitalise(STAGE_LABELS[check.stage])}
        {check.performedBy ? <small>{check.performedBy}</small> : null}
      </span>
    ),
  },
  { key: 'error', head: 'Error and U', width: '200px', cell: (check) => <ErrorCell check={check} /> },
  {
    key: 'outcome',
    head: 'Outcome',
    width: 'minmax(220px, 1.3fr)',
    cell: (check) => <OutcomeCell check={check} />,
  },
];

function When({ check }: { check: Check }) {
  return <NameCell isSmall name={formatDate(check.at)} note={formatTime(check.at)} />;
}

function LotCheckPhoneRow({ check }: { check: Check }) {
  return (
    <PhoneRow
      name={
        <RowLink to={paths.probe.to({ id: check.probeId })}>
          <NameCell name={check.probeTag} note={check.pointName ?? 'not installed'} />
        </RowLink>
      }
      value={<ErrorCell check={check} />}
      trust={<OutcomeCell check={check} />}
      strip={<When check={check} />}
    />
  );
}
