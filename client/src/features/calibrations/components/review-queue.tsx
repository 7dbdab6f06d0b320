import { useQuery } from '@tanstack/react-query';
import type { CalibrationRow } from '../../../../../shared/contracts/calibrations.ts';
import { countInWords } from '../../../../../shared/format/numbers.ts';
import { capitalise } from '../../../../../shared/format/labels.ts';
import { Answer } from '../../../components/ui/answer.tsx';
import { EmptyFace } from '../../../components/ui/faces.tsx';
import { PageHead } from '../../../components/ui/page-head.tsx';
import { calibrationsBrief } from '../api.ts';
import { RunList } from './run-list.tsx';

export interface ReviewQueueProps {
  userId: number;
  zoneOf: (siteId: number) => string;
  /** Whether this person approves at a site. */
  mayReview: (siteId: number) => boolean;
}

/** Signed runs that wait for another pair of eyes, the oldest first. Own work never stands here. */
export function ReviewQueue({ userId, zoneOf, mayReview }: ReviewQueueProps) {
  const query = useQuery(calibrationsBrief({ status: 'signed', limit: 200 }));
  return (
    <Answer query={query} what="the signed runs">
      {({ items }) => {
        const rows = items.filter((row) => isForReview(row, userId, mayReview)).reverse();
        const own = items.filter((row) => row.performerId === userId).length;
        return (
          <>
            <PageHead name="Review" sentence={sentence(rows.length, own)} />
            <RunList
              label="Signed calibrations to review"
              rows={rows}
              zoneOf={zoneOf}
              empty={<EmptyFace title="Nothing waits for your review." />}
            />
          </>
        );
      }}
    </Answer>
  );
}

function isForReview(row: CalibrationRow, userId: number, mayReview: ReviewQueueProps['mayReview']): boolean {
  return row.performerId !== userId && mayReview(row.siteId);
}

function sentence(count: number, own: number): string {
  const waiting =
    count === 0
      ? 'Nothing waits.'
      : `${capitalise(countInWords(count))} signed ${count === 1 ? 'calibration waits' : 'calibrations wait'} for you to approve or return.`;
  return own > 0 ? `${waiting} Another person reviews ${countInWords(own)} of your own.` : waiting;
}
