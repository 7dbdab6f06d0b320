import { keepPreviousData, useInfiniteQuery } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import { useCallback, useMemo } from 'react';
import { Button } from '../../../components/ui/button.tsx';
import { EmptyFace, FailedFace, LoadingFace } from '../../../components/ui/faces.tsx';
import { PageHead } from '../../../components/ui/page-head.tsx';
import { VirtualLedger } from '../../../components/ui/virtual-ledger.tsx';
import { useAddressFilters } from '../../../lib/use-address-filters.ts';
import { useWidth } from '../../../lib/use-width.ts';
import { paths } from '../../../paths.ts';
import { probesList } from '../api.ts';
import { isNarrowed, listSentence, probeFilters, sortOf, sortText } from '../list-model.ts';
import { probeColumns, ProbePhoneRow } from './probe-list-cells.tsx';
import { ProbeListFilters } from './probe-list-filters.tsx';

export interface ProbeListProps {
  sites: readonly { id: number; name: string }[];
  /** The page's button, for those who may register a probe. */
  registerLink: ReactNode;
}

/** Every probe one may see: found by a part of its name, narrowed, ordered; thousands of rows scroll as one page. */
export function ProbeList({ sites, registerLink }: ProbeListProps) {
  const { read, write } = useAddressFilters();
  const filters = probeFilters(read);
  const query = useInfiniteQuery({ ...probesList(filters), placeholderData: keepPreviousData });
  const { fetchNextPage, hasNextPage, isFetchingNextPage } = query;
  const [ref, width] = useWidth<HTMLDivElement>(1360);
  const rows = useMemo(() => query.data?.pages.flatMap((page) => page.items) ?? [], [query.data]);
  const columns = useMemo(() => probeColumns(width), [width]);
  const fetchMore = useCallback(() => {
    if (hasNextPage && !isFetchingNextPage) void fetchNextPage();
  }, [fetchNextPage, hasNextPage, isFetchingNextPage]);
  const total = query.data?.pages[0]?.total;
  const siteName = sites.find((site) => site.id === filters.siteId)?.name ?? null;
  return (
    <>
      <PageHead
        name="Probes"
        sentence={total === undefined ? 'Fetching the probes.' : listSentence(total, filters, siteName)}
        aside={registerLink}
      />
      <ProbeListFilters sites={sites} filters={filters} onChange={write} />
      <div ref={ref} className={query.isPlaceholderData ? 'is-behind' : undefined}>
        {query.isPending ? <LoadingFace label="Fetching the probes" rows={12} /> : null}
        {query.isError && !query.data ? (
          <FailedFace
            title="Could not fetch the probes."
            error={query.error}
            onRetry={() => query.refetch()}
          />
        ) : null}
        {query.data ? (
          <VirtualLedger
            label="Probes"
            columns={columns}
            rows={rows}
            rowKey={(row) => row.id}
            rowHref={(row) => paths.probe.to({ id: row.id })}
            rowState={(row) => (row.trust.reason === 'held' ? 'held' : 'plain')}
            sort={sortOf(filters.sort ?? 'tag')}
            onSort={(sort) => write({ sort: sortText(sort) })}
            total={total ?? 0}
            onNearEnd={fetchMore}
            phone={(row) => <ProbePhoneRow row={row} />}
            empty={<NoProbe isNarrowed={isNarrowed(filters)} onClear={write} registerLink={registerLink} />}
          />
        ) : null}
        {query.isFetchNextPageError ? (
          <FailedFace
            title="Could not fetch the next probes."
            error={query.error}
            onRetry={() => fetchNextPage()}
          />
        ) : null}
      </div>
    </>
  );
}

interface NoProbeProps {
  isNarrowed: boolean;
  onClear: (changes: Record<string, null>) => void;
  registerLink: ReactNode;
}

function NoProbe({ isNarrowed, onClear, registerLink }: NoProbeProps) {
  if (!isNarrowed) {
    return (
      <EmptyFace title="No probe is registered yet." actions={registerLink}>
        Register a probe as its nameplate states it, install it at a measuring point, and issue its device
        credentials.
      </EmptyFace>
    );
  }
  const clear = () => onClear({ q: null, siteId: null, kind: null, status: null, trust: null });
  return (
    <EmptyFace title="No probe fits." actions={<Button onClick={clear}>Show all probes</Button>}>
      Search by a part of the tag, the serial number or the point, or take a filter away.
    </EmptyFace>
  );
}
