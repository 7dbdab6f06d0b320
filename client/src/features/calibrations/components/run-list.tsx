import type { ReactNode } from 'react';
import type { CalibrationRow } from '../../../../../shared/contracts/calibrations.ts';
import { formatDateTime } from '../../../../../shared/format/dates.ts';
import { formatSigned } from '../../../../../shared/format/numbers.ts';
import { NameCell } from '../../../components/ui/figure.tsx';
import type { LedgerColumn } from '../../../components/ui/ledger-parts.tsx';
import { PhoneRow, RowLink } from '../../../components/ui/ledger-parts.tsx';
import { Ledger } from '../../../components/ui/ledger.tsx';
import { OutcomeMark } from '../../../components/ui/marks.tsx';
import { paths } from '../../../paths.ts';
import { STATUS_LABELS } from '../words.ts';

export interface RunListProps {
  label: string;
  rows: readonly CalibrationRow[];
  /** Zone of a row's site. */
  zoneOf: (siteId: number) => string;
  empty?: ReactNode;
}

const href = (row: CalibrationRow): string => paths.calibration.to({ id: row.id });

/** Calibrations as a ledger; a row opens the bench while it runs, else the record. */
export function RunList({ label, rows, zoneOf, empty }: RunListProps) {
  return (
    <Ledger
      label={label}
      columns={columnsFor(zoneOf)}
      rows={rows}
      rowKey={(row) => row.id}
      rowHref={href}
      isHeadSticky={false}
      phone={(row) => (
        <PhoneRow
          name={
            <RowLink to={href(row)}>
              <Name row={row} />
            </RowLink>
          }
          value={<Result row={row} />}
          more={`${row.performer}, ${formatDateTime(row.startedAt, { timeZone: zoneOf(row.siteId) })}, ${STATUS_LABELS[row.status]}`}
        />
      )}
      empty={empty}
    />
  );
}

function columnsFor(zoneOf: RunListProps['zoneOf']): LedgerColumn<CalibrationRow>[] {
  return [
    { key: 'name', head: 'Point', width: '330px', cell: (row) => <Name row={row} /> },
    { key: 'site', head: 'Site', width: '180px', cell: (row) => row.siteName },
    { key: 'who', head: 'By', width: '150px', cell: (row) => row.performer },
    {
      key: 'when',
      head: 'Began',
      width: '170px',
      cell: (row) => formatDateTime(row.startedAt, { timeZone: zoneOf(row.siteId) }),
    },
    { key: 'lot', head: 'Lot', width: '120px', cell: (row) => row.lotCode },
    { key: 'result', head: 'Found, cleaned', width: '220px', cell: (row) => <Result row={row} /> },
    { key: 'status', head: 'State', width: 'minmax(150px, 1fr)', cell: (row) => STATUS_LABELS[row.status] },
  ];
}

function Name({ row }: { row: CalibrationRow }) {
  return (
    <NameCell
      name={row.pointName}
      note={`${row.probeTag} · serial ${row.probeSerial}${row.number ? ` · ${row.number}` : ''}`}
    />
  );
}

function Result({ row }: { row: CalibrationRow }) {
  const error = row.cleanedErrorPercent ?? row.asFoundErrorPercent;
  if (row.outcome === null || error === null) return <span>–</span>;
  return (
    <span className="inline-flex items-center gap-2 font-mono">
      <OutcomeMark outcome={row.outcome} hasWords={false} />
      {formatSigned(error, 2, '%')}
      <span className="sr-only">{row.outcome}</span>
    </span>
  );
}
