import type { Probe } from '../../../../../shared/contracts/probes.ts';
import { PageStrip } from '../../../components/strip/tolerance-strip.tsx';
import { comparisonWords, stripInput } from '../model.ts';

/** The last comparison, drawn and said. */
export function ProbeStrip({ strip, timeZone }: { strip: Probe['strip']; timeZone: string }) {
  if (!strip) {
    return (
      <div className="probe-strip">
        <p>
          <b>Never compared with a reference solution.</b> Until it is, nobody knows how far its reading is
          off, and no U can be stated.
        </p>
      </div>
    );
  }
  const words = comparisonWords(strip, timeZone);
  return (
    <div className="probe-strip">
      <PageStrip {...stripInput(strip)} />
      <p>
        {words.opening} <b>{words.outcome}</b>. {words.rest}
      </p>
    </div>
  );
}
