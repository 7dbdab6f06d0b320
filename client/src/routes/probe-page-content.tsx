import { useQuery } from '@tanstack/react-query';
import type { Probe } from '../../../shared/contracts/probes.ts';
import { CellConstantSection } from '../features/checks/components/cell-constant-section.tsx';
import { ChecksTable } from '../features/checks/components/checks-table.tsx';
import { DeviceSection } from '../features/devices/components/device-section.tsx';
import { ProbeNotices } from '../features/notices/components/probe-notices.tsx';
import { pointDetail } from '../features/points/api.ts';
import { FreePointField } from '../features/points/components/free-point-field.tsx';
import { useHoldDialogs } from '../features/points/components/hold-dialogs.tsx';
import { ProbeActions } from '../features/probes/components/probe-actions.tsx';
import { CellConstants, Placements, ProbeFacts } from '../features/probes/components/probe-facts.tsx';
import { ProbeHead } from '../features/probes/components/probe-head.tsx';
import { ProbeStrip } from '../features/probes/components/probe-strip.tsx';
import { Timeline } from '../features/probes/components/timeline.tsx';
import { probeName } from '../features/probes/model.ts';
import { BigReading } from '../features/readings/components/big-reading.tsx';
import { ReadingChart } from '../features/readings/components/reading-chart.tsx';
import { sitesList } from '../features/sites/api.ts';
import { useShowSite } from '../features/sites/site-in-view.ts';
import { useWatchProbe } from '../lib/live-updates.ts';

/** The probe page composed from its slices: probe, point, readings, comparisons, device. */
export function ProbePageContent({ probe }: { probe: Probe }) {
  const { id, placement, siteId } = probe;
  const point =
    useQuery({ ...pointDetail(placement?.pointId ?? 0), enabled: placement !== null }).data ?? null;
  const timeZone = useQuery(sitesList()).data?.items.find((site) => site.id === siteId)?.timeZone ?? 'UTC';
  const hold = useHoldDialogs();
  useShowSite(siteId);
  useWatchProbe(id);
  const holdAction =
    point && (point.can.release || point.can.hold)
      ? point.can.release
        ? { label: 'Put back into use…', onPress: () => hold.release(point) }
        : { label: 'Hold this point…', onPress: () => hold.ask(point) }
      : null;
  const shared = { probeId: id, reading: probe.reading, timeZone, point };
  return (
    <>
      <ProbeHead
        probe={probe}
        isHeld={point?.hold != null}
        reading={<BigReading {...shared} trust={probe.trust} isHeld={point?.hold != null} />}
        actions={
          <ProbeActions
            probe={probe}
            timeZone={timeZone}
            hold={holdAction}
            renderPointField={(props) => <FreePointField {...props} />}
          />
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
      <div className="probe-below">
        <ChecksTable probeId={id} timeZone={timeZone} />
      </div>
      <div className="probe-below probe-facts">
        <ProbeFacts probe={probe} />
        <DeviceSection probe={probe} device={probe.device} can={probe.can} timeZone={timeZone} />
        <div className="probe-column">
          <Placements probe={probe} timeZone={timeZone} />
          <CellConstants probe={probe} timeZone={timeZone} />
        </div>
      </div>
      {hold.dialogs}
    </>
  );
}
