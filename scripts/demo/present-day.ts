/** What stands out on the day the demo is loaded: one point held, one device silent, one constant changed without a record. */
import { writeFile } from 'node:fs/promises';
import { Hold } from '../../server/db/models/index.ts';
import { fleetAtEnd, type FleetFile } from '../../simulator/scenario/fleet-file.ts';
import { roundCellConstant } from '../../simulator/probe.ts';
import { need, type Loading } from './loading.ts';

const minuteMs = 60_000;
const silent = { point: 'sk-32', minutes: 58 };
const held = { point: 'sk-21', by: 'ines', reason: 'in a bottle for calibration', forMinutes: 180 };
const tampered = { point: 'sk-12', factor: 1.097 };

const pointOfProbe = new Map<string, string>();

/** Called once the scenario is known, before anything asks for a probe by its point. */
export function placeProbes(loading: Loading): void {
  for (const { probe, stays } of loading.history.timelines) {
    const point = stays.at(-1)?.point.code;
    if (point && probe.status === 'in-service') pointOfProbe.set(probe.key, point);
  }
}

/** How long before the end of the history a probe stopped sending, ms. */
export const silentSinceMs = (probeKey: string): number =>
  pointOfProbe.get(probeKey) === silent.point ? silent.minutes * minuteMs : 0;

export async function loadHold(loading: Loading): Promise<void> {
  const point = need(loading.points, held.point);
  const fromAt = loading.history.endAt - 12 * minuteMs;
  const untilAt = loading.history.endAt + held.forMinutes * minuteMs;
  const row = await Hold.create({
    pointId: point.id,
    userId: need(loading.users, held.by),
    reason: held.reason,
    fromAt: new Date(fromAt),
    untilAt: new Date(untilAt),
    endedAt: null,
  });
  loading.trail.push({
    action: 'points.held',
    objectKind: 'points',
    objectId: point.id,
    siteId: point.siteId,
    newValue: { holdId: row.id, untilAt: new Date(untilAt) },
    reason: held.reason,
    at: fromAt,
    by: held.by,
  });
}

/** The file the simulator signs in with; one device stays away, one carries a constant nobody asked for. */
export async function writeFleetFile(loading: Loading, path: string): Promise<number> {
  const { devices, ...rest } = fleetAtEnd(loading.history, loading.seed);
  const keyOf = new Map(loading.history.timelines.map(({ probe }) => [probe.device, probe.key]));
  const fleet: FleetFile = {
    ...rest,
    devices: devices.flatMap(({ device, profile, state }) => {
      const key = need(keyOf, device);
      const point = pointOfProbe.get(key);
      if (point === silent.point) return [];
      const inUse = state.cellConstantInUsePerCm;
      const cellConstantInUsePerCm =
        point === tampered.point ? roundCellConstant(inUse * tampered.factor) : inUse;
      return [
        {
          device,
          secret: need(loading.devices, key).secret,
          profile,
          state: { ...state, cellConstantInUsePerCm },
        },
      ];
    }),
  };
  await writeFile(path, JSON.stringify(fleet), { mode: 0o600 });
  return fleet.devices.length;
}
