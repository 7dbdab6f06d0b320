import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import type { Bottle } from '../../../../../shared/contracts/bottles.ts';
import { formatNumber } from '../../../../../shared/format/numbers.ts';
import { Answer } from '../../../components/ui/answer.tsx';
import { Button } from '../../../components/ui/button.tsx';
import { EmptyFace, LoadingFace } from '../../../components/ui/faces.tsx';
import { NameCell } from '../../../components/ui/figure.tsx';
import type { LedgerColumn } from '../../../components/ui/ledger-parts.tsx';
import { PhoneRow } from '../../../components/ui/ledger-parts.tsx';
import { Ledger } from '../../../components/ui/ledger.tsx';
import { SectionTitle } from '../../../components/ui/page-head.tsx';
import { bottlesOfLot } from '../api.ts';
import { atHandFirst, bottlesSentence, bottleState } from '../model.ts';
import { DiscardDialog, OpenDialog, RemainingDialog } from './bottle-dialogs.tsx';
import { LabelDialog } from './label-dialog.tsx';
import { ReceiveDialog } from './receive-dialog.tsx';

export interface BottleSectionProps {
  lot: { id: number; code: string; openedLifeDays: number | null };
  sites: readonly { id: number; name: string }[];
  canReceive: boolean;
}

type Asked = { what: 'receive' } | { what: 'open' | 'remaining' | 'discard' | 'label'; bottle: Bottle };
/** Discarded bottles stay in the list; a lot in use for a year has many. */
const SHOWN_AT_FIRST = 8;

/** The bottles of a lot: receive, open, say what is left, discard, print the label. */
export function BottleSection({ lot, sites, canReceive }: BottleSectionProps) {
  const query = useQuery(bottlesOfLot(lot.id));
  const [asked, setAsked] = useState<Asked | null>(null);
  const [isWhole, setIsWhole] = useState(false);
  const close = () => setAsked(null);
  const receive = canReceive ? (
    <Button onClick={() => setAsked({ what: 'receive' })}>Receive bottles…</Button>
  ) : null;
  return (
    <section className="mt-10">
      <SectionTitle note={query.data ? bottlesSentence(query.data.items) : undefined}>Bottles</SectionTitle>
      <Answer
        query={query}
        what="the bottles"
        loading={<LoadingFace label="Fetching the bottles" rows={3} />}
      >
        {({ items }) => {
          const rows = atHandFirst(items);
          return (
            <>
              <Ledger
                label="Bottles of this lot"
                columns={columnsFor(setAsked)}
                rows={isWhole ? rows : rows.slice(0, SHOWN_AT_FIRST)}
                rowKey={(bottle) => bottle.id}
                isHeadSticky={false}
                phone={(bottle) => <BottlePhoneRow bottle={bottle} onAsk={setAsked} />}
                empty={
                  <EmptyFace title="No bottle of this lot is in stock." actions={receive}>
                    Each bottle gets a number and a label to scan; its time begins when it is opened.
                  </EmptyFace>
                }
              />
              {rows.length > 0 ? (
                <div className="page-buttons mt-4 justify-start">
                  {receive}
                  {rows.length > SHOWN_AT_FIRST && !isWhole ? (
                    <Button kind="quiet" onClick={() => setIsWhole(true)}>
                      Show all {rows.length}
                    </Button>
                  ) : null}
                </div>
              ) : null}
            </>
          );
        }}
      </Answer>
      {asked?.what === 'receive' ? <ReceiveDialog lot={lot} sites={sites} onClose={close} /> : null}
      {asked?.what === 'open' ? <OpenDialog bottle={asked.bottle} lot={lot} onClose={close} /> : null}
      {asked?.what === 'remaining' ? <RemainingDialog bottle={asked.bottle} onClose={close} /> : null}
      {asked?.what === 'discard' ? <DiscardDialog bottle={asked.bottle} onClose={close} /> : null}
      {asked?.what === 'label' ? <LabelDialog bottle={asked.bottle} onClose={close} /> : null}
    </section>
  );
}

type Ask = (asked: Asked) => void;

function State({ bottle }: { bottle: Bottle }) {
  const state = bottleState(bottle);
  return (
    <span className="cell-say">
      <span className={state.tone === 'plain' ? undefined : `is-${state.tone}`}>{state.word}</span>
      <small>{state.note}</small>
    </span>
  );
}

function Actions({ bottle, onAsk }: { bottle: Bottle; onAsk: Ask }) {
  const { can } = bottle;
  return (
    <span className="row-buttons">
      {can.open ? <Button onClick={() => onAsk({ what: 'open', bottle })}>Open…</Button> : null}
      {can.setRemaining ? (
        <Button onClick={() => onAsk({ what: 'remaining', bottle })}>What is left…</Button>
      ) : null}
      {can.discard ? (
        <Button kind="quiet" onClick={() => onAsk({ what: 'discard', bottle })}>
          Discard…
        </Button>
      ) : null}
      {bottle.discardedAt ? null : (
        <Button kind="quiet" onClick={() => onAsk({ what: 'label', bottle })}>
          Label
        </Button>
      )}
    </span>
  );
}

const left = (bottle: Bottle): string =>
  `${formatNumber(bottle.remainingMl, { decimals: 0 })} of ${formatNumber(bottle.volumeMl, { decimals: 0, unit: 'mL' })}`;

const columnsFor = (onAsk: Ask): LedgerColumn<Bottle>[] => [
  {
    key: 'code',
    head: 'Bottle',
    width: '190px',
    cell: (bottle) => <NameCell name={bottle.code} note={bottle.siteName ?? 'no site'} />,
  },
  {
    key: 'left',
    head: 'Left',
    width: '150px',
    cell: (bottle) => <span className="cell-mono">{left(bottle)}</span>,
  },
  { key: 'state', head: 'State', width: 'minmax(220px, 1fr)', cell: (bottle) => <State bottle={bottle} /> },
  {
    key: 'actions',
    head: '',
    headLabel: 'What may be done',
    width: 'minmax(300px, auto)',
    align: 'end',
    cell: (bottle) => <Actions bottle={bottle} onAsk={onAsk} />,
  },
];

function BottlePhoneRow({ bottle, onAsk }: { bottle: Bottle; onAsk: Ask }) {
  return (
    <PhoneRow
      name={<NameCell name={bottle.code} note={bottle.siteName ?? 'no site'} />}
      value={<span className="cell-mono">{left(bottle)}</span>}
      trust={<State bottle={bottle} />}
      more={<Actions bottle={bottle} onAsk={onAsk} />}
    />
  );
}
