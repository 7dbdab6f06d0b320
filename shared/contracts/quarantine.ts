import { z } from 'zod';
import { id, instant, listQuery, reason } from './common.ts';
import { noticeKinds, quarantineCodes } from './vocabulary.ts';

export const quarantinedMessage = z.object({
  id,
  receivedAt: instant,
  deviceName: z.string().nullable(),
  topic: z.string(),
  code: z.enum(quarantineCodes),
  reason: z.string(),
  payloadBytes: z.number().int(),
  payloadText: z.string().describe('the raw message as UTF-8, undecodable bytes replaced'),
  payloadBase64: z.string().describe('the raw message, byte for byte'),
  resolvedAt: instant.nullable(),
  resolution: z.string().nullable(),
  can: z.object({ resolve: z.boolean() }),
});
export type QuarantinedMessage = z.infer<typeof quarantinedMessage>;
export const resolveQuarantined = z.object({ reason });
export const quarantineQuery = listQuery.extend({
  code: z.enum(quarantineCodes).optional(),
  open: z.enum(['1']).optional(),
});

export const notice = z.object({
  id,
  kind: z.enum(noticeKinds),
  at: instant,
  deviceName: z.string().nullable(),
  probeId: id.nullable(),
  probeTag: z.string().nullable(),
  text: z.string(),
  closedAt: instant.nullable(),
  can: z.object({ close: z.boolean() }),
});
export type Notice = z.infer<typeof notice>;
export const closeNotice = z.object({ reason });
export const noticesQuery = listQuery.extend({ open: z.enum(['1']).optional() });
