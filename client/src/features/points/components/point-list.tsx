import { useInfiniteQuery } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import { useCallback, useMemo } from 'react';
import { Button } from '../../../components/ui/button.tsx';
import { EmptyFace, FailedFace, LoadingFace } from '../../../components/ui/faces.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { Filters, SearchField } from '../../../components/ui/filters.tsx';
import { PageHead } from '../../../components/ui/page-head.tsx';
import { Select } from '../../../components/ui/select.tsx';
import { VirtualLedger } from '../../../components/ui/virtual-ledger.tsx';
import { idOf, oneOf, useAddressFilters } from '../../../lib/use-address-filters.ts';
import { useWidth } from '../../../lib/use-width.ts';
import { paths } from '../../../paths.ts';
import type { PointPageFilters } from '../api.ts';
import { pointPages } from '../api.ts';
import { pointsSentence } from '../model.ts';
import { pointColumns, PointPhoneRow } from './point-list-cells.tsx';

export interface PointListProps {
  sites: readonly { id: number; name: string }[];
  /** The page's button, for those who may add a point. */
  addLink: ReactNode;
}

const SHOWN = [
  { value: '', label: 'points in use' },
  { value: 'free', label: 'without a probe' },
  { value: 'retired', label: 'the retired ones as well' },
] as const;

/** Every measuring point one may see, in the order in which people walk. */
export function PointList({ sites, addLink }: PointListProps) {
  const { read, write } = useAddressFilters();
  const filters = pointFilters(read);
  const query = useInfiniteQuery(pointPages(filters));
  const { fetchNextPage, hasNextPage, isFetchingNextPage } = query;
  const [ref, width] = useWidth<HTMLDivElement>(1360);
  const rows = useMemo(() => query.data?.pages.flatMap((page) => page.items) ?? [], [query.data]);
  const columns = useMemo(() => pointColumns(width), [width]);
  const fetchMore = useCallback(() => {
    if (hasNextPage && !isFetchingNextPage) void fetchNextPage();
  }, [fetchNextPage, hasNextPage, isFetchingNextPage]);
  const search = useCallback((q: string) => write({ q }), [write]);
  const total = query.data?.pages[0]?.total;
  const siteName = sites.find((site) => site.id === filters.siteId)?.name ?? null;
  const clear = () => write({ q: null, siteId: null, show: null });
  return (
    <>
      <PageHead
        name="Measuring points"
        sentence={
          total === undefined ? 'Fetching the measuring points.' : pointsSentence(total, filters, siteName)
        }
        aside={addLink}
      />
      <Filters label="Narrow the list of measuring points" isNarrowed={Object.keys(filters).length > 0}>
        <SearchField
          label="Find a point"
          placeholder="name, code, area or probe"
          value={filters.q ?? ''}
          onSearch={search}
        />
        {sites.length > 1 ? (
          <Field label="Site">
            <Select
              placeholder="all sites"
              options={sites.map((site) => ({ value: String(site.id), label: site.name }))}
              value={String(filters.siteId ?? '')}
              onChange={(event) => write({ siteId: event.target.value })}
            />
          </Field>
        ) : null}
        <Field label="Show">
          <Select
            options={SHOWN}
            value={read('show')}
            onChange={(event) => write({ show: event.target.value })}
          />
        </Field>
      </Filters>
      <div ref={ref}>
        {query.isPending ? <LoadingFace label="Fetching the measuring points" rows={12} /> : null}
        {query.isError ? (
          <FailedFace
            title="Could not fetch the measuring points."
            error={query.error}
            onRetry={() => (query.data ? fetchNextPage() : query.refetch())}
          />
        ) : null}
        {query.data ? (
          <VirtualLedger
            label="Measuring points"
            columns={columns}
            rows={rows}
            rowKey={(row) => row.id}
            rowHref={(row) => paths.point.to({ id: row.id })}
            rowState={(row) => (row.hold ? 'held' : 'plain')}
            total={total ?? 0}
            onNearEnd={fetchMore}
            phone={(row) => <PointPhoneRow point={row} />}
            empty={
              Object.keys(filters).length > 0 ? (
                <EmptyFace title="No point fits." actions={<Button onClick={clear}>Show all points</Button>}>
                  Search by a part of the name, the code, the area or the probe’s tag, or take a filter away.
                </EmptyFace>
              ) : (
                <EmptyFace title="No measuring point is set up yet." actions={addLink}>
                  A measuring point says what a reading decides and how far it may be off. Probes are
                  installed at points.
                </EmptyFace>
              )
            }
          />
        ) : null}
      </div>
    </>
  );
}

function pointFilters(read: (name: string) => string): PointPageFilters {
  const show = oneOf(['free', 'retired'] as const, read('show'));
  const siteId = idOf(read('siteId'));
  return {
    ...(read('q') ? { q: read('q') } : {}),
    ...(siteId === undefined ? {} : { siteId }),
    ...(show === undefined ? {} : { [show]: '1' as const }),
  };
}
