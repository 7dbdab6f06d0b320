import { createContext, useContext } from 'react';
import { useNow } from '../../../components/ui/time.tsx';

/** How far the server's clock is ahead of this device's, ms: ages must not depend on a wrong clock in somebody's pocket. */
export const ClockSkew = createContext(0);

/** The time now by the server's clock, once a second. */
export function useServerNow(): number {
  return useNow() + useContext(ClockSkew);
}
