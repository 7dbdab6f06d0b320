import { useQuery } from '@tanstack/react-query';
import { EmptyFace } from '../components/ui/faces.tsx';
import { PageHead } from '../components/ui/page-head.tsx';
import { AuditTrail } from '../features/audit-events/components/audit-trail.tsx';
import { useSession } from '../features/sessions/session-context.ts';
import { usersList } from '../features/users/api.ts';

export default function AuditTrailPage() {
  const { can } = useSession();
  const people = useQuery({ ...usersList(), enabled: can.managePeople });
  if (!can.readAudit) {
    return (
      <>
        <PageHead name="Audit trail" />
        <EmptyFace title="Your role does not read the audit trail.">
          Managers, auditors and administrators do.
        </EmptyFace>
      </>
    );
  }
  return <AuditTrail people={people.data?.items ?? []} />;
}
