import type { QuarantinedMessage as View } from '../../../shared/contracts/quarantine.ts';
import type { QuarantinedMessage } from '../../db/models/index.ts';

export const presentQuarantined = (row: QuarantinedMessage): View => ({
  id: row.id,
  receivedAt: row.receivedAt.toISOString(),
  deviceName: row.deviceName,
  topic: row.topic,
  code: row.code,
  reason: row.reason,
  payloadBytes: row.payloadBytes,
  payloadText: row.payload.toString('utf8'),
  payloadBase64: row.payload.toString('base64'),
  resolvedAt: row.resolvedAt?.toISOString() ?? null,
  resolution: row.resolution,
  can: { resolve: row.resolvedAt === null },
});
