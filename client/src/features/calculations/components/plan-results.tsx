import { useQuery } from '@tanstack/react-query';
import { useDeferredValue } from 'react';
import type { PlannedAnswer } from '../../../../../shared/contracts/calculations.ts';
import { formatConductivity, formatNumber, formatProbability } from '../../../../../shared/format/numbers.ts';
import { PageStrip } from '../../../components/strip/tolerance-strip.tsx';
import { DefinitionList } from '../../../components/ui/definition-list.tsx';
import { Figure } from '../../../components/ui/figure.tsx';
import type { LedgerColumn } from '../../../components/ui/ledger-parts.tsx';
import { Ledger } from '../../../components/ui/ledger.tsx';
import { SectionTitle } from '../../../components/ui/page-head.tsx';
import { plannedAnswerFor } from '../api.ts';
import { missingFields, missingWords, plannedStrip } from '../model.ts';
import type { ResultsOfProps } from './figure-results.tsx';
import { Results } from './results.tsx';

/** Whether a planned comparison could decide the tolerance, what U it would have, and where that comes from. */
export function PlanResults({ calculator, values, children }: ResultsOfProps) {
  const settled = useDeferredValue(values);
  const missing = missingFields(calculator.fields, settled);
  const query = useQuery(plannedAnswerFor(missing.length > 0 ? null : calculator.body(settled)));
  return (
    <Results query={query} waitsFor={missing.length > 0 ? missingWords(missing) : null} inputs={children}>
      {(answer) => <Plan answer={answer} tolerancePercent={Number(settled['tolerancePercent'])} />}
    </Results>
  );
}

function Plan({ answer, tolerancePercent }: { answer: PlannedAnswer; tolerancePercent: number }) {
  const percent = (value: number) => formatNumber(value, { significantDigits: 2, unit: '%' });
  const k = formatNumber(answer.coverageFactor, { significantDigits: 2 });
  return (
    <div className="plan">
      <p className="plan-sentence">
        <b>{answer.canDecide ? 'Yes.' : 'No.'}</b> {answer.sentence}
      </p>
      <PageStrip {...plannedStrip(answer, tolerancePercent)} />
      <DefinitionList
        items={[
          {
            term: 'Reference value',
            value: formatConductivity({
              conductivityUsCm: answer.referenceUsCm,
              decimalsWithoutUncertainty: 2,
            }).text,
          },
          {
            term: 'U of the comparison',
            value: `${percent(answer.expandedUncertaintyPercent)}, k = ${k}`,
          },
          {
            term: 'Within, clear up to',
            value:
              answer.acceptanceLimitPercent > 0
                ? `an error of ${percent(answer.acceptanceLimitPercent)}`
                : 'no error at all',
          },
          {
            term: 'Tolerance to U',
            value: formatNumber(answer.toleranceToUncertainty, { significantDigits: 2 }) + ' : 1',
          },
          {
            term: 'Risk at that limit',
            value: `${formatProbability(answer.probabilityOutsideAtLimit)} that the error is outside`,
          },
          { term: 'Source', value: answer.source },
        ]}
      />
      <SectionTitle note="standard contributions to the error, in per cent; share of u²">
        Where U comes from
      </SectionTitle>
      <Ledger
        label="Uncertainty budget"
        columns={BUDGET}
        rows={[...answer.budget].sort((a, b) => b.sharePercent - a.sharePercent)}
        rowKey={(row) => row.name}
        isHeadSticky={false}
      />
    </div>
  );
}

type BudgetRow = PlannedAnswer['budget'][number];

const BUDGET: LedgerColumn<BudgetRow>[] = [
  {
    key: 'name',
    head: 'Contribution',
    width: 'minmax(120px, 1fr)',
    cell: (row) => <span className="cell-say">{row.name}</span>,
  },
  {
    key: 'contribution',
    head: 'u, %',
    width: '96px',
    cell: (row) => (
      <Figure
        text={formatNumber(Math.abs(row.contributionPercent), { decimals: 3 })}
        whole={3}
        fraction={4}
      />
    ),
  },
  {
    key: 'share',
    head: 'Share, %',
    width: '92px',
    align: 'end',
    cell: (row) => <span className="cell-mono">{formatNumber(row.sharePercent, { decimals: 0 })}</span>,
  },
];
