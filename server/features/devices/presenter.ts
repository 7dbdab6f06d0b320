import type { Device, IssuedCredentials } from '../../../shared/contracts/devices.ts';
import type { DeviceSummary } from '../../../shared/contracts/probes.ts';
import type { DeviceRow } from './queries.ts';

export const presentDeviceSummary = (row: Omit<DeviceRow, 'probeId' | 'siteId'>): DeviceSummary => ({
  id: row.id,
  name: row.name,
  isOnline: row.isOnline,
  onlineWhy: row.onlineWhy,
  lastSeenAt: row.lastSeenAt?.toISOString() ?? null,
  firmware: row.firmware,
  settingsHash: row.settingsHash,
  reportedCellConstantPerCm: row.reportedCellConstantPerCm,
  readingIntervalS: row.readingIntervalS,
  duplicateCount: row.duplicateCount,
  clockOffsetMs: row.clockOffsetMs,
  credentialsIssuedAt: row.credentialsIssuedAt.toISOString(),
  revokedAt: row.revokedAt?.toISOString() ?? null,
});

export const presentDevice = (row: DeviceRow): Device => ({
  ...presentDeviceSummary(row),
  probeId: row.probeId,
});

/** The one time the secret is seen. */
export const presentCredentials = (row: DeviceRow, secret: string, brokerUrl: string): IssuedCredentials => ({
  device: presentDevice(row),
  username: row.name,
  password: secret,
  brokerUrl,
  topicPrefix: `saltmark/1/${row.name}/`,
});
