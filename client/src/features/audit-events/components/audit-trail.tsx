import { useInfiniteQuery } from '@tanstack/react-query';
import { useCallback, useMemo } from 'react';
import { capitalise } from '../../../../../shared/format/labels.ts';
import { formatCount } from '../../../../../shared/format/numbers.ts';
import { Button } from '../../../components/ui/button.tsx';
import { EmptyFace, FailedFace, LoadingFace } from '../../../components/ui/faces.tsx';
import { PageHead } from '../../../components/ui/page-head.tsx';
import { VirtualLedger } from '../../../components/ui/virtual-ledger.tsx';
import { idOf, oneOf, useAddressFilters } from '../../../lib/use-address-filters.ts';
import type { AuditFilters } from '../api.ts';
import { auditEventsList } from '../api.ts';
import { dayBounds } from '../model.ts';
import { ACTION_WORDS, OBJECT_WORDS } from '../words.ts';
import { AuditFilterBar } from './audit-filter-bar.tsx';
import { AUDIT_COLUMNS, AuditPhoneRow } from './audit-cells.tsx';
import { IntegrityCheck } from './integrity-check.tsx';

export interface AuditTrailProps {
  /** Whom the trail can be narrowed to; empty where the list of people is not for this reader. */
  people: readonly { id: number; name: string }[];
}

const KINDS = Object.keys(OBJECT_WORDS);
const ACTIONS = Object.keys(ACTION_WORDS);
const CLEARED = { objectKind: null, objectId: null, action: null, actorId: null, from: null, to: null };

/** Who did what, when, why, and what it was before; nothing here can be changed by anybody. */
export function AuditTrail({ people }: AuditTrailProps) {
  const { read, write } = useAddressFilters();
  const filters = filtersFrom(read);
  const query = useInfiniteQuery(auditEventsList(filters));
  const { fetchNextPage, hasNextPage, isFetchingNextPage } = query;
  const rows = useMemo(() => query.data?.pages.flatMap((page) => page.items) ?? [], [query.data]);
  const fetchMore = useCallback(() => {
    if (hasNextPage && !isFetchingNextPage) void fetchNextPage();
  }, [fetchNextPage, hasNextPage, isFetchingNextPage]);
  const total = query.data?.pages[0]?.total;
  const isNarrowed = Object.keys(filters).length > 0;
  return (
    <>
      <PageHead
        name="Audit trail"
        sentence={
          total === undefined
            ? 'Fetching the audit trail.'
            : `${capitalise(formatCount(total, 'entry', 'entries'))}${isNarrowed ? ' that fit' : ''}, newest first. Each carries the hash of the one before; none can be changed or deleted.`
        }
      />
      <IntegrityCheck />
      <AuditFilterBar people={people} isNarrowed={isNarrowed} read={read} onChange={write} />
      {query.isPending ? <LoadingFace label="Fetching the audit trail" rows={10} /> : null}
      {query.isError ? (
        <FailedFace
          title="Could not fetch the audit trail."
          error={query.error}
          onRetry={() => (query.data ? fetchNextPage() : query.refetch())}
        />
      ) : null}
      {query.data ? (
        <VirtualLedger
          label="Audit trail"
          columns={AUDIT_COLUMNS}
          rows={rows}
          rowKey={(event) => event.sequence}
          rowHeight={56}
          phoneRowHeight={150}
          total={total ?? 0}
          onNearEnd={fetchMore}
          phone={(event) => <AuditPhoneRow event={event} />}
          empty={
            <EmptyFace
              title={isNarrowed ? 'No entry fits.' : 'Nothing was recorded yet.'}
              actions={isNarrowed ? <Button onClick={() => write(CLEARED)}>Show all entries</Button> : null}
            >
              Every creation, change, sign-in and change of rights is entered here by itself.
            </EmptyFace>
          }
        />
      ) : null}
    </>
  );
}

function filtersFrom(read: (name: string) => string): AuditFilters {
  const objectKind = oneOf(KINDS, read('objectKind'));
  const action = oneOf(ACTIONS, read('action'));
  const actorId = idOf(read('actorId'));
  return {
    ...(objectKind ? { objectKind } : {}),
    ...(read('objectId') ? { objectId: read('objectId').slice(0, 40) } : {}),
    ...(action ? { action } : {}),
    ...(actorId ? { actorId } : {}),
    ...dayBounds(read('from'), read('to')),
  };
}
