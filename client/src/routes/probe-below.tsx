import type { Probe } from '../../../shared/contracts/probes.ts';
import { ChecksTable } from '../features/checks/components/checks-table.tsx';
import { DeviceSection } from '../features/devices/components/device-section.tsx';
import { CellConstants, Placements, ProbeFacts } from '../features/probes/components/probe-facts.tsx';

/** Under the charts of a probe page: comparisons, what is recorded, its device, where it stood. */
export function ProbeBelow({ probe, timeZone }: { probe: Probe; timeZone: string }) {
  return (
    <>
      <div className="probe-below">
        <ChecksTable probeId={probe.id} timeZone={timeZone} />
      </div>
      <div className="probe-below probe-facts">
        <ProbeFacts probe={probe} />
        <DeviceSection probe={probe} device={probe.device} can={probe.can} timeZone={timeZone} />
        <div className="probe-column">
          <Placements probe={probe} timeZone={timeZone} />
          <CellConstants probe={probe} timeZone={timeZone} />
        </div>
      </div>
    </>
  );
}
