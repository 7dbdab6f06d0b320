import type { ReactNode } from 'react';

export interface ChartTableProps {
  caption: string;
  heads: readonly string[];
  rows: readonly { key: string | number; cells: readonly ReactNode[] }[];
}

/** The values of a chart, for whoever cannot or will not read the drawing. */
export function ChartTable({ caption, heads, rows }: ChartTableProps) {
  return (
    // Focusable, because a region that scrolls must be reachable by keyboard.
    <div className="chart-table" tabIndex={0} role="region" aria-label={caption}>
      <table>
        <caption className="sr-only">{caption}</caption>
        <thead>
          <tr>
            {heads.map((head) => (
              <th key={head} scope="col">
                {head}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <tr key={row.key}>
              {row.cells.map((cell, i) => (
                <td key={heads[i]}>{cell}</td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}

/** Drawing or values: a pressed-state button. */
export function TableToggle({ isTable, onToggle }: { isTable: boolean; onToggle: () => void }) {
  return (
    <button type="button" className="chart-tool chart-tools-end" aria-pressed={isTable} onClick={onToggle}>
      {isTable ? 'Show as drawing' : 'Show as table'}
    </button>
  );
}
