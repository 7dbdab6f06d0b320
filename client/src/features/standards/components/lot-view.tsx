import type { ReactNode } from 'react';
import type { Standard } from '../../../../../shared/contracts/standards.ts';
import { formatDate, formatDateTime } from '../../../../../shared/format/dates.ts';
import {
  capitalise,
  STANDARD_BASIS_LABELS,
  STANDARD_MEDIUM_LABELS,
} from '../../../../../shared/format/labels.ts';
import { formatConductivity, formatNumber } from '../../../../../shared/format/numbers.ts';
import { ButtonLink } from '../../../components/ui/button.tsx';
import { DefinitionList } from '../../../components/ui/definition-list.tsx';
import { Figure } from '../../../components/ui/figure.tsx';
import type { LedgerColumn } from '../../../components/ui/ledger-parts.tsx';
import { Ledger } from '../../../components/ui/ledger.tsx';
import { Crumbs, PageHead, SectionTitle } from '../../../components/ui/page-head.tsx';
import { paths } from '../../../paths.ts';
import { certifiedNote, certifiedQuantity, lotState, solutionName } from '../model.ts';
import { LotActions } from './lot-actions.tsx';
import { LotHistory, LotUses } from './lot-uses.tsx';
import { PreparationResult } from './preparation-result.tsx';

export interface LotViewProps {
  lot: Standard;
  /** Its certificate file, its bottles and what was compared with it, as their own slices draw them. */
  certificate: ReactNode;
  bottles: ReactNode;
  checks: ReactNode;
}

/** One lot: what its certificate says, whether it may be used, and what was compared with it. */
export function LotView({ lot, certificate, bottles, checks }: LotViewProps) {
  const state = lotState(lot);
  return (
    <>
      <Crumbs items={[{ label: 'Reference solutions', to: paths.standards.to() }]} />
      <PageHead
        name={lot.code}
        sentence={
          <>
            {solutionName(lot)}.{' '}
            <b className={state.tone === 'plain' ? undefined : `is-${state.tone}`}>
              {capitalise(state.word)}
            </b>
            : {state.note}.
          </>
        }
        aside={<LotActions lot={lot} />}
      />
      <div className="two-columns">
        <div>
          <section>
            <SectionTitle>{lot.isInHouse ? 'In-house, not certified' : 'Certificate'}</SectionTitle>
            <CertificateFacts lot={lot} />
          </section>
          {lot.preparation ? (
            <section>
              <SectionTitle note={lot.preparation.preparedBy ?? undefined}>How it was made</SectionTitle>
              <PreparationResult preparation={lot.preparation} hasTable={false} />
            </section>
          ) : null}
        </div>
        <div>
          <LotUses lot={lot} />
          {certificate}
          <LotHistory lot={lot} />
          <TemperatureTable lot={lot} />
          <div className="page-buttons justify-start">
            <ButtonLink to={paths.calculator.to({ calc: 'standard', by: 'lot', standardId: lot.id })}>
              Value at another temperature
            </ButtonLink>
            {lot.can.dilute ? (
              <ButtonLink to={paths.diluteStandard.to({ standardId: lot.id })}>Dilute this lot</ButtonLink>
            ) : null}
          </div>
        </div>
      </div>
      {bottles}
      {checks}
    </>
  );
}

function CertificateFacts({ lot }: { lot: Standard }) {
  const quantity = certifiedQuantity(lot);
  return (
    <DefinitionList
      items={[
        {
          term: 'Value',
          value: quantity ? `${quantity.text}, ${certifiedNote(lot)}` : 'by the table of its basis',
        },
        { term: 'Solution', value: solutionName(lot) },
        { term: 'Medium', value: STANDARD_MEDIUM_LABELS[lot.medium] },
        { term: 'Basis', value: STANDARD_BASIS_LABELS[lot.basis] },
        { term: 'Product', value: lot.product },
        { term: 'Producer', value: lot.producer },
        { term: 'Prepared in house', value: lot.isInHouse ? 'yes' : 'no' },
        { term: 'Traceability', value: lot.traceability },
        { term: 'Issued', value: formatDate(lot.issuedOn) },
        { term: 'Last day of use', value: formatDate(lot.expiresOn) },
        {
          term: 'After opening',
          value:
            lot.openedLifeDays === null
              ? 'until its last day'
              : formatNumber(lot.openedLifeDays, { decimals: 0, unit: 'days' }),
        },
        ...(lot.storage ? [{ term: 'Storage', value: lot.storage }] : []),
        { term: 'State since', value: formatDateTime(lot.stateChangedAt, { offset: true }) },
        { term: 'Reason of the state', value: lot.stateReason ?? 'none given' },
      ]}
    />
  );
}

type Row = NonNullable<Standard['temperatureTable']>[number];

const COLUMNS: LedgerColumn<Row>[] = [
  {
    key: 'temperature',
    head: 'Temperature, °C',
    width: '150px',
    cell: (row) => <Figure text={formatNumber(row.temperatureC)} whole={5} fraction={3} />,
  },
  {
    key: 'conductivity',
    head: 'Conductivity',
    width: '1fr',
    cell: (row) => {
      const { value, unit } = formatConductivity({
        conductivityUsCm: row.conductivityUsCm,
        unit: 'µS/cm',
        decimalsWithoutUncertainty: 1,
      });
      return (
        <span className="cell-error">
          <Figure text={value} whole={8} fraction={3} />
          <small>{unit}</small>
        </span>
      );
    },
  },
];

function TemperatureTable({ lot }: { lot: Standard }) {
  if (!lot.temperatureTable) {
    return (
      <section>
        <SectionTitle>Temperature</SectionTitle>
        <p className="text-ink-2">
          The certificate states no table. At other temperatures the published table of its KCl basis gives
          the shape, scaled to the certified value.
        </p>
      </section>
    );
  }
  return (
    <section>
      <SectionTitle note="the certificate’s own; nothing is taken beyond its ends">
        Temperature table
      </SectionTitle>
      <Ledger
        label="Conductivity by temperature"
        columns={COLUMNS}
        rows={lot.temperatureTable}
        rowKey={(row) => row.temperatureC}
        isHeadSticky={false}
      />
    </section>
  );
}
