import { useNavigate } from 'react-router-dom';
import { paths } from '../../paths.ts';
import { useSignOut } from './api.ts';

/** Signs out here and goes to the sign-in page; whoever signs in next begins at the start, not where this person was. */
export function useLeave(): () => void {
  const signOut = useSignOut();
  const navigate = useNavigate();
  const leave = async () => {
    await signOut.mutateAsync({ isEverywhere: false });
    await navigate(paths.signIn.to(), { replace: true });
  };
  // Without the server nobody is signed out: the page stays, and the banner tells why.
  return () => void leave().catch(() => undefined);
}
