import type { ProbeRow } from '../../../../../shared/contracts/probes.ts';
import { PROBE_KIND_LABELS } from '../../../../../shared/format/labels.ts';
import { formatNumber } from '../../../../../shared/format/numbers.ts';
import { StripHead } from '../../../components/strip/strip-head.tsx';
import { ToleranceStrip } from '../../../components/strip/tolerance-strip.tsx';
import { Figure, NameCell } from '../../../components/ui/figure.tsx';
import type { LedgerColumn } from '../../../components/ui/ledger-parts.tsx';
import { PhoneRow, RowLink } from '../../../components/ui/ledger-parts.tsx';
import { TrustMark } from '../../../components/ui/marks.tsx';
import { Age } from '../../../components/ui/time.tsx';
import { paths } from '../../../paths.ts';
import { whereWords } from '../list-model.ts';
import { formatCellConstant, stripInput } from '../model.ts';

/** Widths of the list from which a column has room, px; narrower, the probe page shows what it held. */
const ROOM = { kind: 1060, cellConstant: 960, lastSeen: 760 };

export function probeColumns(width: number): LedgerColumn<ProbeRow>[] {
  const columns: (LedgerColumn<ProbeRow> | false)[] = [
    {
      key: 'tag',
      head: 'Probe',
      width: '176px',
      isSortable: true,
      cell: (row) => <NameCell name={row.tag} note={probeNote(row, width >= ROOM.kind)} />,
    },
    width >= ROOM.kind && {
      key: 'kind',
      head: 'Kind',
      width: '140px',
      cell: (row) => <span className="cell-say">{PROBE_KIND_LABELS[row.kind]}</span>,
    },
    {
      key: 'point',
      head: 'Where it stands',
      width: 'minmax(170px, 1fr)',
      isSortable: true,
      cell: (row) => <NameCell isSmall {...whereWords(row)} />,
    },
    {
      key: 'trust',
      head: 'Trust and reason',
      width: 'minmax(190px, 1.4fr)',
      cell: (row) => <RowTrust row={row} />,
    },
    {
      key: 'strip',
      head: <StripHead />,
      headLabel: 'Last error between minus tolerance and plus tolerance',
      width: '150px',
      cell: (row) => <RowStrip row={row} />,
    },
    width >= ROOM.cellConstant && {
      key: 'cellConstant',
      head: 'Cell constant, cm⁻¹',
      width: '184px',
      cell: (row) => (
        <Figure text={formatNumber(row.cellConstantPerCm, { decimals: 4 })} whole={6} fraction={5} />
      ),
    },
    width >= ROOM.lastSeen && {
      key: 'lastSeen',
      head: 'Last seen',
      width: '104px',
      align: 'end',
      isSortable: true,
      cell: (row) => <LastSeen row={row} />,
    },
  ];
  return columns.filter((column): column is LedgerColumn<ProbeRow> => column !== false);
}

function probeNote(row: ProbeRow, hasKindColumn: boolean): string {
  return hasKindColumn ? `serial ${row.serial}` : `${PROBE_KIND_LABELS[row.kind]} · ${row.serial}`;
}

function RowTrust({ row }: { row: ProbeRow }) {
  const { level, reason, text } = row.trust;
  return <TrustMark trust={level} isHeld={reason === 'held'} reason={text} />;
}

function RowStrip({ row }: { row: ProbeRow }) {
  if (!row.strip) return <span className="live-no-result">no result yet</span>;
  return <ToleranceStrip {...stripInput(row.strip)} />;
}

function LastSeen({ row }: { row: ProbeRow }) {
  return <span className="live-age">{row.lastSeenAt ? <Age at={row.lastSeenAt} /> : 'never'}</span>;
}

/** Two lines: which one and its cell constant, then trust and strip; under them where it stands. */
export function ProbePhoneRow({ row }: { row: ProbeRow }) {
  const where = whereWords(row);
  return (
    <PhoneRow
      name={
        <RowLink to={paths.probe.to({ id: row.id })}>
          <NameCell name={row.tag} note={`${PROBE_KIND_LABELS[row.kind]} · ${row.serial}`} />
        </RowLink>
      }
      value={<span className="cell-mono">{formatCellConstant(row.cellConstantPerCm)}</span>}
      trust={<RowTrust row={row} />}
      strip={<RowStrip row={row} />}
      more={
        <span className="cell-say">
          {where.name}, {where.note} · <LastSeen row={row} />
        </span>
      }
    />
  );
}
