import { useQuery } from '@tanstack/react-query';
import { Suspense } from 'react';
import { Outlet, useLocation } from 'react-router-dom';
import { AppShell } from '../components/layout/app-shell.tsx';
import { ErrorBoundary } from '../components/ui/error-boundary.tsx';
import { LoadingFace } from '../components/ui/faces.tsx';
import { Switcher } from '../components/ui/switcher.tsx';
import { ThemeToggle } from '../components/ui/theme-toggle.tsx';
import { usePhoneQueue } from '../features/calibrations/offline/phone-queue.ts';
import { GlobalSearch } from '../features/search/components/global-search.tsx';
import { useSignOut } from '../features/sessions/api.ts';
import { RequireSession } from '../features/sessions/components/require-session.tsx';
import { roleWords } from '../features/sessions/model.ts';
import { useSession } from '../features/sessions/session-context.ts';
import { sitesList } from '../features/sites/api.ts';
import { useSiteInView } from '../features/sites/site-in-view.ts';
import { paths } from '../paths.ts';
import { areasFor, siteItems } from './areas.ts';

/** The shell around every page that needs a session. */
export function SignedInLayout() {
  return (
    <RequireSession>
      <Shell />
    </RequireSession>
  );
}

function Shell() {
  const session = useSession();
  // What was captured without network goes up from any page, not only from the bench.
  usePhoneQueue(session.user.id);
  const { pathname } = useLocation();
  const siteId = useSiteInView();
  const sites = useQuery(sitesList()).data?.items ?? [];
  const signOut = useSignOut();
  return (
    <AppShell
      home={paths.live.to()}
      site={<Switcher label="Site" {...siteItems(sites, siteId, pathname)} />}
      areas={areasFor(session, siteId)}
      search={<GlobalSearch hotkey="/" />}
      person={{
        name: session.user.name,
        role: roleWords(session, siteId),
        items: [
          { label: 'Your account', hint: session.user.email, to: paths.account.to() },
          { label: 'Sign out', onSelect: () => signOut.mutate({ isEverywhere: false }) },
        ],
      }}
      personFoot={<ThemeToggle />}
    >
      <ErrorBoundary resetKey={pathname}>
        <Suspense fallback={<LoadingFace label="Opening the page" />}>
          <Outlet />
        </Suspense>
      </ErrorBoundary>
    </AppShell>
  );
}
