/**
 * A device that connects again takes the place of its old connection: after a broken line that is how it should be. Two
 * devices with one name do it to each other without end, and only somebody at the plant can find the second one.
 */
import type { Pool } from 'pg';
import type { Logger } from '../lib/logger.ts';
import type { Announcements } from './announcements.ts';
import type { Device } from './device-directory.ts';
import { writeNotices } from './notices.ts';

/** A line that breaks is noticed by its device after a keep-alive or two; three times in ten minutes is a contest. */
const windowMs = 600_000;
const contestAfter = 3;

export interface Takeovers {
  /** `address` of the newcomer. */
  seen: (device: Device, address: string | null, siteId: number | null) => void;
}

export function watchTakeovers(options: {
  pool: Pool;
  announcements: Announcements;
  log: Logger;
  nowMs: () => number;
}): Takeovers {
  const { pool, announcements, log, nowMs } = options;
  const recent = new Map<number, { atMs: number; address: string | null }[]>();

  const notice = async (
    device: Device,
    addresses: (string | null)[],
    siteId: number | null,
  ): Promise<void> => {
    const [made] = await writeNotices(pool, [
      {
        kind: 'device-replaced',
        deviceId: device.id,
        probeId: device.probeId,
        atMs: nowMs(),
        cause: {},
        detail: { takeovers: addresses.length, withinMinutes: windowMs / 60_000, addresses },
      },
    ]);
    if (made) announcements.changed({ slice: 'notices', id: made.id, kind: 'created' }, siteId);
  };

  return {
    seen: (device, address, siteId) => {
      const since = nowMs() - windowMs;
      const times = (recent.get(device.id) ?? []).filter(({ atMs }) => atMs >= since).slice(-contestAfter);
      times.push({ atMs: nowMs(), address });
      recent.set(device.id, times);
      log.info(
        { device: device.name, address, times: times.length },
        'a device took the place of its connection',
      );
      if (times.length < contestAfter) return;
      notice(device, [...new Set(times.map((time) => time.address))], siteId).catch((error: unknown) =>
        log.error({ err: error }, 'a contest for a device name could not be noted'),
      );
    },
  };
}
