import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { PROBE_KIND_LABELS } from '../../../../../shared/format/labels.ts';
import { formatDate } from '../../../../../shared/format/dates.ts';
import { ToleranceStrip } from '../../../components/strip/tolerance-strip.tsx';
import { Answer } from '../../../components/ui/answer.tsx';
import { LoadingFace } from '../../../components/ui/faces.tsx';
import { TrustMark } from '../../../components/ui/marks.tsx';
import { paths } from '../../../paths.ts';
import { probeDetail } from '../api.ts';
import { formatCellConstant, stripInput } from '../model.ts';

/** One probe in three lines, for the page of the point where it stands. */
export function ProbeBrief({ id, since, timeZone }: { id: number; since: string; timeZone: string }) {
  const query = useQuery(probeDetail(id));
  return (
    <Answer
      query={query}
      what="the probe"
      loading={<LoadingFace label="Fetching the probe" rows={1} rowHeight={92} />}
    >
      {(probe) => (
        <div className="probe-brief">
          <p>
            <Link className="link" to={paths.probe.to({ id })}>
              {probe.tag}
            </Link>{' '}
            <span className="text-ink-3">
              {PROBE_KIND_LABELS[probe.kind]}, serial {probe.serial}, since {formatDate(since, { timeZone })}
            </span>
          </p>
          <div>
            <span>
              <TrustMark
                trust={probe.trust.level}
                isHeld={probe.trust.reason === 'held'}
                reason={probe.trust.text}
              />
            </span>
            {probe.strip ? <ToleranceStrip {...stripInput(probe.strip)} /> : null}
          </div>
          <p className="cell-mono">cell constant {formatCellConstant(probe.cellConstantPerCm)}</p>
        </div>
      )}
    </Answer>
  );
}
