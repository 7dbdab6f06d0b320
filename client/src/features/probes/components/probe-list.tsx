import { useInfiniteQuery } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import { useMemo } from 'react';
import type { ProbeRow } from '../../../../../shared/contracts/probes.ts';
import { PROBE_KIND_LABELS, PROBE_STATUS_LABELS } from '../../../../../shared/format/labels.ts';
import { formatCount, formatNumber } from '../../../../../shared/format/numbers.ts';
import { StripHead } from '../../../components/strip/strip-head.tsx';
import { ToleranceStrip } from '../../../components/strip/tolerance-strip.tsx';
import { Button } from '../../../components/ui/button.tsx';
import { EmptyFace, FailedFace, LoadingFace } from '../../../components/ui/faces.tsx';
import { Figure, NameCell } from '../../../components/ui/figure.tsx';
import type { LedgerColumn } from '../../../components/ui/ledger-parts.tsx';
import { PhoneRow, RowLink } from '../../../components/ui/ledger-parts.tsx';
import { TrustMark } from '../../../components/ui/marks.tsx';
import { PageHead } from '../../../components/ui/page-head.tsx';
import { Age } from '../../../components/ui/time.tsx';
import { VirtualLedger } from '../../../components/ui/virtual-ledger.tsx';
import { useWidth } from '../../../lib/use-width.ts';
import { paths } from '../../../paths.ts';
import type { ProbeFilters } from '../api.ts';
import { probesList } from '../api.ts';
import { isNarrowed, sortOf, sortText } from '../filters.ts';
import { isTrustQuiet, stripInput } from '../model.ts';
import { ProbeFilterBar } from './probe-filter-bar.tsx';

export interface ProbeListProps {
  filters: ProbeFilters;
  sites: readonly { id: number; name: string }[];
  onFilter: (name: keyof ProbeFilters, value: string) => void;
  onClear: () => void;
  /** Register a probe, for whoever may. */
  register?: ReactNode;
}

/** Every probe there is: found, narrowed and ordered by the server, drawn only where it is looked at. */
export function ProbeList({ filters, sites, onFilter, onClear, register }: ProbeListProps) {
  const query = useInfiniteQuery(probesList(filters));
  const rows = useMemo(() => query.data?.pages.flatMap((page) => page.items) ?? [], [query.data]);
  const total = query.data?.pages[0]?.total ?? 0;
  const { isFetchingNextPage, fetchNextPage } = query;
  return (
    <>
      <PageHead
        name="Probes"
        sentence={query.data ? sentenceFor(total, isNarrowed(filters)) : 'Fetching the probes.'}
        aside={register}
      />
      <ProbeFilterBar filters={filters} sites={sites} onChange={onFilter} />
      {query.isPending ? <LoadingFace label="Fetching the probes" rows={12} /> : null}
      {query.isError && !query.data ? (
        <FailedFace title="Could not fetch the probes." error={query.error} onRetry={() => query.refetch()} />
      ) : null}
      {query.data ? (
        <ProbeLedger
          rows={rows}
          total={total}
          filters={filters}
          onSort={(sort) => onFilter('sort', sort)}
          onNearEnd={() => {
            if (!isFetchingNextPage) void fetchNextPage();
          }}
          empty={
            isNarrowed(filters) ? (
              <EmptyFace
                title="No probe matches."
                actions={<Button onClick={onClear}>Show all probes</Button>}
              >
                Take a filter away, or look for a shorter part of the tag.
              </EmptyFace>
            ) : (
              <EmptyFace title="No probe is registered yet." actions={register}>
                Register one as its nameplate states it, install it at a measuring point, and issue its device
                credentials.
              </EmptyFace>
            )
          }
        />
      ) : null}
    </>
  );
}

function sentenceFor(total: number, isFiltered: boolean): string {
  if (isFiltered) return `${formatCount(total, 'probe')} ${total === 1 ? 'matches' : 'match'}.`;
  return `${formatCount(total, 'probe')} ${total === 1 ? 'is' : 'are'} registered, spare and retired ones included.`;
}

interface ProbeLedgerProps {
  rows: readonly ProbeRow[];
  total: number;
  filters: ProbeFilters;
  onSort: (sort: string) => void;
  onNearEnd: () => void;
  empty: ReactNode;
}

