import { useState } from 'react';
import type { Calibration } from '../../../../../shared/contracts/calibrations.ts';
import { Button, ButtonLink } from '../../../components/ui/button.tsx';
import { useRepeatCommand } from '../api.ts';
import { AmendDialog } from './amend-dialog.tsx';
import { HandOverDialog } from './hand-over-dialog.tsx';
import { ReviewDialog } from './review-dialog.tsx';

type Opened = 'approve' | 'return' | 'amend' | 'hand-over';

export interface RecordActionsProps {
  run: Calibration;
  userId: number;
}

/** What this person may do with the record; the server said so in `can`. */
export function RecordActions({ run, userId }: RecordActionsProps) {
  const [opened, setOpened] = useState<Opened | null>(null);
  const repeat = useRepeatCommand(run.id, userId);
  const close = () => setOpened(null);
  const { can } = run;
  const dialog = { run, userId, onClose: close };
  return (
    <>
      {can.approve ? (
        <Button kind="primary" onClick={() => setOpened('approve')}>
          Approve…
        </Button>
      ) : null}
      {can.return ? <Button onClick={() => setOpened('return')}>Return with reason…</Button> : null}
      {can.handOver ? <Button onClick={() => setOpened('hand-over')}>Hand over…</Button> : null}
      {can.amend ? <Button onClick={() => setOpened('amend')}>Amend…</Button> : null}
      {can.sendAgain ? (
        <Button isPending={repeat.isPending} onClick={() => repeat.mutateAsync()}>
          Send the constant again
        </Button>
      ) : null}
      {run.number ? (
        <>
          <ButtonLink reloadDocument to={`/api/calibrations/${run.id}/record.pdf`}>
            Record, PDF
          </ButtonLink>
          <ButtonLink reloadDocument to={`/api/calibrations/${run.id}/record.json`}>
            JSON
          </ButtonLink>
        </>
      ) : null}
      {opened === 'approve' || opened === 'return' ? <ReviewDialog {...dialog} decision={opened} /> : null}
      {opened === 'amend' ? <AmendDialog {...dialog} /> : null}
      {opened === 'hand-over' ? <HandOverDialog {...dialog} /> : null}
    </>
  );
}
