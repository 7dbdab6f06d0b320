import { useQuery } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import type { Standard } from '../../../../../shared/contracts/standards.ts';
import { formatDate } from '../../../../../shared/format/dates.ts';
import { formatNumber } from '../../../../../shared/format/numbers.ts';
import { Answer } from '../../../components/ui/answer.tsx';
import { EmptyFace, LoadingFace } from '../../../components/ui/faces.tsx';
import { NameCell, Quantity } from '../../../components/ui/figure.tsx';
import type { LedgerColumn } from '../../../components/ui/ledger-parts.tsx';
import { PhoneRow, RowLink } from '../../../components/ui/ledger-parts.tsx';
import { Ledger } from '../../../components/ui/ledger.tsx';
import { PageHead } from '../../../components/ui/page-head.tsx';
import { paths } from '../../../paths.ts';
import { standardsList } from '../api.ts';
import { certifiedNote, certifiedQuantity, inUseFirst, lotsSentence, solutionName } from '../model.ts';
import { LotStateWords } from './lot-state.tsx';

/** The lots of reference solution, those that may be used first. */
export function LotList({ addLink }: { addLink: ReactNode }) {
  const query = useQuery(standardsList());
  const sentence = query.data ? lotsSentence(query.data.items) : null;
  return (
    <>
      <PageHead
        name="Reference solutions"
        sentence={
          sentence ? (
            <>
              {sentence.all} <b>{sentence.exception}</b>
            </>
          ) : (
            'Fetching the lots.'
          )
        }
        aside={addLink}
      />
      <Answer query={query} what="the lots" loading={<LoadingFace label="Fetching the lots" rows={8} />}>
        {({ items }) => (
          <Ledger
            label="Lots of reference solution"
            columns={COLUMNS}
            rows={inUseFirst(items)}
            rowKey={(lot) => lot.id}
            rowHref={(lot) => paths.standard.to({ id: lot.id })}
            groupOf={(lot) => (lot.isUsable ? 'May be used today' : 'Not to be used')}
            phone={(lot) => <LotPhoneRow lot={lot} />}
            foot="U is expanded uncertainty as the certificate states it. Comparisons with a lot that may not be used are kept and do not count."
            empty={
              <EmptyFace title="No lot is registered yet." actions={addLink}>
                A comparison counts only with a registered, released lot: register the first one from its
                certificate.
              </EmptyFace>
            }
          />
        )}
      </Answer>
    </>
  );
}

const COLUMNS: LedgerColumn<Standard>[] = [
  {
    key: 'code',
    head: 'Lot',
    width: 'minmax(170px, .9fr)',
    cell: (lot) => <NameCell name={lot.code} note={lot.isInHouse ? 'prepared in house' : lot.producer} />,
  },
  {
    key: 'solution',
    head: 'Solution',
    width: 'minmax(200px, 1fr)',
    cell: (lot) => <span className="cell-mono">{solutionName(lot)}</span>,
  },
  { key: 'value', head: 'Value and U', width: '300px', cell: (lot) => <CertifiedValue lot={lot} /> },
  {
    key: 'state',
    head: 'State',
    width: 'minmax(200px, 1.3fr)',
    cell: (lot) => <LotStateWords lot={lot} />,
  },
  {
    key: 'expires',
    head: 'Last day',
    width: '120px',
    cell: (lot) => <span className="cell-mono">{formatDate(lot.expiresOn)}</span>,
  },
  {
    key: 'checks',
    head: 'Used in',
    width: '110px',
    align: 'end',
    cell: (lot) => (
      <span className="cell-mono">
        {formatNumber(lot.checkCount, { decimals: 0 })} <small>checks</small>
      </span>
    ),
  },
];

function CertifiedValue({ lot, isStacked = false }: { lot: Standard; isStacked?: boolean }) {
  const quantity = certifiedQuantity(lot);
  if (!quantity) return <span className="cell-say">by the table of its basis</span>;
  return (
    <span className="lot-value">
      <Quantity quantity={quantity} isStacked={isStacked} whole={7} fraction={3} />
      <small>{certifiedNote(lot)}</small>
    </span>
  );
}

function LotPhoneRow({ lot }: { lot: Standard }) {
  return (
    <PhoneRow
      name={
        <RowLink to={paths.standard.to({ id: lot.id })}>
          <NameCell name={lot.code} note={solutionName(lot)} />
        </RowLink>
      }
      value={<CertifiedValue lot={lot} isStacked />}
      more={<LotStateWords lot={lot} />}
    />
  );
}
