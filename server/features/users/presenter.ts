import type { User as UserView } from '../../../shared/contracts/users.ts';
import type { User } from '../../db/models/index.ts';
import type { Actor } from '../../http/actor.ts';
import { may } from '../../http/authorise.ts';
import { userPolicy } from './policy.ts';

/** A person as an administrator sees them; never a hash, never a token. */
export const presentUser = (user: User, actor: Actor): UserView => ({
  id: user.id,
  email: user.email,
  name: user.name,
  grants: (user.memberships ?? []).map((grant) => ({
    id: grant.id,
    siteId: grant.siteId,
    siteName: grant.site?.name ?? null,
    role: grant.role,
    endsOn: grant.endsOn,
  })),
  hasPassword: user.passwordHash !== null,
  lastSignInAt: user.lastSignInAt?.toISOString() ?? null,
  lockedUntil: user.lockedUntil?.toISOString() ?? null,
  deactivatedAt: user.deactivatedAt?.toISOString() ?? null,
  version: user.version,
  can: {
    change: may(userPolicy, 'change', actor, null),
    deactivate:
      may(userPolicy, 'deactivate', actor, null) && user.id !== actor.userId && user.deactivatedAt === null,
    unlock: may(userPolicy, 'change', actor, null) && user.lockedUntil !== null,
  },
});
