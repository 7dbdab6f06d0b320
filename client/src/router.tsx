import type { ComponentType } from 'react';
import { lazy, Suspense } from 'react';
import { Navigate, Route, Routes } from 'react-router-dom';
import { PageNotFetched } from './components/layout/page-not-fetched.tsx';
import { UnknownAddress } from './components/layout/unknown-address.tsx';
import { paths } from './paths.ts';
import { SignedInLayout } from './routes/signed-in-layout.tsx';

/** A page in a file of its own, fetched when it is first opened. */
const page = (load: () => Promise<{ default: ComponentType }>) => {
  const Page = lazy(() => load().catch(() => ({ default: PageNotFetched })));
  return <Page />;
};

/** Pages for which somebody must be signed in, inside the shell. */
const shellPages: readonly [address: { pattern: string }, element: React.ReactNode][] = [
  [paths.live, page(() => import('./routes/live-page.tsx'))],
  [paths.liveSite, page(() => import('./routes/live-site-page.tsx'))],
  [paths.probes, page(() => import('./routes/probes-page.tsx'))],
  [paths.newProbe, page(() => import('./routes/new-probe-page.tsx'))],
  [paths.probe, page(() => import('./routes/probe-page.tsx'))],
  [paths.points, page(() => import('./routes/points-page.tsx'))],
  [paths.point, page(() => import('./routes/point-page.tsx'))],
  [paths.newPoint, page(() => import('./routes/new-point-page.tsx'))],
  [paths.calibrations, page(() => import('./routes/calibrations-page.tsx'))],
  [paths.startCalibration, page(() => import('./routes/calibration-start-page.tsx'))],
  [paths.reviewCalibrations, page(() => import('./routes/calibration-review-page.tsx'))],
  [paths.calibration, page(() => import('./routes/calibration-page.tsx'))],
  [paths.settings, page(() => import('./routes/settings-page.tsx'))],
  [paths.sites, page(() => import('./routes/sites-page.tsx'))],
  [paths.newSite, page(() => import('./routes/new-site-page.tsx'))],
  [paths.site, page(() => import('./routes/site-page.tsx'))],
  [paths.people, page(() => import('./routes/people-page.tsx'))],
  [paths.newPerson, page(() => import('./routes/new-person-page.tsx'))],
  [paths.person, page(() => import('./routes/person-page.tsx'))],
  [paths.quarantine, page(() => import('./routes/quarantine-page.tsx'))],
  [paths.quarantinedMessage, page(() => import('./routes/quarantined-message-page.tsx'))],
  [paths.mail, page(() => import('./routes/mail-page.tsx'))],
  [paths.organisation, page(() => import('./routes/organisation-page.tsx'))],
  [paths.auditTrail, page(() => import('./routes/audit-trail-page.tsx'))],
  [paths.records, page(() => import('./routes/records-page.tsx'))],
  [paths.standards, page(() => import('./routes/standards-page.tsx'))],
  [paths.prepareStandard, page(() => import('./routes/prepare-standard-page.tsx'))],
  [paths.diluteStandard, page(() => import('./routes/dilute-standard-page.tsx'))],
  [paths.instruments, page(() => import('./routes/instruments-page.tsx'))],
  [paths.newInstrument, page(() => import('./routes/new-instrument-page.tsx'))],
  [paths.instrument, page(() => import('./routes/instrument-page.tsx'))],
  [paths.procedures, page(() => import('./routes/procedures-page.tsx'))],
  [paths.procedure, page(() => import('./routes/procedure-page.tsx'))],
  [paths.issueProcedure, page(() => import('./routes/issue-procedure-page.tsx'))],
  [paths.newStandard, page(() => import('./routes/new-standard-page.tsx'))],
  [paths.standard, page(() => import('./routes/standard-page.tsx'))],
  [paths.calculator, page(() => import('./routes/calculator-page.tsx'))],
  [paths.account, page(() => import('./routes/account-page.tsx'))],
];

/** Pages without the shell. */
const barePages: typeof shellPages = [
  [paths.signIn, page(() => import('./routes/sign-in-page.tsx'))],
  [paths.setPassword, page(() => import('./routes/set-password-page.tsx'))],
  [paths.welcome, page(() => import('./routes/welcome-page.tsx'))],
  [paths.liveWall, page(() => import('./routes/live-wall-page.tsx'))],
];

export function AppRoutes() {
  return (
    <Suspense fallback={<div className="min-h-dvh" role="status" aria-label="Opening the page" />}>
      <Routes>
        {barePages.map(([address, element]) => (
          <Route key={address.pattern} path={address.pattern} element={element} />
        ))}
        <Route element={<SignedInLayout />}>
          <Route index element={<Navigate replace to={paths.live.to()} />} />
          {shellPages.map(([address, element]) => (
            <Route key={address.pattern} path={address.pattern} element={element} />
          ))}
          <Route path="*" element={<UnknownAddress home={paths.live.to()} />} />
        </Route>
      </Routes>
    </Suspense>
  );
}
