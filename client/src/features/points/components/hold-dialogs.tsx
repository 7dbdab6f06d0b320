import type { ReactNode } from 'react';
import { useState } from 'react';
import { formatDateTime } from '../../../../../shared/format/dates.ts';
import { ConfirmDialog } from '../../../components/ui/confirm-dialog.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { useReleasePoint } from '../hold-api.ts';
import { HoldPointDialog } from './hold-point-dialog.tsx';

/** What the dialogs need to know of a point. */
export interface HoldablePoint {
  id: number;
  name: string;
  controlNote: string | null;
  hold: { userName: string; reason: string; untilAt: string } | null;
}

/** What this person may do about the hold of a point, as one button; null when nothing. */
export function holdAction(
  point: (HoldablePoint & { can: { hold: boolean; release: boolean } }) | null,
  { ask, release }: Pick<HoldDialogs, 'ask' | 'release'>,
): { label: string; onPress: () => void } | null {
  if (point?.can.release) return { label: 'Put back into use…', onPress: () => release(point) };
  return point?.can.hold ? { label: 'Hold this point…', onPress: () => ask(point) } : null;
}

export interface HoldDialogs {
  ask: (point: HoldablePoint) => void;
  release: (point: HoldablePoint) => void;
  /** Put this on the page once. */
  dialogs: ReactNode;
}

/** Taking a point and putting it back, from wherever it is shown. */
export function useHoldDialogs(): HoldDialogs {
  const [toHold, setToHold] = useState<HoldablePoint | null>(null);
  const [toRelease, setToRelease] = useState<HoldablePoint | null>(null);
  return {
    ask: setToHold,
    release: setToRelease,
    dialogs: (
      <>
        {toHold ? <HoldPointDialog point={toHold} onClose={() => setToHold(null)} /> : null}
        {toRelease ? <ReleaseDialog point={toRelease} onClose={() => setToRelease(null)} /> : null}
      </>
    ),
  };
}

function ReleaseDialog({ point, onClose }: { point: HoldablePoint; onClose: () => void }) {
  const release = useReleasePoint();
  const say = useToast();
  const { hold } = point;
  return (
    <ConfirmDialog
      isOpen
      onClose={onClose}
      title={`Put ${point.name} back into use?`}
      sentence="Its readings are judged again from now on, and everybody sees that nobody works there."
      confirmLabel="Put back into use"
      onConfirm={async () => {
        await release.mutateAsync({ id: point.id });
        say(`${point.name} is back in use.`);
      }}
    >
      {hold ? (
        <p>
          Held for <b>{hold.userName}</b>: {hold.reason}, expected back{' '}
          {formatDateTime(hold.untilAt, { offset: true })}.
        </p>
      ) : null}
    </ConfirmDialog>
  );
}
