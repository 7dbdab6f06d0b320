import type { FormEvent } from 'react';
import { useRef, useState } from 'react';
import type { Bottle } from '../../../../../shared/contracts/bottles.ts';
import { formatNumber } from '../../../../../shared/format/numbers.ts';
import { Button } from '../../../components/ui/button.tsx';
import { ConfirmDialog } from '../../../components/ui/confirm-dialog.tsx';
import { Dialog } from '../../../components/ui/dialog.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { FormRefusal } from '../../../components/ui/form-refusal.tsx';
import { NumberInput } from '../../../components/ui/number-input.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { useSubmission } from '../../../lib/use-submission.ts';
import { useDiscardBottle, useOpenBottle, useSetRemaining } from '../api.ts';

interface BottleDialogProps {
  bottle: Bottle;
  onClose: () => void;
}

export function OpenDialog({
  bottle,
  lot,
  onClose,
}: BottleDialogProps & { lot: { openedLifeDays: number | null } }) {
  const open = useOpenBottle();
  const say = useToast();
  const life =
    lot.openedLifeDays === null
      ? 'It may then be used until the lot expires.'
      : `It may then be used for ${formatNumber(lot.openedLifeDays)} days, and never beyond the lot’s last day.`;
  return (
    <ConfirmDialog
      isOpen
      onClose={onClose}
      title={`Open ${bottle.code}?`}
      sentence={`${life} Write today’s date on its label. Nothing is ever poured back.`}
      confirmLabel="Open bottle"
      onConfirm={async () => {
        await open.mutateAsync(bottle);
        say(`${bottle.code} is open. Its time runs from now.`);
      }}
    />
  );
}

export function DiscardDialog({ bottle, onClose }: BottleDialogProps) {
  const discard = useDiscardBottle(bottle.id);
  const say = useToast();
  return (
    <ConfirmDialog
      isOpen
      onClose={onClose}
      title={`Discard ${bottle.code}?`}
      sentence="It cannot be used again. It stays in the list with your reason."
      confirmLabel="Discard bottle"
      isDanger
      asksReason
      reasonHint="Empty, past its time, spilled, left uncapped."
      onConfirm={async (reason) => {
        await discard.mutateAsync({ reason, version: bottle.version });
        say(`${bottle.code} is discarded.`);
      }}
    />
  );
}

export function RemainingDialog({ bottle, onClose }: BottleDialogProps) {
  const form = useRef<HTMLFormElement>(null);
  const [remainingMl, setRemainingMl] = useState<number | null>(null);
  const save = useSetRemaining(bottle.id);
  const say = useToast();
  const { isPending, refusal, issueFor, submit } = useSubmission(form);
  const send = async (event?: FormEvent) => {
    event?.preventDefault();
    const isNumber = remainingMl !== null && !Number.isNaN(remainingMl);
    const isDone = await submit(
      () => save.mutateAsync({ remainingMl: remainingMl!, version: bottle.version }),
      isNumber ? {} : { remainingMl: 'Write what is left, in millilitres; 0 when it is empty.' },
    );
    if (!isDone) return;
    say(`${bottle.code} holds ${formatNumber(remainingMl, { unit: 'mL' })}.`);
    onClose();
  };
  return (
    <Dialog
      isOpen
      onClose={onClose}
      isLocked={isPending}
      title={`What is left in ${bottle.code}`}
      sentence={`It held ${formatNumber(bottle.remainingMl, { unit: 'mL' })}. A bottle only ever gets emptier.`}
      actions={
        <>
          <Button kind="primary" isPending={isPending} onClick={() => send()}>
            Save
          </Button>
          <Button onClick={onClose} disabled={isPending}>
            Cancel
          </Button>
        </>
      }
    >
      <form ref={form} className="form" onSubmit={(event) => void send(event)} noValidate>
        <Field label="Left" error={issueFor('remainingMl')}>
          <NumberInput unit="mL" value={remainingMl} onChange={setRemainingMl} />
        </Field>
        <FormRefusal>{refusal}</FormRefusal>
      </form>
    </Dialog>
  );
}
