import { useQuery } from '@tanstack/react-query';
import { Navigate, useSearchParams } from 'react-router-dom';
import { currentSession, welcomeDetail } from '../features/sessions/api.ts';
import { SignIn } from '../features/sessions/components/sign-in.tsx';
import { paths, returnAddress } from '../paths.ts';

export default function SignInPage() {
  const [params] = useSearchParams();
  const session = useQuery(currentSession());
  const welcome = useQuery(welcomeDetail());
  if (session.data) return <Navigate replace to={returnAddress(params.get('to'))} />;
  if (welcome.data?.needsFirstAdministrator) return <Navigate replace to={paths.welcome.to()} />;
  return <SignIn demo={welcome.data?.demo ?? null} />;
}
