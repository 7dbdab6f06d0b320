import { auditEvent, auditEventsQuery, chainReport } from '../../../shared/contracts/audit-events.ts';
import { listOf } from '../../../shared/contracts/common.ts';
import { route, type AnyRoute } from '../../http/route.ts';
import { presentAuditEvent } from './presenter.ts';
import { auditedSites, listAuditEvents } from './read.ts';
import { verifyChain } from './verify.ts';

export const auditEventRoutes: AnyRoute[] = [
  route({
    verb: 'get',
    path: '/api/audit-events',
    access: 'session',
    does: 'Lists who did what, newest first, for the sites granted.',
    query: auditEventsQuery,
    answer: listOf(auditEvent),
    run: async ({ actor, query }) => {
      const { rows, total, nextCursor } = await listAuditEvents(actor, query);
      return { items: rows.map(presentAuditEvent), total, nextCursor };
    },
  }),
  route({
    verb: 'get',
    path: '/api/audit-events/integrity',
    access: 'session',
    does: 'Checks the whole hash chain and names the first break.',
    answer: chainReport,
    run: ({ parts, actor }) => {
      auditedSites(actor);
      return verifyChain(parts.clock.now());
    },
  }),
];
