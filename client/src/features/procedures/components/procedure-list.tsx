import { useQuery } from '@tanstack/react-query';
import type { Procedure } from '../../../../../shared/contracts/procedures.ts';
import { formatDate } from '../../../../../shared/format/dates.ts';
import { capitalise, listInWords, PROBE_KIND_LABELS } from '../../../../../shared/format/labels.ts';
import { countInWords } from '../../../../../shared/format/numbers.ts';
import { Answer } from '../../../components/ui/answer.tsx';
import { EmptyFace, LoadingFace } from '../../../components/ui/faces.tsx';
import { NameCell } from '../../../components/ui/figure.tsx';
import type { LedgerColumn } from '../../../components/ui/ledger-parts.tsx';
import { PhoneRow, RowLink } from '../../../components/ui/ledger-parts.tsx';
import { Ledger } from '../../../components/ui/ledger.tsx';
import { PageHead } from '../../../components/ui/page-head.tsx';
import { paths } from '../../../paths.ts';
import { proceduresList } from '../api.ts';

const href = (one: Procedure) => paths.procedure.to({ id: one.id });
const kinds = (one: Procedure) =>
  capitalise(listInWords(one.probeKinds.map((kind) => PROBE_KIND_LABELS[kind])));

const COLUMNS: LedgerColumn<Procedure>[] = [
  {
    key: 'name',
    head: 'Procedure',
    width: 'minmax(280px, 2fr)',
    cell: (one) => <NameCell name={one.name} note={one.code} />,
  },
  {
    key: 'kinds',
    head: 'For probes',
    width: 'minmax(180px, 1fr)',
    cell: (one) => <span className="cell-say">{kinds(one)}</span>,
  },
  {
    key: 'steps',
    head: 'Steps',
    width: '80px',
    align: 'end',
    cell: (one) => <span className="cell-mono">{one.steps.length}</span>,
  },
  {
    key: 'version',
    head: 'Version',
    width: '220px',
    cell: (one) => (
      <span className="cell-say">
        version {one.version}
        <small>in force since {formatDate(one.effectiveFrom)}</small>
      </span>
    ),
  },
];

/** How runs are done, per kind of probe; each as its version in force. */
export function ProcedureList() {
  const query = useQuery(proceduresList());
  const count = query.data?.items.length;
  return (
    <>
      <PageHead
        name="Procedures"
        sentence={
          count === undefined
            ? 'Fetching the procedures.'
            : `${capitalise(countInWords(count))} in force. A run keeps the version it began with; a version never changes.`
        }
      />
      <Answer
        query={query}
        what="the procedures"
        loading={<LoadingFace label="Fetching the procedures" rows={3} />}
      >
        {({ items }) => (
          <Ledger
            label="Procedures in force"
            columns={COLUMNS}
            rows={items}
            rowKey={(one) => one.id}
            rowHref={href}
            phone={(one) => (
              <PhoneRow
                name={
                  <RowLink to={href(one)}>
                    <NameCell name={one.name} note={kinds(one)} />
                  </RowLink>
                }
                value={<span className="cell-mono">v{one.version}</span>}
              />
            )}
            empty={
              <EmptyFace title="No procedure is in force.">
                Two come with every installation; restore them from a backup or ask your administrator.
              </EmptyFace>
            }
          />
        )}
      </Answer>
    </>
  );
}
