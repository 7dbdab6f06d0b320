import { z } from 'zod';
import { id, idParam, listQuery, reason } from './common.ts';
import { deviceName } from './mqtt.ts';
import { deviceSummary } from './probes.ts';

export const device = deviceSummary.extend({ probeId: id });
export type Device = z.infer<typeof device>;

export const devicesQuery = listQuery.extend({ probeId: idParam.optional() });
export type DevicesQuery = z.infer<typeof devicesQuery>;

export const issueCredentials = z.object({ probeId: id, name: deviceName });
export type IssueCredentials = z.infer<typeof issueCredentials>;
export const replaceCredentials = z.object({ reason });
export const revokeCredentials = z.object({ reason });

/** Shown once; only a hash is kept. */
export const issuedCredentials = z.object({
  device,
  username: z.string(),
  password: z.string(),
  brokerUrl: z.string(),
  topicPrefix: z.string(),
});
export type IssuedCredentials = z.infer<typeof issuedCredentials>;
