import { useQuery } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import type { Instrument } from '../../../../../shared/contracts/instruments.ts';
import { capitalise } from '../../../../../shared/format/labels.ts';
import { INSTRUMENT_KIND_LABELS } from '../../../../../shared/format/reference-labels.ts';
import { Answer } from '../../../components/ui/answer.tsx';
import { EmptyFace, LoadingFace } from '../../../components/ui/faces.tsx';
import { NameCell } from '../../../components/ui/figure.tsx';
import type { LedgerColumn } from '../../../components/ui/ledger-parts.tsx';
import { PhoneRow, RowLink } from '../../../components/ui/ledger-parts.tsx';
import { Ledger } from '../../../components/ui/ledger.tsx';
import { PageHead } from '../../../components/ui/page-head.tsx';
import { paths } from '../../../paths.ts';
import { instrumentsList } from '../api.ts';
import { instrumentsSentence, instrumentState, uncertaintyWords } from '../model.ts';

const href = (one: Instrument) => paths.instrument.to({ id: one.id });

function State({ instrument }: { instrument: Instrument }) {
  const state = instrumentState(instrument);
  return (
    <span className="cell-say">
      <span className={state.tone === 'care' ? 'is-care' : undefined}>{state.word}</span>
      <small>{state.note}</small>
    </span>
  );
}

const COLUMNS: LedgerColumn<Instrument>[] = [
  {
    key: 'code',
    head: 'Instrument',
    width: 'minmax(220px, 1fr)',
    cell: (one) => <NameCell name={one.code} note={one.name} />,
  },
  {
    key: 'u',
    head: 'U of its certificate',
    width: '220px',
    cell: (one) => <span className="cell-mono">{uncertaintyWords(one)}</span>,
  },
  {
    key: 'certificate',
    head: 'Certificate',
    width: '180px',
    cell: (one) => (
      <span className="cell-say">
        {one.certificateNumber}
        <small>{one.certificate ? 'file attached' : 'no file yet'}</small>
      </span>
    ),
  },
  { key: 'state', head: 'State', width: '200px', cell: (one) => <State instrument={one} /> },
  {
    key: 'runs',
    head: 'Runs',
    width: '70px',
    align: 'end',
    cell: (one) => <span className="cell-mono">{one.runCount}</span>,
  },
];

/** Meters, thermometers, cells, resistors and balances, with what each is good for today. */
export function InstrumentList({ addLink }: { addLink: ReactNode }) {
  const query = useQuery(instrumentsList());
  const sentence = query.data ? instrumentsSentence(query.data.items) : null;
  return (
    <>
      <PageHead
        name="Reference instruments"
        sentence={
          sentence === null ? (
            'Fetching the reference instruments.'
          ) : (
            <>
              {sentence.all} {sentence.exception ? <b>{sentence.exception}</b> : null}
            </>
          )
        }
        aside={addLink}
      />
      <Answer
        query={query}
        what="the reference instruments"
        loading={<LoadingFace label="Fetching the reference instruments" rows={6} />}
      >
        {({ items }) => (
          <Ledger
            label="Reference instruments"
            columns={COLUMNS}
            rows={items}
            rowKey={(one) => one.id}
            rowHref={href}
            groupOf={(one) => capitalise(INSTRUMENT_KIND_LABELS[one.kind])}
            phone={(one) => (
              <PhoneRow
                name={
                  <RowLink to={href(one)}>
                    <NameCell name={one.code} note={one.name} />
                  </RowLink>
                }
                value={<span className="cell-mono">{uncertaintyWords(one)}</span>}
                trust={<State instrument={one} />}
              />
            )}
            empty={
              <EmptyFace title="No reference instrument is registered yet." actions={addLink}>
                A run’s temperature is as good as its thermometer: register it with its certificate first.
              </EmptyFace>
            }
          />
        )}
      </Answer>
    </>
  );
}
