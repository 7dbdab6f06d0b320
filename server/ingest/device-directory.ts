/**
 * Devices, where their probes stand and the settings, held in memory and told of every change by the database.
 * A device is looked up at each message; asking the database each time would cost more than storing the message.
 */
import type { Pool } from 'pg';
import { settingDefaults, settingShapes, type SettingValue } from '../../shared/contracts/settings.ts';
import type { Logger } from '../lib/logger.ts';
import { listenForChanges } from './directory-listener.ts';
import {
  selectDevice,
  selectDevices,
  selectPlacements,
  selectProbes,
  selectSetting,
  type DeviceRow,
  type PlacementRow,
  type PointRow,
  type ProbeRow,
} from './queries.ts';

export type Device = DeviceRow;

interface Surroundings {
  probes: Map<number, ProbeRow>;
  placements: Map<number, PlacementRow[]>;
  uncertainty: SettingValue<'check-uncertainty'>;
}

export interface DeviceDirectory {
  /** The device as last heard of; undefined when it must be looked up. */
  cached: (name: string) => Device | undefined;
  find: (name: string) => Promise<Device | null>;
  /** Devices on record as online. */
  onlineDevices: () => Device[];
  /** Reads one device again; call it after its credentials changed if the change must count in this very call. */
  refreshDevice: (name: string) => Promise<void>;
  /** Called with a device whose credentials no longer let it in, or have changed. */
  onCredentialsChanged: (listener: (name: string) => void) => void;
  /** Reads probes, placements and settings again if any was announced as changed. */
  ensureFresh: () => Promise<void>;
  probe: (probeId: number) => ProbeRow | undefined;
  /** Where the probe stands at a moment near now. */
  currentPoint: (probeId: number, atMs: number) => PointRow | null;
  uncertainty: () => SettingValue<'check-uncertainty'>;
  stop: () => Promise<void>;
}

/** Names asked for in vain are remembered this long, so that a flood of them does not reach the database. */
const unknownForMs = 5000;
const maxUnknown = 10_000;

export async function openDeviceDirectory(options: {
  pool: Pool;
  url: string;
  log: Logger;
  nowMs: () => number;
}): Promise<DeviceDirectory> {
  const { pool, url, log, nowMs } = options;
  const devices = new Map<string, Device>();
  const unknown = new Map<string, number>();
  const listeners: ((name: string) => void)[] = [];
  let surroundings: Surroundings | null = null;
  let isStale = false;

  const put = (name: string, next: Device | null): void => {
    const before = devices.get(name);
    if (next) devices.set(name, next);
    else devices.delete(name);
    const isOut = !next || next.isRevoked || (before && before.secretHash !== next.secretHash);
    if (before && isOut) for (const listener of listeners) listener(name);
  };
  const refreshDevice = async (name: string): Promise<void> => {
    unknown.delete(name);
    put(name, await selectDevice(pool, name));
  };
  const reloadDevices = async (): Promise<void> => {
    const rows = new Map((await selectDevices(pool)).map((row) => [row.name, row]));
    unknown.clear();
    for (const name of new Set([...devices.keys(), ...rows.keys()])) put(name, rows.get(name) ?? null);
  };
  const complain = (error: unknown): void =>
    log.warn({ err: error }, 'the device directory could not be read again');

  const listener = await listenForChanges({
    url,
    log,
    onChange: (what) => {
      const [table, name] = what.split('/');
      if (table === 'devices' && name) refreshDevice(name).catch(complain);
      else isStale = true;
    },
    onGap: () => {
      isStale = true;
      reloadDevices().catch(complain);
    },
  });
  await reloadDevices();
  surroundings = await readSurroundings(pool);

  return {
    cached: (name) => devices.get(name),
    find: async (name) => {
      const known = devices.get(name);
      if (known) return known;
      if ((unknown.get(name) ?? 0) > nowMs()) return null;
      const row = await selectDevice(pool, name);
      if (row) devices.set(name, row);
      else {
        if (unknown.size >= maxUnknown) unknown.clear();
        unknown.set(name, nowMs() + unknownForMs);
      }
      return row;
    },
    onlineDevices: () => [...devices.values()].filter((device) => device.isOnline && !device.isRevoked),
    refreshDevice,
    onCredentialsChanged: (heard) => void listeners.push(heard),
    ensureFresh: async () => {
      if (!isStale) return;
      // Lowered first: a change announced while reading must raise it again.
      isStale = false;
      try {
        surroundings = await readSurroundings(pool);
      } catch (error) {
        isStale = true;
        throw error;
      }
    },
    probe: (probeId) => surroundings?.probes.get(probeId),
    currentPoint: (probeId, atMs) => placementAmong(surroundings?.placements.get(probeId), atMs),
    uncertainty: () => surroundings?.uncertainty ?? settingDefaults['check-uncertainty'],
    stop: () => listener.stop(),
  };
}

function placementAmong(placements: PlacementRow[] | undefined, atMs: number): PlacementRow | null {
  return placements?.find(({ fromMs, toMs }) => fromMs <= atMs && (toMs === null || toMs > atMs)) ?? null;
}

async function readSurroundings(pool: Pool): Promise<Surroundings> {
  const [probes, placements, uncertainty] = await Promise.all([
    selectProbes(pool),
    selectPlacements(pool),
    selectSetting(pool, 'check-uncertainty'),
  ]);
  const ofProbe = new Map<number, PlacementRow[]>();
  for (const placement of placements) {
    const held = ofProbe.get(placement.probeId);
    if (held) held.push(placement);
    else ofProbe.set(placement.probeId, [placement]);
  }
  const parsed = settingShapes['check-uncertainty'].safeParse(uncertainty);
  return {
    probes: new Map(probes.map((probe) => [probe.probeId, probe])),
    placements: ofProbe,
    uncertainty: parsed.success ? parsed.data : settingDefaults['check-uncertainty'],
  };
}
