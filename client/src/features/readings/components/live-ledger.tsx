import type { ReactNode } from 'react';
import type { LiveRow } from '../../../../../shared/contracts/readings.ts';
import { StripHead } from '../../../components/strip/strip-head.tsx';
import { NameCell } from '../../../components/ui/figure.tsx';
import type { LedgerColumn } from '../../../components/ui/ledger-parts.tsx';
import { PhoneRow, RowLink } from '../../../components/ui/ledger-parts.tsx';
import { Ledger } from '../../../components/ui/ledger.tsx';
import { useWidth } from '../../../lib/use-width.ts';
import { probeNote, rowHref, rowState, valueFoot, valueHead } from '../live-row.ts';
import type { LiveActions } from './live-cells.tsx';
import {
  LiveAge,
  LiveStrip,
  LiveTemperature,
  LiveTrace,
  LiveTrust,
  LiveValue,
  LiveWork,
} from './live-cells.tsx';

export interface LiveLedgerProps extends LiveActions {
  label: string;
  rows: readonly LiveRow[];
  groupOf: (row: LiveRow) => string;
  empty?: ReactNode;
}

/** Container widths from which a column has room, px; narrower, the probe page shows what it held. */
const ROOM = { trace: 1200, work: 1060, temperature: 900 };

/** The points of one site, or of all, as ledger rows that follow the plant. */
export function LiveLedger({ label, rows, groupOf, empty, onHold, onRelease }: LiveLedgerProps) {
  const [ref, width] = useWidth<HTMLDivElement>(1360);
  const actions = { onHold, onRelease };
  return (
    <div ref={ref} className="live-ledger">
      <Ledger
        label={label}
        columns={columnsFor(width, valueHead(rows), actions)}
        rows={rows}
        rowKey={(row) => row.point.id}
        rowHref={rowHref}
        rowState={rowState}
        groupOf={groupOf}
        empty={empty}
        phone={(row) => <LivePhoneRow row={row} {...actions} />}
        foot={rows.length > 0 ? valueFoot(rows) : undefined}
      />
    </div>
  );
}

function columnsFor(width: number, head: string, actions: LiveActions): LedgerColumn<LiveRow>[] {
  const isTight = width < ROOM.temperature;
  const columns: (LedgerColumn<LiveRow> | false)[] = [
    {
      key: 'point',
      head: 'Point',
      width: isTight ? '190px' : '212px',
      cell: (row) => <NameCell name={row.point.name} note={probeNote(row)} />,
    },
    {
      key: 'value',
      head: <span className="live-value-head">{head}</span>,
      width: '244px',
      cell: (row) => <LiveValue row={row} />,
    },
    !isTight && {
      key: 'temperature',
      head: 'Temperature',
      width: '112px',
      cell: (row) => <LiveTemperature row={row} />,
    },
    {
      key: 'trust',
      head: 'Trust and reason',
      width: 'minmax(150px, 1fr)',
      cell: (row) => <LiveTrust row={row} />,
    },
    {
      key: 'strip',
      head: <StripHead />,
      headLabel: 'Last error between minus tolerance and plus tolerance',
      width: '150px',
      cell: (row) => <LiveStrip row={row} />,
    },
    width >= ROOM.trace && {
      key: 'trace',
      head: 'Two hours',
      width: '128px',
      cell: (row) => <LiveTrace row={row} />,
    },
    { key: 'age', head: 'Age', width: '70px', align: 'end', cell: (row) => <LiveAge row={row} /> },
    width >= ROOM.work && {
      key: 'work',
      head: 'Working there',
      width: '120px',
      cell: (row) => <LiveWork row={row} {...actions} />,
    },
  ];
  return columns.filter((column): column is LedgerColumn<LiveRow> => column !== false);
}

function LivePhoneRow({ row, onHold, onRelease }: { row: LiveRow } & LiveActions) {
  return (
    <PhoneRow
      name={
        <>
          <RowLink to={rowHref(row)}>
            <NameCell name={row.point.name} note={probeNote(row)} />
          </RowLink>
          <span className="live-phone-note">
            <LiveTemperature row={row} /> <LiveAge row={row} />
          </span>
        </>
      }
      value={<LiveValue row={row} isStacked />}
      trust={<LiveTrust row={row} />}
      strip={<LiveStrip row={row} />}
      more={row.hold ? <LiveWork row={row} onHold={onHold} onRelease={onRelease} /> : undefined}
    />
  );
}
