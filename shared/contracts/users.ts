import { z } from 'zod';
import { id, instant, reason, shortText, version } from './common.ts';
import { grant } from './sessions.ts';

export const email = z.email('Write the whole e-mail address.').trim().toLowerCase().max(200);
/** Length is what counts (NIST SP 800-63B §5.1.1.2 asks for 8; we ask for 12). */
export const newPassword = z.string().min(12, 'Use at least 12 characters.').max(200);

export const user = z.object({
  id,
  email: z.string(),
  name: z.string(),
  grants: z.array(grant.extend({ id })),
  hasPassword: z.boolean(),
  lastSignInAt: instant.nullable(),
  lockedUntil: instant.nullable(),
  deactivatedAt: instant.nullable(),
  version,
  can: z.object({ change: z.boolean(), deactivate: z.boolean(), unlock: z.boolean() }),
});
export type User = z.infer<typeof user>;

export const createUser = z.object({ email, name: shortText });
export type CreateUser = z.infer<typeof createUser>;
export const changeUser = z.object({ name: shortText.optional(), email: email.optional(), version });
export type ChangeUser = z.infer<typeof changeUser>;
export const deactivateUser = z.object({ reason, version });
export const createFirstAdministrator = z.object({ email, name: shortText, password: newPassword });
export type CreateFirstAdministrator = z.infer<typeof createFirstAdministrator>;
export const changePassword = z.object({ currentPassword: z.string().min(1).max(200), newPassword });
export type ChangePassword = z.infer<typeof changePassword>;
export const setPassword = z.object({ token: z.string().min(20).max(200), newPassword });
export type SetPassword = z.infer<typeof setPassword>;
