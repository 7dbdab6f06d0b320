import { z } from 'zod';
import { day, id, reason } from './common.ts';
import { roles } from './vocabulary.ts';

export const membership = z.object({
  id,
  userId: id,
  siteId: id.nullable(),
  siteName: z.string().nullable(),
  role: z.enum(roles),
  endsOn: day.nullable(),
  endedAt: z.string().nullable(),
});
export type Membership = z.infer<typeof membership>;

export const grantRole = z
  .object({
    userId: id,
    siteId: id.nullable().describe('null = all sites'),
    role: z.enum(roles),
    endsOn: day.nullable().default(null),
    reason,
  })
  .refine((grant) => grant.role !== 'auditor' || grant.endsOn !== null, {
    path: ['endsOn'],
    message: 'An auditor’s grant needs the day it ends.',
  });
export type GrantRole = z.infer<typeof grantRole>;
export const endMembership = z.object({ reason });
