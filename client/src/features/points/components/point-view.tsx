import type { ReactNode } from 'react';
import { useState } from 'react';
import type { Point } from '../../../../../shared/contracts/points.ts';
import { formatDate } from '../../../../../shared/format/dates.ts';
import { formatNumber } from '../../../../../shared/format/numbers.ts';
import { Button } from '../../../components/ui/button.tsx';
import { HazardCautions } from '../../../components/ui/caution.tsx';
import { ConfirmDialog } from '../../../components/ui/confirm-dialog.tsx';
import { Crumbs, PageHead } from '../../../components/ui/page-head.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { paths } from '../../../paths.ts';
import { useRetirePoint } from '../api.ts';
import { ChangePointDialog } from './change-point-dialog.tsx';
import { useHoldDialogs } from './hold-dialogs.tsx';
import { EarlierProbes, HoldSection, Requirements } from './point-facts.tsx';

export interface PointViewProps {
  point: Point;
  areas: readonly { id: number; name: string }[];
  timeZone: string;
  /** The probe that stands there now, as its own slice draws it. */
  probe: ReactNode;
}

/** One measuring point: what it asks for, what stands there, and who has it. */
export function PointView({ point, areas, timeZone, probe }: PointViewProps) {
  const hold = useHoldDialogs();
  const [open, setOpen] = useState<'change' | 'retire' | null>(null);
  const close = () => setOpen(null);
  const { can } = point;
  return (
    <>
      <Crumbs
        items={[
          { label: 'Measuring points', to: paths.points.to() },
          { label: point.siteName, to: paths.points.to({ siteId: point.siteId }) },
          { label: point.areaName, to: paths.points.to({ siteId: point.siteId, q: point.areaName }) },
        ]}
      />
      <PageHead
        name={point.name}
        sentence={<PointSentence point={point} />}
        aside={
          <div className="page-buttons">
            {can.change ? <Button onClick={() => setOpen('change')}>Change…</Button> : null}
            {can.hold ? <Button onClick={() => hold.ask(point)}>Hold this point…</Button> : null}
            {can.release ? <Button onClick={() => hold.release(point)}>Put back into use…</Button> : null}
            {can.retire ? (
              <Button kind="danger" onClick={() => setOpen('retire')}>
                Retire…
              </Button>
            ) : null}
          </div>
        }
      />
      <div className="two-columns">
        <div>
          <Requirements point={point} />
        </div>
        <div>
          <HoldSection point={point} timeZone={timeZone} />
          {probe}
          <EarlierProbes point={point} timeZone={timeZone} />
          <HazardCautions tags={point.hazardTags} />
        </div>
      </div>
      {open === 'change' ? <ChangePointDialog point={point} areas={areas} onClose={close} /> : null}
      {open === 'retire' ? <RetirePointDialog point={point} onClose={close} /> : null}
      {hold.dialogs}
    </>
  );
}

function PointSentence({ point }: { point: Point }) {
  const tolerance = formatNumber(point.tolerancePercent, { unit: '%' });
  return (
    <>
      {point.code}. A reading here may be off by {tolerance}.{' '}
      {point.retiredAt ? <b>Retired on {formatDate(point.retiredAt)}.</b> : null}
      {!point.retiredAt && !point.probe ? <b>No probe stands here.</b> : null}
      {!point.retiredAt && point.hold ? <b>Held for {point.hold.userName}.</b> : null}
    </>
  );
}

function RetirePointDialog({ point, onClose }: { point: Point; onClose: () => void }) {
  const retire = useRetirePoint(point.id);
  const say = useToast();
  return (
    <ConfirmDialog
      isOpen
      onClose={onClose}
      title={`Retire ${point.name}?`}
      sentence="No probe can be installed here any more. What was read here stays readable. This cannot be undone."
      confirmLabel="Retire point"
      isDanger
      asksReason
      onConfirm={async (reason) => {
        await retire.mutateAsync({ reason, version: point.version });
        say(`${point.name} is retired.`);
      }}
    />
  );
}
