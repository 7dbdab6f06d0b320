import type { Calibration, Verdict } from '../../../../../shared/contracts/calibrations.ts';
import { capitalise, OUTCOME_LABELS } from '../../../../../shared/format/labels.ts';
import { formatNumber, formatSigned } from '../../../../../shared/format/numbers.ts';
import {
  benchConductivity,
  benchUnit,
  decimalsOf,
  verdictStrip,
} from '../../../../../shared/format/calibration-words.ts';
import { ToleranceStrip } from '../../../components/strip/tolerance-strip.tsx';
import { useIsNarrow } from '../../../lib/use-width.ts';
import { SectionTitle } from '../../../components/ui/page-head.tsx';

interface StateRow {
  name: string;
  verdict: Verdict | null;
  /** Instead of figures. */
  words: string | null;
}

/** As found, cleaned, as left: what the probe showed, what the solution is, and the error between them. */
export function ThreeStates({ run, isStacked = false }: { run: Calibration; isStacked?: boolean }) {
  const [ref, isNarrow] = useIsNarrow<HTMLElement>();
  const rows = stateRows(run);
  const unit = benchUnit(rows.map((row) => row.verdict?.meanUsCm ?? null));
  const strip = (row: StateRow) =>
    row.verdict ? (
      <ToleranceStrip {...verdictStrip(row.verdict, run.tolerancePercent, capitalise(row.name))} />
    ) : null;
  if (isStacked || isNarrow) {
    return (
      <div ref={ref}>
        {isStacked ? null : <SectionTitle>Three states</SectionTitle>}
        <ul className="three-states">
          {rows.map((row) => (
            <li key={row.name}>
              <b>{capitalise(row.name)}</b>
              {row.verdict ? (
                <>
                  <span>{errorWords(row.verdict)}</span>
                  {strip(row)}
                  <small>{OUTCOME_LABELS[row.verdict.outcome]}</small>
                </>
              ) : (
                <small>{row.words}</small>
              )}
            </li>
          ))}
        </ul>
      </div>
    );
  }
  return (
    <section ref={ref}>
      <SectionTitle note={`${unit}, raw, at the temperature of the solution`}>Three states</SectionTitle>
      <div className="run-table-frame">
        <table className="run-table">
          <thead>
            <tr>
              {['State', 'Probe', 'Reference', 'Error', 'U', 'Outcome', ''].map((head) => (
                <th key={head} scope="col">
                  {head}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {rows.map((row) =>
              row.verdict ? (
                <tr key={row.name}>
                  <td>{row.name}</td>
                  <td>{benchConductivity(row.verdict.meanUsCm, unit)}</td>
                  <td>{benchConductivity(row.verdict.referenceUsCm, unit)}</td>
                  <td>
                    {formatSigned(
                      row.verdict.errorPercent,
                      decimalsOf(row.verdict.expandedUncertaintyPercent),
                      '%',
                    )}
                  </td>
                  <td>
                    {formatNumber(row.verdict.expandedUncertaintyPercent, {
                      decimals: decimalsOf(row.verdict.expandedUncertaintyPercent),
                      unit: '%',
                    })}
                  </td>
                  <td className="is-words">{OUTCOME_LABELS[row.verdict.outcome]}</td>
                  <td>{strip(row)}</td>
                </tr>
              ) : (
                <tr key={row.name}>
                  <td>{row.name}</td>
                  <td colSpan={6} className="is-words">
                    {row.words}
                  </td>
                </tr>
              ),
            )}
          </tbody>
        </table>
      </div>
    </section>
  );
}

function errorWords(verdict: Verdict): string {
  const decimals = decimalsOf(verdict.expandedUncertaintyPercent);
  const U = formatNumber(verdict.expandedUncertaintyPercent, { decimals, unit: '%' });
  return `${formatSigned(verdict.errorPercent, decimals)} ± ${U}`;
}

function stateRows({ judgement, steps, secondLot }: Calibration): StateRow[] {
  const isDone = (step: string) => steps.some((one) => one.step === step && one.state === 'done');
  const missing = (step: string) => (isDone(step) ? 'not judged' : 'not reached');
  const rows: StateRow[] = [
    { name: 'as found', verdict: judgement.asFound, words: missing('as-found') },
    { name: 'cleaned', verdict: judgement.cleaned, words: missing('as-found-cleaned') },
    {
      name: 'as left',
      verdict: judgement.asLeftEqualsCleaned ? null : judgement.asLeft,
      words: judgement.asLeftEqualsCleaned ? 'not adjusted: as left equals cleaned' : missing('as-left'),
    },
  ];
  if (secondLot)
    rows.push({ name: 'second point', verdict: judgement.secondPoint, words: missing('second-point') });
  return rows;
}
