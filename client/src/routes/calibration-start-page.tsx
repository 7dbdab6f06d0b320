import { useQuery } from '@tanstack/react-query';
import { Navigate } from 'react-router-dom';
import { UnknownAddress } from '../components/layout/unknown-address.tsx';
import { Answer } from '../components/ui/answer.tsx';
import { probeToCalibrate } from '../features/calibrations/api.ts';
import { StartRun } from '../features/calibrations/components/start-run.tsx';
import { useSession } from '../features/sessions/session-context.ts';
import { idOf, useAddressFilters } from '../lib/use-address-filters.ts';
import { paths } from '../paths.ts';

/** Begin a run of the probe that the address names. */
export default function CalibrationStartPage() {
  const { user } = useSession();
  const probeId = idOf(useAddressFilters().read('probeId'));
  const query = useQuery({ ...probeToCalibrate(probeId ?? 0), enabled: probeId !== undefined });
  if (probeId === undefined) return <Navigate replace to={paths.calibrations.to()} />;
  return (
    <Answer query={query} what="the probe" missing={<UnknownAddress home={paths.calibrations.to()} />}>
      {(probe) => <StartRun key={probe.id} probe={probe} userId={user.id} />}
    </Answer>
  );
}
