import { useQuery, useQueryClient } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import { useEffect } from 'react';
import { Navigate, useLocation } from 'react-router-dom';
import { FailedFace } from '../../../components/ui/faces.tsx';
import { startLiveUpdates } from '../../../lib/live-updates.ts';
import { paths } from '../../../paths.ts';
import { currentSession } from '../api.ts';
import { SessionContext } from '../session-context.ts';

/** Lets the page through when somebody is signed in, and keeps live updates running meanwhile. */
export function RequireSession({ children }: { children: ReactNode }) {
  const query = useQuery(currentSession());
  const { pathname, search } = useLocation();
  useLiveUpdates(query.data?.user.id ?? null);
  if (query.data) return <SessionContext value={query.data}>{children}</SessionContext>;
  if (query.data === null) {
    return <Navigate replace to={paths.signIn.to({ to: pathname === '/' ? null : pathname + search })} />;
  }
  if (query.isPending) return <div className="min-h-dvh" role="status" aria-label="Opening Saltmark" />;
  return (
    <main className="page">
      <FailedFace title="Saltmark does not answer." error={query.error} onRetry={() => query.refetch()} />
    </main>
  );
}

/** One socket for one person: another person gets another, with that person's rights. */
function useLiveUpdates(userId: number | null): void {
  const queryClient = useQueryClient();
  useEffect(() => (userId === null ? undefined : startLiveUpdates(queryClient)), [userId, queryClient]);
}
