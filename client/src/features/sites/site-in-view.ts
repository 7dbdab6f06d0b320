import { useEffect, useSyncExternalStore } from 'react';

/**
 * The site that the rail names. A page about one site says so; going on to another area keeps it, so that somebody
 * who works at one site is not asked again. Null is all sites.
 */
let siteInView: number | null = null;
const listeners = new Set<() => void>();

export function useSiteInView(): number | null {
  return useSyncExternalStore(
    (listener) => {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
    () => siteInView,
  );
}

/** Said by a page about one site, or about all of them (null); undefined while it is not known. */
export function useShowSite(siteId: number | null | undefined): void {
  useEffect(() => {
    if (siteId === undefined || siteId === siteInView) return;
    siteInView = siteId;
    for (const listener of listeners) listener();
  }, [siteId]);
}
