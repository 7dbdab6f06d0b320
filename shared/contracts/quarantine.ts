import { z } from 'zod';
import { id, instant, listQuery, reason } from './common.ts';
import { quarantineCodes } from './vocabulary.ts';

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