/** Container widths from which a column has room, px. */
const ROOM = { constant: 1200, heard: 1000, strip: 860 };

function ProbeLedger({ rows, total, filters, onSort, onNearEnd, empty }: ProbeLedgerProps) {
  const [ref, width] = useWidth<HTMLDivElement>(1360);
  return (
    <div ref={ref}>
      <VirtualLedger
        label="Probes"
        columns={columnsFor(width)}
        rows={rows}
        total={total}
        rowKey={(row) => row.id}
        rowHref={(row) => paths.probe.to({ id: row.id })}
        sort={sortOf(filters)}
        onSort={(sort) => onSort(sortText(sort))}
        onNearEnd={onNearEnd}
        phone={(row) => <ProbePhoneRow row={row} />}
        empty={empty}
      />
    </div>
  );
}

function columnsFor(width: number): LedgerColumn<ProbeRow>[] {
  const columns: (LedgerColumn<ProbeRow> | false)[] = [
    {
      key: 'tag',
      head: 'Tag',
      width: '150px',
      isSortable: true,
      cell: (row) => <NameCell name={row.tag} note={PROBE_KIND_LABELS[row.kind]} />,
    },
    {
      key: 'serial',
      head: 'Serial',
      width: '130px',
      isSortable: true,
      cell: (row) => <span className="cell-mono">{row.serial}</span>,
    },
    {
      key: 'point',
      head: 'Stands at',
      width: 'minmax(150px, 1fr)',
      isSortable: true,
      cell: (row) => <StandsAt row={row} />,
    },
    {
      key: 'trust',
      head: 'Trust and reason',
      width: 'minmax(170px, 1.2fr)',
      cell: (row) => <RowTrust row={row} />,
    },
    width >= ROOM.strip && {
      key: 'strip',
      head: <StripHead />,
      headLabel: 'Last error between minus tolerance and plus tolerance',
      width: '150px',
      cell: (row) => <RowStrip row={row} />,
    },
    width >= ROOM.constant && {
      key: 'constant',
      head: 'Cell constant, cm⁻¹',
      width: '160px',
      cell: (row) => (
        <span className="cell-mono">
          <Figure text={formatNumber(row.cellConstantPerCm, { decimals: 4 })} whole={3} fraction={5} />
        </span>
      ),
    },
    width >= ROOM.heard && {
      key: 'lastSeen',
      head: 'Last message',
      width: '120px',
      align: 'end',
      isSortable: true,
      cell: (row) => (
        <span className="live-age">
          <Age at={row.lastSeenAt} />
        </span>
      ),
    },
  ];
  return columns.filter((column): column is LedgerColumn<ProbeRow> => column !== false);
}

function StandsAt({ row }: { row: ProbeRow }) {
  if (!row.placement) {
    return (
      <span className="cell-pair">
        {PROBE_STATUS_LABELS[row.status]}
        <small>kept at {row.siteName}</small>
      </span>
    );
  }
  return (
    <span className="cell-pair">
      {row.placement.pointName}
      <small>
        {row.placement.siteName} · {row.placement.areaName}
      </small>
    </span>
  );
}

/** A probe that stands nowhere has no reading that could be trusted or not. */
function RowTrust({ row }: { row: ProbeRow }) {
  if (!row.placement) return <span className="live-no-result">–</span>;
  return <TrustMark trust={row.trust.level} isHeld={isTrustQuiet(row.trust)} reason={row.trust.text} />;
}

function RowStrip({ row }: { row: ProbeRow }) {
  return row.strip ? (
    <ToleranceStrip {...stripInput(row.strip)} />
  ) : (
    <span className="live-no-result">no result yet</span>
  );
}

function ProbePhoneRow({ row }: { row: ProbeRow }) {
  return (
    <PhoneRow
      name={
        <RowLink to={paths.probe.to({ id: row.id })}>
          <NameCell
            name={row.tag}
            note={`${PROBE_KIND_LABELS[row.kind]} · ${row.placement?.pointName ?? PROBE_STATUS_LABELS[row.status]}`}
          />
        </RowLink>
      }
      value={<span className="cell-mono">{row.serial}</span>}
      trust={<RowTrust row={row} />}
      strip={row.strip ? <RowStrip row={row} /> : undefined}
    />
  );
}
