import { useQuery } from '@tanstack/react-query';
import { UnknownAddress } from '../components/layout/unknown-address.tsx';
import { Answer } from '../components/ui/answer.tsx';
import { calibrationDetail } from '../features/calibrations/api.ts';
import { Bench } from '../features/calibrations/bench/bench.tsx';
import { RecordActions } from '../features/calibrations/record/record-actions.tsx';
import { RecordView } from '../features/calibrations/record/record-view.tsx';
import { useSession } from '../features/sessions/session-context.ts';
import { paths } from '../paths.ts';
import { useZoneOf } from './calibration-parts.ts';
import { useIdParam } from './use-id-param.ts';

/** The bench while a run is its performer's; the record for everybody else and afterwards. */
export default function CalibrationPage() {
  const id = useIdParam('id');
  const { user } = useSession();
  const zoneOf = useZoneOf();
  const query = useQuery({ ...calibrationDetail(id ?? 0, user.id), enabled: id !== null });
  const unknown = <UnknownAddress home={paths.calibrations.to()} />;
  if (id === null) return unknown;
  return (
    <Answer query={query} what="the calibration" missing={unknown}>
      {(run) =>
        run.can.continue ? (
          <Bench key={run.id} calibration={run} userId={user.id} timeZone={zoneOf(run.siteId)} />
        ) : (
          <RecordView
            run={run}
            timeZone={zoneOf(run.siteId)}
            actions={<RecordActions run={run} userId={user.id} />}
          />
        )
      }
    </Answer>
  );
}
