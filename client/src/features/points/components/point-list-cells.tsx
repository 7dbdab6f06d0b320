import type { Point } from '../../../../../shared/contracts/points.ts';
import { formatDate } from '../../../../../shared/format/dates.ts';
import { CRITICALITY_LABELS, DECISION_RULE_LABELS } from '../../../../../shared/format/labels.ts';
import { formatNumber } from '../../../../../shared/format/numbers.ts';
import { NameCell } from '../../../components/ui/figure.tsx';
import type { LedgerColumn } from '../../../components/ui/ledger-parts.tsx';
import { PhoneRow, RowLink } from '../../../components/ui/ledger-parts.tsx';
import { paths } from '../../../paths.ts';
import { limitWords } from '../model.ts';

/** Widths of the list from which a column has room, px. */
const ROOM = { duty: 1060, limits: 900, interval: 760 };

export function pointColumns(width: number): LedgerColumn<Point>[] {
  const columns: (LedgerColumn<Point> | false)[] = [
    {
      key: 'name',
      head: 'Point',
      width: 'minmax(190px, 1.1fr)',
      cell: (point) => <NameCell name={point.name} note={point.code} />,
    },
    {
      key: 'area',
      head: 'Where',
      width: 'minmax(140px, .8fr)',
      cell: (point) => <NameCell isSmall name={point.siteName} note={point.areaName} />,
    },
    width >= ROOM.duty && {
      key: 'duty',
      head: 'What it decides',
      width: 'minmax(180px, 1.3fr)',
      cell: (point) => (
        <span className="cell-say">
          {point.duty}
          <small>criticality {CRITICALITY_LABELS[point.criticality]}</small>
        </span>
      ),
    },
    { key: 'probe', head: 'Probe', width: '140px', cell: (point) => <ProbeCell point={point} /> },
    {
      key: 'tolerance',
      head: 'Tolerance',
      width: '222px',
      cell: (point) => <ToleranceCell point={point} />,
    },
    width >= ROOM.limits && {
      key: 'limits',
      head: 'Limits',
      width: '194px',
      cell: (point) => <span className="cell-mono">{limitWords(point) ?? '–'}</span>,
    },
    width >= ROOM.interval && {
      key: 'interval',
      head: 'Interval',
      width: '80px',
      align: 'end',
      cell: (point) => (
        <span className="cell-mono">{formatNumber(point.intervalDays, { decimals: 0, unit: 'd' })}</span>
      ),
    },
  ];
  return columns.filter((column): column is LedgerColumn<Point> => column !== false);
}

function ProbeCell({ point }: { point: Point }) {
  if (point.retiredAt) return <span className="cell-say">retired {formatDate(point.retiredAt)}</span>;
  if (!point.probe) return <span className="cell-say is-care">no probe</span>;
  return (
    <NameCell
      isSmall
      name={point.probe.tag}
      note={point.hold ? `held for ${point.hold.userName}` : point.probe.serial}
    />
  );
}

function ToleranceCell({ point }: { point: Point }) {
  return (
    <NameCell
      isSmall
      name={`± ${formatNumber(point.tolerancePercent, { unit: '%' })}`}
      note={DECISION_RULE_LABELS[point.decisionRule]}
    />
  );
}

export function PointPhoneRow({ point }: { point: Point }) {
  return (
    <PhoneRow
      name={
        <RowLink to={paths.point.to({ id: point.id })}>
          <NameCell name={point.name} note={`${point.siteName} · ${point.areaName}`} />
        </RowLink>
      }
      value={<span className="cell-mono">± {formatNumber(point.tolerancePercent, { unit: '%' })}</span>}
      trust={<span className="cell-say">{point.duty}</span>}
      strip={<ProbeCell point={point} />}
    />
  );
}
