import type { ReactNode } from 'react';
import { useIsNarrow } from '../../lib/use-width.ts';
import type { LedgerBaseProps } from './ledger-parts.tsx';
import { gridStyle, LedgerHead, LedgerRow } from './ledger-parts.tsx';
import { VisuallyHidden } from './visually-hidden.tsx';

export interface LedgerProps<Row> extends LedgerBaseProps<Row> {
  /** Name of the group a row belongs to; rows of one group stand together in the order given. */
  groupOf?: (row: Row) => string;
  /** Instead of rows when there are none: an <EmptyFace>. */
  empty?: ReactNode;
  /** Under the last row: what U is, how values were taken. */
  foot?: ReactNode;
  /** Head stays at the top of the window while rows pass. */
  isHeadSticky?: boolean;
}

/** A table as ledger rows: hairlines, group heads, one grid for head and body; two lines a row on a phone. */
export function Ledger<Row>(props: LedgerProps<Row>) {
  const { label, columns, rows, rowKey, groupOf, empty, foot, isHeadSticky = true, phone } = props;
  const [ref, isNarrow] = useIsNarrow<HTMLDivElement>();
  if (rows.length === 0 && empty) return empty;
  const groups = groupRows(rows, groupOf);
  const isPhone = isNarrow && phone !== undefined;
  return (
    <div className="ledger-frame" ref={ref}>
      <div role="table" aria-label={label} aria-colcount={columns.length} style={gridStyle(columns)}>
        {isPhone ? null : (
          <LedgerHead columns={columns} sort={props.sort} onSort={props.onSort} isSticky={isHeadSticky} />
        )}
        {groups.map((group) => (
          <div role="rowgroup" key={group.name} aria-label={group.name || undefined}>
            {group.name ? (
              <div role="row" className="ledger-group">
                <div role="cell" aria-colspan={columns.length}>
                  {group.name}
                </div>
              </div>
            ) : null}
            {group.rows.map((row) => (
              <LedgerRow
                key={rowKey(row)}
                row={row}
                columns={columns}
                rowHref={props.rowHref}
                rowState={props.rowState}
                phone={phone}
                isNarrow={isNarrow}
              />
            ))}
          </div>
        ))}
      </div>
      {rows.length === 0 ? <VisuallyHidden>No rows.</VisuallyHidden> : null}
      {foot ? <p className="ledger-foot">{foot}</p> : null}
    </div>
  );
}

interface RowGroup<Row> {
  name: string;
  rows: Row[];
}

/** Rows under the name of their group, groups in the order of their first row. */
export function groupRows<Row>(rows: readonly Row[], groupOf?: (row: Row) => string): RowGroup<Row>[] {
  const groups = new Map<string, Row[]>();
  for (const row of rows) {
    const name = groupOf?.(row) ?? '';
    const known = groups.get(name);
    if (known) known.push(row);
    else groups.set(name, [row]);
  }
  return [...groups].map(([name, members]) => ({ name, rows: members }));
}
