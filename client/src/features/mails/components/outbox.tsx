import { useInfiniteQuery } from '@tanstack/react-query';
import { useCallback, useMemo } from 'react';
import type { Mail } from '../../../../../shared/contracts/mails.ts';
import { capitalise } from '../../../../../shared/format/labels.ts';
import { formatCount } from '../../../../../shared/format/numbers.ts';
import { Button } from '../../../components/ui/button.tsx';
import { EmptyFace, FailedFace, LoadingFace } from '../../../components/ui/faces.tsx';
import { NameCell } from '../../../components/ui/figure.tsx';
import type { LedgerColumn } from '../../../components/ui/ledger-parts.tsx';
import { PhoneRow, RowLink } from '../../../components/ui/ledger-parts.tsx';
import { PageHead } from '../../../components/ui/page-head.tsx';
import { Time } from '../../../components/ui/time.tsx';
import { VirtualLedger } from '../../../components/ui/virtual-ledger.tsx';
import { idOf, useAddressFilters } from '../../../lib/use-address-filters.ts';
import { useWidth } from '../../../lib/use-width.ts';
import { paths } from '../../../paths.ts';
import { mailsList } from '../api.ts';
import { mailState } from '../model.ts';
import { MailText } from './mail-text.tsx';

/** From this width on the mail stands beside the list; narrower, it takes the list's place. */
const BESIDE_PX = 1200;

/** Every mail that left or waits to leave, with its text: where no mail server is set, this is where mail arrives. */
export function Outbox() {
  const { read, write } = useAddressFilters();
  const openId = idOf(read('mail'));
  const query = useInfiniteQuery(mailsList({}));
  const { fetchNextPage, hasNextPage, isFetchingNextPage } = query;
  const [ref, width] = useWidth<HTMLDivElement>(1360);
  const rows = useMemo(() => query.data?.pages.flatMap((page) => page.items) ?? [], [query.data]);
  const fetchMore = useCallback(() => {
    if (hasNextPage && !isFetchingNextPage) void fetchNextPage();
  }, [fetchNextPage, hasNextPage, isFetchingNextPage]);
  const open = rows.find((mail) => mail.id === openId);
  const total = query.data?.pages[0]?.total;
  const isBeside = width >= BESIDE_PX;
  return (
    <div ref={ref}>
      <PageHead name="Mail" sentence={sentenceFor(total, rows)} />
      {query.isPending ? <LoadingFace label="Fetching the mail" rows={6} /> : null}
      {query.isError ? (
        <FailedFace
          title="Could not fetch the mail."
          error={query.error}
          onRetry={() => (query.data ? fetchNextPage() : query.refetch())}
        />
      ) : null}
      {open && !isBeside ? (
        <MailText
          mail={open}
          closeButton={<Button onClick={() => write({ mail: null })}>Back to the list</Button>}
        />
      ) : null}
      {query.data && (!open || isBeside) ? (
        <div className={open ? 'list-and-detail' : undefined}>
          <VirtualLedger
            label="Mail"
            columns={columnsFor(open !== undefined)}
            rows={rows}
            rowKey={(mail) => mail.id}
            rowHref={(mail) => paths.mail.to({ mail: mail.id })}
            rowState={(mail) => (mail.id === openId ? 'held' : 'plain')}
            total={total ?? 0}
            onNearEnd={fetchMore}
            phone={(mail) => <MailPhoneRow mail={mail} />}
            empty={
              <EmptyFace title="No mail yet.">
                Invitations, password links and reports stand here with their text as soon as there are any.
              </EmptyFace>
            }
          />
          {open ? (
            <MailText
              mail={open}
              closeButton={<Button onClick={() => write({ mail: null })}>Close</Button>}
            />
          ) : null}
        </div>
      ) : null}
    </div>
  );
}

function sentenceFor(total: number | undefined, rows: readonly Mail[]) {
  if (total === undefined) return 'Fetching the mail.';
  const stuck = rows.filter((mail) => mailState(mail).isNotable).length;
  const all =
    total === 0 ? 'No mail was written yet.' : `${capitalise(formatCount(total, 'mail'))}, newest first.`;
  if (stuck === 0) return all;
  return (
    <>
      {all} <b>{capitalise(formatCount(stuck, 'mail'))} could not leave.</b>
    </>
  );
}

function columnsFor(isBeside: boolean): LedgerColumn<Mail>[] {
  const columns: (LedgerColumn<Mail> | false)[] = [
    {
      key: 'subject',
      head: 'Subject and recipient',
      width: 'minmax(220px, 1.4fr)',
      cell: (mail) => <NameCell name={mail.subject} note={mail.to} />,
    },
    {
      key: 'created',
      head: 'Written, UTC',
      width: '170px',
      cell: (mail) => (
        <span className="cell-mono">
          <Time at={mail.createdAt} />
        </span>
      ),
    },
    !isBeside && {
      key: 'state',
      head: 'State',
      width: 'minmax(200px, 1fr)',
      cell: (mail) => <State mail={mail} />,
    },
  ];
  return columns.filter((column): column is LedgerColumn<Mail> => column !== false);
}

function State({ mail }: { mail: Mail }) {
  const { text, isNotable } = mailState(mail);
  return <span className={isNotable ? 'cell-say is-care' : 'cell-say'}>{text}</span>;
}

function MailPhoneRow({ mail }: { mail: Mail }) {
  return (
    <PhoneRow
      name={
        <RowLink to={paths.mail.to({ mail: mail.id })}>
          <NameCell name={mail.subject} note={mail.to} />
        </RowLink>
      }
      more={<State mail={mail} />}
    />
  );
}
