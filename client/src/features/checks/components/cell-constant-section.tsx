import { useInfiniteQuery } from '@tanstack/react-query';
import { useEffect, useMemo } from 'react';
import { CellConstantChart } from '../../../components/charts/cell-constant-chart.tsx';
import { EmptyFace, FailedFace, LoadingFace } from '../../../components/ui/faces.tsx';
import { SectionTitle } from '../../../components/ui/page-head.tsx';
import { probeChecks } from '../api.ts';
import { cellConstantHistory } from '../model.ts';

export interface CellConstantSectionProps {
  probeId: number;
  constants: readonly { cellConstantPerCm: number; fromAt: string }[];
  timeZone: string;
}

/** The cell constant as KCl solutions have shown it, against the channel of tolerance around the one in use. */
export function CellConstantSection({ probeId, constants, timeZone }: CellConstantSectionProps) {
  const query = useInfiniteQuery(probeChecks(probeId));
  const { hasNextPage, isFetchingNextPage, fetchNextPage } = query;
  useEffect(() => {
    // A history with its beginning cut off would show drift that never was.
    if (hasNextPage && !isFetchingNextPage) void fetchNextPage();
  }, [hasNextPage, isFetchingNextPage, fetchNextPage]);
  const updatedAt = query.dataUpdatedAt;
  const history = useMemo(
    () =>
      query.data
        ? cellConstantHistory(
            query.data.pages.flatMap((page) => page.items),
            constants,
            updatedAt,
            timeZone,
          )
        : null,
    [query.data, constants, updatedAt, timeZone],
  );
  return (
    <section>
      <SectionTitle note="as determined in KCl, with U; channel is the tolerance around the constant in use">
        Cell constant
      </SectionTitle>
      {query.isPending ? <LoadingFace label="Fetching the comparisons" rows={1} rowHeight={430} /> : null}
      {query.isError && !query.data ? (
        <FailedFace
          title="Could not fetch the comparisons."
          error={query.error}
          onRetry={() => query.refetch()}
        />
      ) : null}
      {query.data && !history ? (
        <EmptyFace title="Never compared yet.">
          The first comparison with a reference solution opens this history.
        </EmptyFace>
      ) : null}
      {history ? <CellConstantChart {...history} /> : null}
    </section>
  );
}
