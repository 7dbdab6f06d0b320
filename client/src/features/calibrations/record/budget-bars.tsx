import type { Verdict } from '../../../../../shared/contracts/calibrations.ts';
import { formatNumber } from '../../../../../shared/format/numbers.ts';
import { decimalsOf } from '../../../../../shared/format/calibration-words.ts';
import { SectionTitle } from '../../../components/ui/page-head.tsx';

/** Longest bar, px; the others keep its proportion. */
const LONGEST_PX = 120;

/** What makes up U, largest first. */
export function BudgetBars({ verdict }: { verdict: Verdict }) {
  const rows = verdict.budget.toSorted((a, b) => b.standardUncertaintyPercent - a.standardUncertaintyPercent);
  const largest = rows[0]?.standardUncertaintyPercent || 1;
  const U = verdict.expandedUncertaintyPercent;
  return (
    <section>
      <SectionTitle note="standard uncertainties">What makes up U</SectionTitle>
      <table className="run-table">
        <tbody>
          {rows.map((row) => (
            <tr key={row.name}>
              <td className="is-words">{row.name}</td>
              <td aria-hidden="true">
                <span
                  className="budget-bar"
                  style={{ width: Math.max(1, (row.standardUncertaintyPercent / largest) * LONGEST_PX) }}
                />
              </td>
              <td className="is-number">
                {formatNumber(row.standardUncertaintyPercent, { decimals: 2, unit: '%' })}
              </td>
            </tr>
          ))}
          <tr>
            <td className="is-words" colSpan={2}>
              <b>Expanded, k = {formatNumber(Math.round(verdict.coverageFactor * 100) / 100)}</b>
            </td>
            <td className="is-number">
              <b>{formatNumber(U, { decimals: decimalsOf(U), unit: '%' })}</b>
            </td>
          </tr>
        </tbody>
      </table>
    </section>
  );
}
