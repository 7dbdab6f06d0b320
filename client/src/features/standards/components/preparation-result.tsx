import type { Preparation } from '../../../../../shared/contracts/preparations.ts';
import { capitalise } from '../../../../../shared/format/labels.ts';
import { formatConductivity, formatNumber } from '../../../../../shared/format/numbers.ts';
import { DefinitionList } from '../../../components/ui/definition-list.tsx';
import { Figure } from '../../../components/ui/figure.tsx';
import type { LedgerColumn } from '../../../components/ui/ledger-parts.tsx';
import { Ledger } from '../../../components/ui/ledger.tsx';
import { SectionTitle } from '../../../components/ui/page-head.tsx';

type BudgetLine = Preparation['budget'][number];

/** A part too small for a figure is still a part. */
const shareWords = (percent: number) =>
  percent < 0.5 ? '< 1\u00a0%' : formatNumber(percent, { decimals: 0, unit: '%' });

const BUDGET: LedgerColumn<BudgetLine>[] = [
  {
    key: 'name',
    head: 'Part of U',
    width: 'minmax(0, 1fr)',
    cell: (row) => <span className="cell-say">{row.name}</span>,
  },
  {
    key: 'contribution',
    head: 'u, µS/cm',
    width: '96px',
    cell: (row) => (
      <span className="cell-mono">
        <Figure text={formatNumber(row.contributionUsCm, { decimals: 3 })} whole={3} fraction={4} />
      </span>
    ),
  },
  {
    key: 'share',
    head: 'Share',
    width: '64px',
    align: 'end',
    cell: (row) => <span className="cell-mono">{shareWords(row.sharePercent)}</span>,
  },
];

const rowText = (conductivityUsCm: number) =>
  formatNumber(conductivityUsCm, { decimals: conductivityUsCm < 1000 ? 2 : 1 });

const TABLE: LedgerColumn<Preparation['temperatureTable'][number]>[] = [
  {
    key: 'temperature',
    head: 'Temperature, °C',
    width: '150px',
    cell: (row) => <span className="cell-mono">{formatNumber(row.temperatureC, { decimals: 0 })}</span>,
  },
  {
    key: 'conductivity',
    head: 'Conductivity, µS/cm',
    width: '1fr',
    cell: (row) => (
      <span className="cell-mono">
        <Figure text={rowText(row.conductivityUsCm)} whole={8} fraction={3} />
      </span>
    ),
  },
];

/** The value of a solution made in house with where its U comes from. */
export function PreparationResult({
  preparation,
  hasTable,
}: {
  preparation: Preparation;
  hasTable: boolean;
}) {
  const quantity = formatConductivity({
    conductivityUsCm: preparation.conductivityUsCm,
    expandedUncertaintyUsCm: preparation.expandedUncertaintyUsCm,
    unit: 'µS/cm',
  });
  const relative = (100 * preparation.expandedUncertaintyUsCm) / preparation.conductivityUsCm;
  return (
    <div className="preparation-result">
      <p className="preparation-value">
        <b>{quantity.text}</b>
        <span>
          at 25 °C, k = {formatNumber(preparation.coverageFactor, { significantDigits: 2 })}, U is{' '}
          {formatNumber(relative, { significantDigits: 2, unit: '%' })}
        </span>
        <strong>{capitalise(preparation.words)}</strong>
      </p>
      <DefinitionList
        items={[
          {
            term: 'Molality',
            value: formatNumber(preparation.molalityMolKg, { significantDigits: 5, unit: 'mol/kg' }),
          },
          ...(preparation.dilutionFactor === null
            ? []
            : [
                {
                  term: 'Diluted',
                  value: `${formatNumber(preparation.dilutionFactor, { significantDigits: 4 })} times`,
                },
              ]),
          {
            term: 'Of that, the water',
            value: formatNumber(preparation.waterBlankUsCm, { decimals: 2, unit: 'µS/cm' }),
          },
        ]}
      />
      <ul className="remarks">
        {preparation.remarks.map((remark) => (
          <li key={remark}>{remark}</li>
        ))}
      </ul>
      <section>
        <SectionTitle note="one standard uncertainty each">Budget</SectionTitle>
        <Ledger
          label="Uncertainty budget"
          columns={BUDGET}
          rows={[...preparation.budget].sort((a, b) => b.contributionUsCm - a.contributionUsCm)}
          rowKey={(row) => row.name}
          isHeadSticky={false}
        />
      </section>
      {hasTable ? (
        <section>
          <SectionTitle>By temperature</SectionTitle>
          <Ledger
            label="Conductivity by temperature"
            columns={TABLE}
            rows={preparation.temperatureTable}
            rowKey={(row) => row.temperatureC}
            isHeadSticky={false}
          />
        </section>
      ) : null}
    </div>
  );
}
