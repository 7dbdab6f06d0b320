import type { CSSProperties, ReactNode, Ref } from 'react';
import { memo } from 'react';
import { Link } from 'react-router-dom';
import { classNames } from './button.tsx';

export interface LedgerColumn<Row> {
  key: string;
  head: ReactNode;
  /** Width as a grid track: `212px`, `minmax(160px, 1fr)`, `8ch`. */
  width: string;
  cell: (row: Row) => ReactNode;
  /** `end` for integers and ages. Decimals stay at the start and align through <Figure>. */
  align?: 'start' | 'end';
  isSortable?: boolean;
  /** Spoken name where the head is a drawing or empty. */
  headLabel?: string;
}

export interface LedgerSort {
  key: string;
  direction: 'ascending' | 'descending';
}

export type LedgerRowState = 'plain' | 'held' | 'alarm';

export interface LedgerBaseProps<Row> {
  /** What the table lists, for screen readers. */
  label: string;
  columns: readonly LedgerColumn<Row>[];
  rows: readonly Row[];
  rowKey: (row: Row) => string | number;
  /** The page a row opens; the first cell's content becomes the link. */
  rowHref?: (row: Row) => string;
  /** held: sunk · alarm: between two lines. */
  rowState?: (row: Row) => LedgerRowState;
  sort?: LedgerSort | null;
  onSort?: (sort: LedgerSort) => void;
  /**
   * The row in a container under 600 px, usually <PhoneRow>. Without it the same cells are used, which only suits
   * ledgers of two narrow columns.
   */
  phone?: (row: Row) => ReactNode;
}

export function gridStyle<Row>(columns: readonly LedgerColumn<Row>[]): CSSProperties {
  return { '--columns': columns.map((column) => column.width).join(' ') } as CSSProperties;
}

interface LedgerHeadProps<Row> extends Pick<LedgerBaseProps<Row>, 'columns' | 'sort' | 'onSort'> {
  isSticky?: boolean;
}

export function LedgerHead<Row>({ columns, sort, onSort, isSticky = false }: LedgerHeadProps<Row>) {
  return (
    <div role="rowgroup" className={classNames('ledger-head-group', isSticky && 'is-sticky')}>
      <div role="row" className="ledger-head">
        {columns.map((column) => (
          <HeadCell key={column.key} column={column} sort={sort} onSort={onSort} />
        ))}
      </div>
    </div>
  );
}

interface HeadCellProps<Row> {
  column: LedgerColumn<Row>;
  sort: LedgerSort | null | undefined;
  onSort: ((sort: LedgerSort) => void) | undefined;
}

function HeadCell<Row>({ column, sort, onSort }: HeadCellProps<Row>) {
  const direction = sort?.key === column.key ? sort.direction : null;
  const isSortable = Boolean(column.isSortable && onSort);
  const next = direction === 'ascending' ? 'descending' : 'ascending';
  return (
    <div
      role="columnheader"
      className={classNames('ledger-cell', column.align === 'end' && 'is-end')}
      aria-label={column.headLabel}
      aria-sort={isSortable ? (direction ?? 'none') : undefined}
    >
      {isSortable ? (
        <button
          type="button"
          className={classNames('ledger-sort', direction && 'is-active')}
          onClick={() => onSort?.({ key: column.key, direction: next })}
        >
          {column.head}
          <SortArrow direction={direction} />
        </button>
      ) : (
        column.head
      )}
    </div>
  );
}

function SortArrow({ direction }: { direction: LedgerSort['direction'] | null }) {
  const up = 'M1 5l4-4 4 4';
  const down = 'M1 8l4 4 4-4';
  return (
    <svg width="10" height="13" viewBox="0 0 10 13" aria-hidden="true">
      <path
        d={direction === 'ascending' ? up : direction === 'descending' ? down : up + down}
        fill="none"
        stroke="currentColor"
        strokeWidth={direction ? 2 : 1}
      />
    </svg>
  );
}

interface LedgerRowProps<Row> extends Pick<
  LedgerBaseProps<Row>,
  'columns' | 'rowHref' | 'rowState' | 'phone'
> {
  row: Row;
  isNarrow: boolean;
  /** 1-based place in the whole table, where only a part is in the document. */
  index?: number;
  measure?: Ref<HTMLDivElement>;
  dataIndex?: number;
  offset?: number;
}

/** Memoised: while a long ledger scrolls, only the rows that come new are drawn. */
export const LedgerRow = memo(PlainLedgerRow) as typeof PlainLedgerRow;

function PlainLedgerRow<Row>(props: LedgerRowProps<Row>) {
  const { row, columns, rowHref, rowState, phone, isNarrow, index, measure, dataIndex, offset } = props;
  const state = rowState?.(row) ?? 'plain';
  const href = rowHref?.(row);
  const isPhone = isNarrow && phone !== undefined;
  return (
    <div
      role="row"
      ref={measure}
      aria-rowindex={index}
      data-index={dataIndex}
      style={offset === undefined ? undefined : { transform: `translateY(${offset}px)` }}
      className={classNames('ledger-row', state !== 'plain' && `is-${state}`, isPhone && 'is-phone')}
    >
      {isPhone ? (
        <div role="cell" aria-colspan={columns.length}>
          {phone(row)}
        </div>
      ) : (
        columns.map((column, i) => (
          <div
            key={column.key}
            role="cell"
            className={classNames('ledger-cell', column.align === 'end' && 'is-end')}
          >
            {i === 0 && href !== undefined ? (
              <RowLink to={href}>{column.cell(row)}</RowLink>
            ) : (
              column.cell(row)
            )}
          </div>
        ))
      )}
    </div>
  );
}

/** A link that covers its whole ledger row; use it for the name in a phone row. */
export function RowLink({ to, children }: { to: string; children: ReactNode }) {
  return (
    <Link to={to} className="ledger-link">
      {children}
    </Link>
  );
}

export interface PhoneRowProps {
  name: ReactNode;
  /** Value and U, right. */
  value?: ReactNode;
  /** Trust and reason. */
  trust?: ReactNode;
  /** The strip, right. */
  strip?: ReactNode;
  /** A third line over the whole width: who works there. */
  more?: ReactNode;
}

/** Two lines on a phone: name | value, then trust and reason | strip. */
export function PhoneRow({ name, value, trust, strip, more }: PhoneRowProps) {
  return (
    <div className="phone-row">
      <div>{name}</div>
      <div>{value}</div>
      {trust || strip ? (
        <>
          <div>{trust}</div>
          <div>{strip}</div>
        </>
      ) : null}
      {more ? <div className="phone-row-wide">{more}</div> : null}
    </div>
  );
}
