import { z } from 'zod';
import { id, instant } from './common.ts';
import { roles } from './vocabulary.ts';

export const signIn = z.object({
  email: z.email('Write the whole e-mail address.').max(200),
  password: z.string().min(1, 'Write your password.').max(200),
});
export type SignIn = z.infer<typeof signIn>;

export const grant = z.object({
  siteId: id.nullable().describe('null = all sites'),
  siteName: z.string().nullable(),
  role: z.enum(roles),
  endsOn: z.string().nullable(),
});
export type Grant = z.infer<typeof grant>;

/** Who I am and what I may start; the client shows controls from `can`, never from roles. */
export const session = z.object({
  user: z.object({ id, email: z.string(), name: z.string() }),
  grants: z.array(grant),
  startedAt: instant,
  can: z.object({
    readAudit: z.boolean(),
    managePeople: z.boolean(),
    manageSettings: z.boolean(),
    readMail: z.boolean(),
    readQuarantine: z.boolean(),
    createSite: z.boolean(),
    createPoint: z.boolean(),
    registerProbe: z.boolean(),
    createStandard: z.boolean(),
    prepareStandard: z.boolean(),
    createInstrument: z.boolean(),
  }),
});
export type Session = z.infer<typeof session>;

/** What the sign-in page needs to know before anybody is signed in. */
export const welcome = z.object({
  needsFirstAdministrator: z.boolean(),
  demo: z
    .object({
      password: z.string(),
      signIns: z.array(
        z.object({ email: z.string(), name: z.string(), role: z.enum(roles), can: z.string() }),
      ),
    })
    .nullable(),
});
export type Welcome = z.infer<typeof welcome>;
