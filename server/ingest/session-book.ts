/**
 * Ids of the boots and settings that devices have lately spoken of, and how far each boot has come. Held for a few
 * boots per device: what falls out is read again from the database.
 */
import type { Pool } from 'pg';
import { resolveBoots, resolveSettings } from './queries.ts';

export interface BootMark {
  id: number;
  /**
   * No number above this has been stored. It may be too high (a group that failed after it was raised), which only
   * costs a look-up; it is never too low, which would store a reading twice.
   */
  highestN: number;
}

export interface SettingsMark {
  id: number;
  cellConstantPerCm: number | null;
}

export interface SessionBook {
  /** Makes `boot` and `settings` answer for all of these. */
  resolve: (
    boots: readonly { deviceId: number; boot: string }[],
    settings: readonly { deviceId: number; settingsHash: string }[],
    at: Date,
  ) => Promise<void>;
  boot: (deviceId: number, boot: string) => BootMark | undefined;
  settings: (deviceId: number, settingsHash: string) => SettingsMark | undefined;
  forgetSettings: (deviceId: number, settingsHash: string) => void;
}

/** A device that reboots more often than it is read again costs one query each time, not memory. */
const maxHeldPerDevice = 8;

class Held<T> {
  private readonly ofDevice = new Map<number, Map<string, T>>();

  get(deviceId: number, key: string): T | undefined {
    return this.ofDevice.get(deviceId)?.get(key);
  }

  set(deviceId: number, key: string, value: T): void {
    const held = this.ofDevice.get(deviceId) ?? new Map<string, T>();
    this.ofDevice.set(deviceId, held);
    held.set(key, value);
  }

  delete(deviceId: number, key: string): void {
    this.ofDevice.get(deviceId)?.delete(key);
  }

  /** Only between groups: inside one, everything it resolved must stay. */
  trim(deviceIds: Iterable<number>): void {
    for (const deviceId of deviceIds) {
      const held = this.ofDevice.get(deviceId);
      if (!held) continue;
      for (const key of held.keys()) {
        if (held.size <= maxHeldPerDevice) break;
        held.delete(key);
      }
    }
  }
}

function missing<T extends { deviceId: number }>(
  wanted: readonly T[],
  keyOf: (item: T) => string,
  held: Held<unknown>,
): T[] {
  const found = new Map<string, T>();
  for (const item of wanted) {
    if (held.get(item.deviceId, keyOf(item)) === undefined)
      found.set(`${item.deviceId}/${keyOf(item)}`, item);
  }
  return [...found.values()];
}

export function createSessionBook(pool: Pool): SessionBook {
  const boots = new Held<BootMark>();
  const settings = new Held<SettingsMark>();

  return {
    resolve: async (wantedBoots, wantedSettings, at) => {
      const newBoots = missing(wantedBoots, (item) => item.boot, boots);
      const newSettings = missing(wantedSettings, (item) => item.settingsHash, settings);
      if (newBoots.length > 0) {
        boots.trim(newBoots.map((item) => item.deviceId));
        const missingNow = missing(wantedBoots, (item) => item.boot, boots);
        for (const row of await resolveBoots(pool, missingNow, at)) {
          boots.set(row.deviceId, row.boot, { id: row.id, highestN: row.maxN });
        }
      }
      if (newSettings.length > 0) {
        settings.trim(newSettings.map((item) => item.deviceId));
        const missingNow = missing(wantedSettings, (item) => item.settingsHash, settings);
        for (const row of await resolveSettings(pool, missingNow, at)) {
          settings.set(row.deviceId, row.settingsHash, {
            id: row.id,
            cellConstantPerCm: row.cellConstantPerCm,
          });
        }
      }
    },
    boot: (deviceId, boot) => boots.get(deviceId, boot),
    settings: (deviceId, settingsHash) => settings.get(deviceId, settingsHash),
    forgetSettings: (deviceId, settingsHash) => settings.delete(deviceId, settingsHash),
  };
}
