import { createContext, useContext } from 'react';
import type { Session } from '../../../../shared/contracts/sessions.ts';

export const SessionContext = createContext<Session | null>(null);

/** Who is signed in, on every page inside the shell. */
export function useSession(): Session {
  const session = useContext(SessionContext);
  if (!session) throw new Error('This part of the page needs somebody signed in.');
  return session;
}
