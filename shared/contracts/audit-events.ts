import { z } from 'zod';
import { id, idParam, instant, listQuery } from './common.ts';

export const auditEvent = z.object({
  sequence: z.number().int(),
  capturedAt: instant,
  receivedAt: instant,
  actorKind: z.enum(['user', 'device', 'system']),
  actorId: id.nullable(),
  actorName: z.string(),
  actingRole: z.string().nullable(),
  action: z.string(),
  objectKind: z.string(),
  objectId: z.string().nullable(),
  objectVersion: z.number().int().nullable(),
  siteId: id.nullable(),
  oldValue: z.unknown(),
  newValue: z.unknown(),
  reason: z.string().nullable(),
  source: z.unknown(),
  previousHash: z.string(),
  hash: z.string(),
});
export type AuditEventView = z.infer<typeof auditEvent>;
export const auditEventsQuery = listQuery.extend({
  action: z.string().max(80).optional(),
  objectKind: z.string().max(40).optional(),
  objectId: z.string().max(40).optional(),
  actorId: idParam.optional(),
  from: instant.optional(),
  to: instant.optional(),
});
export type AuditEventsQuery = z.infer<typeof auditEventsQuery>;

/** What a check of the whole chain found. */
export const chainReport = z.object({
  events: z.number().int(),
  isUnbroken: z.boolean(),
  firstBreak: z.object({ sequence: z.number().int(), what: z.string() }).nullable(),
  lastHash: z.string(),
  checkedAt: instant,
});
export type ChainReport = z.infer<typeof chainReport>;
