import type { ReactNode } from 'react';
import type { Probe } from '../../../../../shared/contracts/probes.ts';
import { formatDate } from '../../../../../shared/format/dates.ts';
import { TrustMark } from '../../../components/ui/marks.tsx';
import { Crumbs } from '../../../components/ui/page-head.tsx';
import { useDocumentTitle } from '../../../lib/use-document-title.ts';
import { useHeadingFocus } from '../../../lib/use-heading-focus.ts';
import { paths } from '../../../paths.ts';
import { probeMeta, probeName, trustSentence } from '../model.ts';

export interface ProbeHeadProps {
  probe: Probe;
  /** Somebody has it: the gate is outlined. */
  isHeld: boolean;
  /** The reading, large. */
  reading: ReactNode;
  actions: ReactNode;
}

/** Where it stands, what it is, whether it can be trusted and why, and what it reads. */
export function ProbeHead({ probe, isHeld, reading, actions }: ProbeHeadProps) {
  const name = probeName(probe);
  useDocumentTitle(`${name}, ${probe.tag}`);
  const heading = useHeadingFocus();
  return (
    <>
      <Crumbs items={crumbsOf(probe)} />
      <div className="probe-head">
        <div>
          <h1 ref={heading} tabIndex={-1}>
            {name}
          </h1>
          <p className="probe-meta">{probeMeta(probe)}</p>
          <p className="probe-say">
            {probe.status === 'retired' ? (
              <>
                <b>Retired on {formatDate(probe.retiredAt)}:</b> {probe.retiredReason}
              </>
            ) : (
              <>
                <TrustMark trust={probe.trust.level} isHeld={isHeld} isLead /> {trustSentence(probe)}
              </>
            )}
          </p>
        </div>
        <div className="probe-reading">
          {reading}
          <div className="probe-actions">{actions}</div>
        </div>
      </div>
    </>
  );
}

function crumbsOf({ placement, siteId, siteName }: Probe) {
  if (!placement) {
    return [
      { label: 'Probes', to: paths.probes.to() },
      { label: siteName, to: paths.probes.to({ siteId }) },
    ];
  }
  return [
    { label: placement.siteName, to: paths.liveSite.to({ siteId: placement.siteId }) },
    { label: placement.areaName, to: paths.point.to({ id: placement.pointId }) },
  ];
}
