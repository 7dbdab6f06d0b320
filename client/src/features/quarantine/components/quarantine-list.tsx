import { useInfiniteQuery } from '@tanstack/react-query';
import { useCallback, useMemo } from 'react';
import type { QuarantinedMessage } from '../../../../../shared/contracts/quarantine.ts';
import { quarantineCodes } from '../../../../../shared/contracts/vocabulary.ts';
import { capitalise, QUARANTINE_LABELS } from '../../../../../shared/format/labels.ts';
import { formatBytes, formatCount } from '../../../../../shared/format/numbers.ts';
import { EmptyFace, FailedFace, LoadingFace } from '../../../components/ui/faces.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { NameCell } from '../../../components/ui/figure.tsx';
import { Filters, SearchField } from '../../../components/ui/filters.tsx';
import type { LedgerColumn } from '../../../components/ui/ledger-parts.tsx';
import { PhoneRow, RowLink } from '../../../components/ui/ledger-parts.tsx';
import { PageHead } from '../../../components/ui/page-head.tsx';
import { optionsFrom, Select } from '../../../components/ui/select.tsx';
import { Time } from '../../../components/ui/time.tsx';
import { VirtualLedger } from '../../../components/ui/virtual-ledger.tsx';
import { oneOf, useAddressFilters } from '../../../lib/use-address-filters.ts';
import { paths } from '../../../paths.ts';
import type { QuarantineFilters } from '../api.ts';
import { quarantineList } from '../api.ts';

const SHOWN = [
  { value: '', label: 'not dealt with' },
  { value: 'all', label: 'all of them' },
] as const;

/** Device messages that could not be used; each is kept as it came until somebody has looked at it, and after. */
export function QuarantineList() {
  const { read, write } = useAddressFilters();
  const filters = filtersFrom(read);
  const query = useInfiniteQuery(quarantineList(filters));
  const { fetchNextPage, hasNextPage, isFetchingNextPage } = query;
  const rows = useMemo(() => query.data?.pages.flatMap((page) => page.items) ?? [], [query.data]);
  const fetchMore = useCallback(() => {
    if (hasNextPage && !isFetchingNextPage) void fetchNextPage();
  }, [fetchNextPage, hasNextPage, isFetchingNextPage]);
  const search = useCallback((q: string) => write({ q }), [write]);
  const total = query.data?.pages[0]?.total;
  return (
    <>
      <PageHead name="Quarantine" sentence={sentenceFor(total, filters)} />
      <Filters label="Narrow the list of messages">
        <SearchField label="Find a topic" value={filters.q ?? ''} onSearch={search} />
        <Field label="Why it was set aside">
          <Select
            placeholder="any reason"
            options={optionsFrom(quarantineCodes, QUARANTINE_LABELS)}
            value={filters.code ?? ''}
            onChange={(event) => write({ code: event.target.value })}
          />
        </Field>
        <Field label="Show">
          <Select
            options={SHOWN}
            value={read('show')}
            onChange={(event) => write({ show: event.target.value })}
          />
        </Field>
      </Filters>
      {query.isPending ? <LoadingFace label="Fetching the messages" rows={6} /> : null}
      {query.isError ? (
        <FailedFace
          title="Could not fetch the messages."
          error={query.error}
          onRetry={() => (query.data ? fetchNextPage() : query.refetch())}
        />
      ) : null}
      {query.data ? (
        <VirtualLedger
          label="Messages in quarantine"
          columns={COLUMNS}
          rows={rows}
          rowKey={(row) => row.id}
          rowHref={(row) => paths.quarantinedMessage.to({ id: row.id })}
          total={total ?? 0}
          onNearEnd={fetchMore}
          phone={(row) => <MessagePhoneRow message={row} />}
          empty={
            <EmptyFace title={filters.open ? 'Nothing waits here.' : 'No message fits.'}>
              {filters.open
                ? 'Every message of a device was used, or somebody has dealt with it. A message that cannot be used is kept here with its reason.'
                : 'Take a filter away to see more.'}
            </EmptyFace>
          }
        />
      ) : null}
    </>
  );
}

function filtersFrom(read: (name: string) => string): QuarantineFilters {
  const code = oneOf(quarantineCodes, read('code'));
  return {
    ...(read('q') ? { q: read('q') } : {}),
    ...(code ? { code } : {}),
    ...(read('show') === 'all' ? {} : { open: '1' as const }),
  };
}

function sentenceFor(total: number | undefined, filters: QuarantineFilters): string {
  if (total === undefined) return 'Fetching the messages.';
  if (!filters.open) return `${capitalise(formatCount(total, 'message'))}, those dealt with included.`;
  if (total === 0) return 'No message of a device waits for somebody.';
  return `${capitalise(formatCount(total, 'message'))} could not be used and ${total === 1 ? 'waits' : 'wait'} for somebody. None is thrown away.`;
}

const COLUMNS: LedgerColumn<QuarantinedMessage>[] = [
  {
    key: 'at',
    head: 'Received, UTC',
    width: '180px',
    cell: (row) => (
      <NameCell isSmall name={<Time at={row.receivedAt} />} note={row.deviceName ?? 'device not known'} />
    ),
  },
  {
    key: 'why',
    head: 'Why it was set aside',
    width: 'minmax(220px, 1.4fr)',
    cell: (row) => <Why message={row} />,
  },
  {
    key: 'topic',
    head: 'Topic',
    width: 'minmax(200px, 1.2fr)',
    cell: (row) => <span className="cell-mono break-anywhere">{row.topic}</span>,
  },
  {
    key: 'size',
    head: 'Size',
    width: '90px',
    align: 'end',
    cell: (row) => <span className="cell-mono">{formatBytes(row.payloadBytes)}</span>,
  },
  { key: 'state', head: 'State', width: '150px', cell: (row) => <State message={row} /> },
];

function Why({ message }: { message: QuarantinedMessage }) {
  return (
    <span className="cell-say">
      <b>{capitalise(QUARANTINE_LABELS[message.code])}</b>
      <small>{message.reason}</small>
    </span>
  );
}

function State({ message }: { message: QuarantinedMessage }) {
  if (!message.resolvedAt) return <span className="cell-say is-care">waits</span>;
  return <span className="cell-say">dealt with</span>;
}

function MessagePhoneRow({ message }: { message: QuarantinedMessage }) {
  return (
    <PhoneRow
      name={
        <RowLink to={paths.quarantinedMessage.to({ id: message.id })}>
          <NameCell name={message.deviceName ?? 'device not known'} note={<Time at={message.receivedAt} />} />
        </RowLink>
      }
      value={<State message={message} />}
      more={<Why message={message} />}
    />
  );
}
