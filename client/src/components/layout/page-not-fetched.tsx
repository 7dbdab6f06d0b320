import { FailedFace } from '../ui/faces.tsx';

/**
 * Instead of a page whose file could not be fetched: the network is gone, or the server has a newer version. The
 * address is right, so that loading it again brings the page.
 */
export function PageNotFetched() {
  return (
    <FailedFace title="This page could not be fetched." onRetry={() => window.location.reload()}>
      The connection may be gone, or Saltmark was updated meanwhile. Nothing was changed.
    </FailedFace>
  );
}
