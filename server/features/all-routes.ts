/** Every slice's table, in the order of the description. A new slice adds one line. */
import type { AnyRoute } from '../http/route.ts';
import { auditEventRoutes } from './audit-events/routes.ts';
import { bottleRoutes } from './bottles/routes.ts';
import { calculationRoutes } from './calculations/routes.ts';
import { recordRoutes } from './calibrations/record-routes.ts';
import { calibrationRoutes } from './calibrations/routes.ts';
import { certificateRoutes } from './certificates/routes.ts';
import { checkRoutes } from './checks/routes.ts';
import { deviceRoutes } from './devices/routes.ts';
import { instrumentRoutes } from './instruments/routes.ts';
import { mailRoutes } from './mails/routes.ts';
import { membershipRoutes } from './memberships/routes.ts';
import { noticeRoutes } from './notices/routes.ts';
import { pointRoutes } from './points/routes.ts';
import { probeRoutes } from './probes/routes.ts';
import { procedureRoutes } from './procedures/routes.ts';
import { promptRoutes } from './prompts/routes.ts';
import { quarantineRoutes } from './quarantine/routes.ts';
import { readingRoutes } from './readings/routes.ts';
import { searchRoutes } from './search/routes.ts';
import { sessionRoutes } from './sessions/routes.ts';
import { settingRoutes } from './settings/routes.ts';
import { siteRoutes } from './sites/routes.ts';
import { standardRoutes } from './standards/routes.ts';
import { userRoutes } from './users/routes.ts';

export const allRoutes: readonly AnyRoute[] = [
  ...sessionRoutes,
  ...userRoutes,
  ...membershipRoutes,
  ...siteRoutes,
  ...pointRoutes,
  ...probeRoutes,
  ...deviceRoutes,
  ...standardRoutes,
  ...bottleRoutes,
  ...certificateRoutes,
  ...instrumentRoutes,
  ...procedureRoutes,
  ...recordRoutes,
  ...calibrationRoutes,
  ...promptRoutes,
  ...readingRoutes,
  ...checkRoutes,
  ...quarantineRoutes,
  ...noticeRoutes,
  ...auditEventRoutes,
  ...settingRoutes,
  ...mailRoutes,
  ...searchRoutes,
  ...calculationRoutes,
];
