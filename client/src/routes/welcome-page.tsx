import { useQuery } from '@tanstack/react-query';
import { Navigate } from 'react-router-dom';
import { welcomeDetail } from '../features/sessions/api.ts';
import { FirstAdministratorForm } from '../features/sessions/components/first-administrator-form.tsx';
import { Threshold } from '../features/sessions/components/threshold.tsx';
import { paths } from '../paths.ts';

/** The first visit to an empty Saltmark: somebody becomes its administrator, once. */
export default function WelcomePage() {
  const welcome = useQuery(welcomeDetail());
  if (welcome.data && !welcome.data.needsFirstAdministrator)
    return <Navigate replace to={paths.signIn.to()} />;
  return (
    <Threshold title="Welcome">
      <FirstAdministratorForm />
    </Threshold>
  );
}
