import { formatAge } from '../../../../shared/format/dates.ts';
import { useConnection } from '../../lib/live-updates.ts';
import { useNow } from '../ui/time.tsx';

/** A short break repairs itself; only a longer one is worth a line on every page. */
const PATIENCE_MS = 4000;

/** Says that what is on screen no longer follows the plant, and since when. */
export function ConnectionBanner() {
  const { state, since } = useConnection();
  const now = useNow();
  if (state !== 'lost' || now - since < PATIENCE_MS) return null;
  return (
    <div className="banner" role="status">
      <b>No connection to the server.</b> Readings on this page stopped {formatAge(since, now)}. It is being
      tried again; nothing you captured is lost.
    </div>
  );
}
