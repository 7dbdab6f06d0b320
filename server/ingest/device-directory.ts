/**
 * Devices, where their probes stand and the settings, held in memory and told of every change by the database.
 * A device is looked up at each message; asking the database each time would cost more than storing the message.
 */
import type { Pool } from 'pg';
import { settingDefaults, settingShapes, type SettingValue } from '../../shared/contracts/settings.ts';
import type { Logger } from '../lib/logger.ts';
import { listenForChanges, type DirectoryListener } from './directory-listener.ts';
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

/** Names asked for in vain are remembered this long, so that a flood of them does not reach the database. */
const unknownForMs = 5000;
const maxUnknown = 10_000;
const surroundingTables = new Set(['probes', 'assignments', 'points', 'settings']);

interface DirectoryOptions {
  pool: Pool;
  url: string;
  log: Logger;
  nowMs: () => number;
}

export class DeviceDirectory {
  private readonly options: DirectoryOptions;
  private readonly devices = new Map<string, Device>();
  private readonly unknown = new Map<string, number>();
  private readonly listeners: ((name: string) => void)[] = [];
  private surroundings: Surroundings;
  private isStale = false;
  private listener: DirectoryListener | null = null;

  private constructor(options: DirectoryOptions, surroundings: Surroundings) {
    this.options = options;
    this.surroundings = surroundings;
  }

  static async open(options: DirectoryOptions): Promise<DeviceDirectory> {
    const directory = new DeviceDirectory(options, await readSurroundings(options.pool));
    const complain = (error: unknown): void =>
      options.log.warn({ err: error }, 'the device directory could not be read again');
    const { url, log } = options;
    directory.listener = await listenForChanges({
      url,
      log,
      onChange: (what) => {
        const [table, name] = what.split('/');
        if (table === 'devices' && name) directory.refreshDevice(name).catch(complain);
        else if (surroundingTables.has(what)) directory.isStale = true;
      },
      onGap: () => {
        directory.isStale = true;
        directory.reloadDevices().catch(complain);
      },
    });
    // What changed between the first look and the listening would otherwise stay unknown.
    directory.isStale = true;
    await directory.reloadDevices();
    await directory.ensureFresh();
    return directory;
  }

  /** The device as last heard of; undefined when it must be looked up. */
  cached(name: string): Device | undefined {
    return this.devices.get(name);
  }

  async find(name: string): Promise<Device | null> {
    const known = this.devices.get(name);
    if (known) return known;
    const now = this.options.nowMs();
    if ((this.unknown.get(name) ?? 0) > now) return null;
    const row = await selectDevice(this.options.pool, name);
    if (row) this.devices.set(name, row);
    else {
      if (this.unknown.size >= maxUnknown) this.unknown.clear();
      this.unknown.set(name, now + unknownForMs);
    }
    return row;
  }

  /** Devices on record as online. */
  onlineDevices(): Device[] {
    return [...this.devices.values()].filter((device) => device.isOnline && !device.isRevoked);
  }

  /** Reads one device again; call it when a change of credentials must count in this very call. */
  async refreshDevice(name: string): Promise<void> {
    this.unknown.delete(name);
    this.put(name, await selectDevice(this.options.pool, name));
  }

  /** Called with a device whose credentials no longer let it in, or have changed. */
  onCredentialsChanged(listener: (name: string) => void): void {
    this.listeners.push(listener);
  }

  /** Reads probes, placements and settings again if any was announced as changed. */
  async ensureFresh(): Promise<void> {
    if (!this.isStale) return;
    // Lowered first: a change announced while reading must raise it again.
    this.isStale = false;
    try {
      this.surroundings = await readSurroundings(this.options.pool);
    } catch (error) {
      this.isStale = true;
      throw error;
    }
  }

  probe(probeId: number): ProbeRow | undefined {
    return this.surroundings.probes.get(probeId);
  }

  /** Where the probe stands at a moment near now. */
  currentPoint(probeId: number, atMs: number): PointRow | null {
    return placementAmong(this.surroundings.placements.get(probeId), atMs);
  }

  uncertainty(): SettingValue<'check-uncertainty'> {
    return this.surroundings.uncertainty;
  }

  async stop(): Promise<void> {
    await this.listener?.stop();
  }

  private async reloadDevices(): Promise<void> {
    const rows = new Map((await selectDevices(this.options.pool)).map((row) => [row.name, row]));
    this.unknown.clear();
    for (const name of new Set([...this.devices.keys(), ...rows.keys()]))
      this.put(name, rows.get(name) ?? null);
  }

  private put(name: string, next: Device | null): void {
    const before = this.devices.get(name);
    if (next) this.devices.set(name, next);
    else this.devices.delete(name);
    const isOut = !next || next.isRevoked || (before && before.secretHash !== next.secretHash);
    if (before && isOut) for (const listener of this.listeners) listener(name);
  }
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
