import { useQuery } from '@tanstack/react-query';
import type { Probe } from '../../../shared/contracts/probes.ts';
import { ButtonLink } from '../components/ui/button.tsx';
import { CellConstantSection } from '../features/checks/components/cell-constant-section.tsx';
import { ProbeNotices } from '../features/notices/components/probe-notices.tsx';
import { pointDetail } from '../features/points/api.ts';
import { FreePointField } from '../features/points/components/free-point-field.tsx';
import { holdAction, useHoldDialogs } from '../features/points/components/hold-dialogs.tsx';
import { ProbeActions } from '../features/probes/components/probe-actions.tsx';
import { ProbeHead } from '../features/probes/components/probe-head.tsx';
import { ProbeStrip } from '../features/probes/components/probe-strip.tsx';
import { Timeline } from '../features/probes/components/timeline.tsx';
import { probeName } from '../features/probes/model.ts';
import { BigReading } from '../features/readings/components/big-reading.tsx';
import { ReadingChart } from '../features/readings/components/reading-chart.tsx';
import { useSession } from '../features/sessions/session-context.ts';
import { sitesList } from '../features/sites/api.ts';
import { useShowSite } from '../features/sites/site-in-view.ts';
import { useWatchProbe } from '../lib/live-updates.ts';
import { ProbeBelow } from './probe-below.tsx';
import { paths } from '../paths.ts';
import { mayCalibrateAt } from './calibration-parts.ts';

/** The probe page composed from its slices: probe, point, readings, comparisons, device. */
export function ProbePageContent({ probe }: { probe: Probe }) {
  const { id, placement, siteId } = probe;
  const point =
    useQuery({ ...pointDetail(placement?.pointId ?? 0), enabled: placement !== null }).data ?? null;
  const timeZone = useQuery(sitesList()).data?.items.find((site) => site.id === siteId)?.timeZone ?? 'UTC';
  const session = useSession();
  const hold = useHoldDialogs();
  useShowSite(siteId);
  useWatchProbe(id);
  const shared = { probeId: id, reading: probe.reading, timeZone, point };
  return (
    <>
      <ProbeHead
        probe={probe}
        isHeld={point?.hold != null}
        reading={<BigReading {...shared} trust={probe.trust} isHeld={point?.hold != null} />}
        actions={
          <>
            {probe.placement && mayCalibrateAt(session, siteId) ? (
              <ButtonLink to={paths.startCalibration.to({ probeId: id })}>Calibrate</ButtonLink>
            ) : null}
            <ProbeActions
              probe={probe}
              timeZone={timeZone}
              hold={holdAction(point, hold)}
              renderPointField={(props) => <FreePointField {...props} />}
            />
          </>
        }
      />
      <ProbeNotices probeId={id} timeZone={timeZone} />
      <ProbeStrip strip={probe.strip} timeZone={timeZone} />
      <div className="probe-columns">
        <div className="probe-column">
          <ReadingChart {...shared} name={probeName(probe)} />
          <CellConstantSection probeId={id} constants={probe.cellConstants} timeZone={timeZone} />
        </div>
        <Timeline probeId={id} timeZone={timeZone} />
      </div>
      <ProbeBelow probe={probe} timeZone={timeZone} />
      {hold.dialogs}
    </>
  );
}
