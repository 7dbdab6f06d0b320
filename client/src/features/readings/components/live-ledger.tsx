import type { ReactNode } from 'react';
import type { LiveRow } from '../../../../../shared/contracts/readings.ts';
import { StripHead } from '../../../components/strip/strip-head.tsx';
import { NameCell } from '../../../components/ui/figure.tsx';
import type { LedgerColumn } from '../../../components/ui/ledger-parts.tsx';
import { PhoneRow, RowLink } from '../../../components/ui/ledger-parts.tsx';
import { Ledger } from '../../../components/ui/ledger.tsx';
import { useWidth } from '../../../lib/use-width.ts';
import { figureRoom, probeNote, rowHref, rowState, valueFoot, valueHead } from '../live-row.ts';
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

/** Container widths from which a column has room, px; narrower, temperature and age stand under the name. */
const ROOM = { trace: 1200, work: 1060, temperature: 900 };
/** A column of values with three characters after the point, and what each further one adds, px. */
const VALUE_WIDTH = { wide: 244, tight: 218, more: 21 };

/** The points of one site, or of all, as ledger rows that follow the plant. */
export function LiveLedger({ label, rows, groupOf, empty, onHold, onRelease }: LiveLedgerProps) {
  const [ref, width] = useWidth<HTMLDivElement>(1360);
  const actions = { onHold, onRelease };
  return (
    <div ref={ref} className="live-ledger">
      <Ledger
        label={label}
        columns={columnsFor(width, rows, actions)}
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

function columnsFor(width: number, rows: readonly LiveRow[], actions: LiveActions): LedgerColumn<LiveRow>[] {
  const isTight = width < ROOM.temperature;
  const room = figureRoom(rows);
  const valueWidth =
    (isTight ? VALUE_WIDTH.tight : VALUE_WIDTH.wide) +
    VALUE_WIDTH.more * (room.fraction - 3) +
    (VALUE_WIDTH.more / 2) * (room.whole - 5);
  const columns: (LedgerColumn<LiveRow> | false)[] = [
    {
      key: 'point',
      head: 'Point',
      width: isTight ? 'minmax(140px, 1fr)' : '212px',
      cell: (row) => (
        <>
          <NameCell name={row.point.name} note={probeNote(row)} />
          {isTight ? <NameNote row={row} /> : null}
        </>
      ),
    },
    {
      key: 'value',
      head: valueHead(rows),
      width: `${valueWidth}px`,
      cell: (row) => <LiveValue row={row} room={room} />,
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
      width: isTight ? 'minmax(130px, 1fr)' : 'minmax(150px, 1fr)',
      cell: (row) => <LiveTrust row={row} />,
    },
    {
      key: 'strip',
      head: <StripHead />,
      headLabel: 'Last error between minus tolerance and plus tolerance',
      width: isTight ? '130px' : '150px',
      cell: (row) => <LiveStrip row={row} />,
    },
    width >= ROOM.trace && {
      key: 'trace',
      head: 'Two hours',
      width: '128px',
      cell: (row) => <LiveTrace row={row} />,
    },
    !isTight && {
      key: 'age',
      head: 'Age',
      width: '70px',
      align: 'end',
      cell: (row) => <LiveAge row={row} />,
    },
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
          <NameNote row={row} />
        </>
      }
      value={<LiveValue row={row} isStacked />}
      trust={<LiveTrust row={row} />}
      strip={<LiveStrip row={row} />}
      more={row.hold ? <LiveWork row={row} onHold={onHold} onRelease={onRelease} /> : undefined}
    />
  );
}

/** Temperature and age, where they have no column of their own. */
function NameNote({ row }: { row: LiveRow }) {
  return (
    <span className="live-phone-note">
      <LiveTemperature row={row} /> <LiveAge row={row} />
    </span>
  );
}
