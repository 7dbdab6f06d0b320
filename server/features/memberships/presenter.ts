import type { Membership as MembershipView } from '../../../shared/contracts/memberships.ts';
import type { Membership } from '../../db/models/index.ts';

export const presentMembership = (row: Membership): MembershipView => ({
  id: row.id,
  userId: row.userId,
  siteId: row.siteId,
  siteName: row.site?.name ?? null,
  role: row.role,
  endsOn: row.endsOn,
  endedAt: row.endedAt?.toISOString() ?? null,
});
