import { AreaTabs } from '../components/layout/area-tabs.tsx';
import { ReviewQueue } from '../features/calibrations/components/review-queue.tsx';
import { useSession } from '../features/sessions/session-context.ts';
import { calibrationTabs, mayReviewAt, useZoneOf } from './calibration-parts.ts';

/** Signed runs that wait for approval. */
export default function CalibrationReviewPage() {
  const session = useSession();
  return (
    <>
      <AreaTabs label="Calibrations" items={calibrationTabs(session)} />
      <ReviewQueue userId={session.user.id} zoneOf={useZoneOf()} mayReview={mayReviewAt(session)} />
    </>
  );
}
