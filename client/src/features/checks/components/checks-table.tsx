import { useInfiniteQuery } from '@tanstack/react-query';
import { useState } from 'react';
import type { Check } from '../../../../../shared/contracts/checks.ts';
import { formatDate, formatTime } from '../../../../../shared/format/dates.ts';
import {
  capitalise,
  CHECK_INVALID_LABELS,
  OUTCOME_LABELS,
  STAGE_LABELS,
} from '../../../../../shared/format/labels.ts';
import { formatNumber, formatWithUncertainty } from '../../../../../shared/format/numbers.ts';
import { Button } from '../../../components/ui/button.tsx';
import { FailedFace, LoadingFace } from '../../../components/ui/faces.tsx';
import { Figure, NameCell } from '../../../components/ui/figure.tsx';
import type { LedgerColumn } from '../../../components/ui/ledger-parts.tsx';
import { PhoneRow } from '../../../components/ui/ledger-parts.tsx';
import { Ledger } from '../../../components/ui/ledger.tsx';
import { OutcomeMark } from '../../../components/ui/marks.tsx';
import { SectionTitle } from '../../../components/ui/page-head.tsx';
import { probeChecks } from '../api.ts';

const FIRST_ROWS = 8;
const MORE_ROWS = 40;

/** Every comparison with a reference solution; those that do not count stand among them with their reason. */
export function ChecksTable({ probeId, timeZone }: { probeId: number; timeZone: string }) {
  const query = useInfiniteQuery(probeChecks(probeId));
  const [most, setMost] = useState(FIRST_ROWS);
  const all = query.data?.pages.flatMap((page) => page.items) ?? [];
  const rows = all.slice(0, most);
  const total = query.data?.pages[0]?.total ?? 0;
  const showMore = async () => {
    setMost(most + MORE_ROWS);
    if (all.length < most + MORE_ROWS && query.hasNextPage) await query.fetchNextPage();
  };
  // The page says already that the probe was never compared.
  if (query.data && total === 0) return null;
  return (
    <section>
      <SectionTitle note={noteFor(total)}>Comparisons</SectionTitle>
      {query.isPending ? <LoadingFace label="Fetching the comparisons" rows={6} /> : null}
      {query.isError && !query.data ? (
        <FailedFace
          title="Could not fetch the comparisons."
          error={query.error}
          onRetry={() => query.refetch()}
        />
      ) : null}
      {query.data ? (
        <Ledger
          label="Comparisons with reference solutions"
          columns={columnsFor(timeZone)}
          rows={rows}
          rowKey={(check) => check.id}
          isHeadSticky={false}
          phone={(check) => <CheckPhoneRow check={check} timeZone={timeZone} />}
        />
      ) : null}
      {rows.length < total ? (
        <div className="mt-3">
          <Button isPending={query.isFetchingNextPage} onClick={showMore}>
            Show earlier ones
          </Button>
        </div>
      ) : null}
    </section>
  );
}

function noteFor(total: number): string {
  const count = total > 0 ? `${formatNumber(total)} in all, ` : '';
  return `${count}newest first; those that do not count stand with their reason`;
}

function columnsFor(timeZone: string): LedgerColumn<Check>[] {
  return [
    {
      key: 'at',
      head: 'When',
      width: '124px',
      cell: (check) => <When check={check} timeZone={timeZone} />,
    },
    {
      key: 'stage',
      head: 'Stage and lot',
      width: 'minmax(150px, 1fr)',
      cell: (check) => <StageCell check={check} />,
    },
    { key: 'error', head: 'Error and U', width: '176px', cell: (check) => <ErrorCell check={check} /> },
    {
      key: 'outcome',
      head: 'Outcome',
      width: 'minmax(190px, 1.3fr)',
      cell: (check) => <OutcomeCell check={check} />,
    },
    {
      key: 'constant',
      head: 'Cell constant, cm⁻¹',
      width: '150px',
      cell: (check) => (
        <Figure
          text={
            check.impliedCellConstantPerCm === null
              ? null
              : formatNumber(check.impliedCellConstantPerCm, { decimals: 4 })
          }
          whole={3}
          fraction={5}
        />
      ),
    },
  ];
}

function When({ check, timeZone }: { check: Check; timeZone: string }) {
  return <NameCell name={formatDate(check.at, { timeZone })} note={formatTime(check.at, { timeZone })} />;
}

function StageCell({ check }: { check: Check }) {
  const lot = check.solution ? `lot ${check.solution}` : 'no lot named';
  const note = check.performedBy ? `${lot} · ${check.performedBy}` : lot;
  return (
    <span className="cell-pair">
      {capitalise(STAGE_LABELS[check.stage])}
      <small>{note}</small>
    </span>
  );
}

export function ErrorCell({ check }: { check: Check }) {
  if (check.errorPercent === null) return '–';
  const { value, uncertainty } = formatWithUncertainty({
    value: check.errorPercent,
    expandedUncertainty: check.expandedUncertaintyPercent,
    unit: '%',
    sign: 'always',
    decimalsWithoutUncertainty: 2,
  });
  return (
    <span className="cell-error">
      <Figure text={value} whole={4} fraction={3} />
      {uncertainty ? <span>± {uncertainty}</span> : null}
      <small>%</small>
    </span>
  );
}

export function OutcomeCell({ check }: { check: Check }) {
  if (check.isValid && check.outcome) return <OutcomeMark outcome={check.outcome} />;
  return (
    <span className="cell-pair">
      <b>does not count</b>
      <small>{check.invalidReason ? CHECK_INVALID_LABELS[check.invalidReason] : 'reason not kept'}</small>
    </span>
  );
}

function CheckPhoneRow({ check, timeZone }: { check: Check; timeZone: string }) {
  return (
    <PhoneRow
      name={<When check={check} timeZone={timeZone} />}
      value={<ErrorCell check={check} />}
      trust={<StageCell check={check} />}
      more={
        check.isValid && check.outcome ? (
          <span aria-label={OUTCOME_LABELS[check.outcome]}>
            <OutcomeMark outcome={check.outcome} />
          </span>
        ) : (
          <OutcomeCell check={check} />
        )
      }
    />
  );
}
