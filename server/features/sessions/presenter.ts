import type { Session } from '../../../shared/contracts/sessions.ts';
import type { Actor } from '../../http/actor.ts';
import { may, maySomewhere } from '../../http/authorise.ts';
import { auditEventPolicy } from '../audit-events/policy.ts';
import { instrumentPolicy } from '../instruments/policy.ts';
import { mailPolicy } from '../mails/policy.ts';
import { pointPolicy } from '../points/policy.ts';
import { probePolicy } from '../probes/policy.ts';
import { quarantinePolicy } from '../quarantine/policy.ts';
import { settingPolicy } from '../settings/policy.ts';
import { sitePolicy } from '../sites/policy.ts';
import { standardPolicy } from '../standards/policy.ts';
import { userPolicy } from '../users/policy.ts';

export interface GrantRow {
  siteId: number | null;
  siteName: string | null;
  role: Session['grants'][number]['role'];
  endsOn: string | null;
}

export const presentSession = (actor: Actor, grants: GrantRow[], startedAt: string): Session => ({
  user: { id: actor.userId, email: actor.email, name: actor.name },
  grants,
  startedAt,
  can: {
    readAudit: maySomewhere(auditEventPolicy, 'read', actor),
    managePeople: maySomewhere(userPolicy, 'read', actor),
    manageSettings: may(settingPolicy, 'change', actor, null),
    readMail: may(mailPolicy, 'read', actor, null),
    readQuarantine: may(quarantinePolicy, 'read', actor, null),
    createSite: may(sitePolicy, 'create', actor, null),
    createPoint: maySomewhere(pointPolicy, 'create', actor),
    registerProbe: maySomewhere(probePolicy, 'register', actor),
    createStandard: maySomewhere(standardPolicy, 'create', actor),
    prepareStandard: maySomewhere(standardPolicy, 'prepare', actor),
    createInstrument: maySomewhere(instrumentPolicy, 'create', actor),
  },
});
