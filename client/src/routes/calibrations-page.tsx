import { AreaTabs } from '../components/layout/area-tabs.tsx';
import { Today } from '../features/calibrations/components/today.tsx';
import { useSession } from '../features/sessions/session-context.ts';
import { calibrationTabs, useZoneOf } from './calibration-parts.ts';

/** My work today. */
export default function CalibrationsPage() {
  const session = useSession();
  const zoneOf = useZoneOf();
  const canPerform = session.grants.some((grant) => ['technician', 'manager'].includes(grant.role));
  return (
    <>
      <AreaTabs label="Calibrations" items={calibrationTabs(session)} />
      <Today userId={session.user.id} zoneOf={zoneOf} canPerform={canPerform} />
    </>
  );
}
