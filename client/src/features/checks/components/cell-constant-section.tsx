import { useQuery } from '@tanstack/react-query';
import { useMemo } from 'react';
import type { CheckHistory } from '../../../../../shared/contracts/checks.ts';
import { formatNumber } from '../../../../../shared/format/numbers.ts';
import { CellConstantChart } from '../../../components/charts/cell-constant-chart.tsx';
import { Answer } from '../../../components/ui/answer.tsx';
import { EmptyFace, LoadingFace } from '../../../components/ui/faces.tsx';
import { SectionTitle } from '../../../components/ui/page-head.tsx';
import { probeHistory } from '../api.ts';
import { cellConstantHistory } from '../model.ts';

export interface CellConstantSectionProps {
  probeId: number;
  constants: readonly { cellConstantPerCm: number; fromAt: string }[];
  timeZone: string;
}

/** The cell constant as KCl solutions have shown it, against the channel of tolerance around the one in use. */
export function CellConstantSection({ probeId, ...rest }: CellConstantSectionProps) {
  const query = useQuery(probeHistory(probeId));
  return (
    <section>
      <SectionTitle note="as determined in KCl, with U; channel is the tolerance around the constant in use">
        Cell constant
      </SectionTitle>
      <Answer
        query={query}
        what="the comparisons"
        loading={<LoadingFace label="Fetching the comparisons" rows={1} rowHeight={430} />}
      >
        {(history) => <History history={history} fetchedAt={query.dataUpdatedAt} {...rest} />}
      </Answer>
    </section>
  );
}

interface HistoryProps extends Omit<CellConstantSectionProps, 'probeId'> {
  history: CheckHistory;
  fetchedAt: number;
}

function History({ history, fetchedAt, constants, timeZone }: HistoryProps) {
  const drawn = useMemo(
    () => cellConstantHistory(history.points, constants, fetchedAt, timeZone),
    [history, constants, fetchedAt, timeZone],
  );
  if (!drawn) {
    return (
      <EmptyFace title="Never compared yet.">
        The first comparison with a reference solution opens this history.
      </EmptyFace>
    );
  }
  const left = history.total - history.points.length;
  return (
    <>
      <CellConstantChart {...drawn} />
      {left > 0 ? (
        <p className="page-foot">
          {formatNumber(history.points.length)} of {formatNumber(history.total)} comparisons are drawn:
          automatic checks evenly thinned, the others all.
        </p>
      ) : null}
    </>
  );
}
