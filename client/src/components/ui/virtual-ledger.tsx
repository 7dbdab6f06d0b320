import { useWindowVirtualizer } from '@tanstack/react-virtual';
import type { ReactNode } from 'react';
import { useEffect, useLayoutEffect, useRef, useState } from 'react';
import { useIsNarrow } from '../../lib/use-width.ts';
import type { LedgerBaseProps } from './ledger-parts.tsx';
import { gridStyle, LedgerHead, LedgerRow } from './ledger-parts.tsx';

export interface VirtualLedgerProps<Row> extends LedgerBaseProps<Row> {
  empty?: ReactNode;
  /** Rows there are in all, when more can be fetched. */
  total?: number;
  /** Called when the end comes near and more exists. */
  onNearEnd?: () => void;
  /** Expected heights, px; rows are measured once they are drawn. */
  rowHeight?: number;
  phoneRowHeight?: number;
}

/** Rows drawn beyond the window on either side, so that a quick scroll meets no gap. */
const OVERSCAN = 12;

/** The same ledger for thousands of rows: only what is near the window is in the document; the page itself scrolls. */
export function VirtualLedger<Row>(props: VirtualLedgerProps<Row>) {
  const {
    label,
    columns,
    rows,
    rowKey,
    empty,
    total,
    onNearEnd,
    rowHeight = 52,
    phoneRowHeight = 112,
    phone,
  } = props;
  const [ref, isNarrow] = useIsNarrow<HTMLDivElement>();
  const body = useRef<HTMLDivElement>(null);
  const isPhone = isNarrow && phone !== undefined;
  const top = useTopInPage(body, rows.length > 0);
  const virtual = useWindowVirtualizer({
    count: rows.length,
    estimateSize: () => (isPhone ? phoneRowHeight : rowHeight),
    overscan: OVERSCAN,
    scrollMargin: top,
    // A synchronous render for every scroll event would hold up the scrolling itself.
    useFlushSync: false,
    getItemKey: (index) => {
      const row = rows[index];
      return row === undefined ? index : rowKey(row);
    },
  });
  const items = virtual.getVirtualItems();
  const lastDrawn = items.at(-1)?.index ?? 0;
  const hasMore = total !== undefined && total > rows.length;
  useEffect(() => {
    if (hasMore && lastDrawn >= rows.length - OVERSCAN * 2) onNearEnd?.();
  }, [hasMore, lastDrawn, rows.length, onNearEnd]);

  if (rows.length === 0 && empty) return empty;
  return (
    <div className="ledger-frame" ref={ref}>
      <div
        role="table"
        aria-label={label}
        aria-rowcount={(total ?? rows.length) + 1}
        aria-colcount={columns.length}
        style={gridStyle(columns)}
      >
        {isPhone ? null : <LedgerHead columns={columns} sort={props.sort} onSort={props.onSort} isSticky />}
        <div role="rowgroup" ref={body} className="ledger-spacer" style={{ height: virtual.getTotalSize() }}>
          {items.map((item) => {
            const row = rows[item.index];
            if (row === undefined) return null;
            return (
              <LedgerRow
                key={item.key}
                row={row}
                columns={columns}
                rowHref={props.rowHref}
                rowState={props.rowState}
                phone={phone}
                isNarrow={isNarrow}
                index={item.index + 2}
                dataIndex={item.index}
                measure={virtual.measureElement}
                offset={item.start - top}
              />
            );
          })}
        </div>
      </div>
    </div>
  );
}

/** How far down the page the rows begin; heads above may grow when data arrives. */
function useTopInPage(ref: React.RefObject<HTMLElement | null>, isDrawn: boolean): number {
  const [top, setTop] = useState(0);
  useLayoutEffect(() => {
    const element = ref.current;
    if (!element || !isDrawn) return undefined;
    const measure = () => setTop(Math.round(element.getBoundingClientRect().top + window.scrollY));
    measure();
    const observer = new ResizeObserver(measure);
    observer.observe(document.body);
    return () => observer.disconnect();
  }, [ref, isDrawn]);
  return top;
}
