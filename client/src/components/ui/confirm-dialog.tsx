import type { ReactNode } from 'react';
import { useState } from 'react';
import { Button } from './button.tsx';
import { Dialog } from './dialog.tsx';
import { Field } from './field.tsx';
import { Textarea } from './text-input.tsx';

export interface ConfirmDialogProps {
  isOpen: boolean;
  onClose: () => void;
  title: string;
  sentence?: ReactNode;
  /** The verb, as on the button that opened this: "Retire probe". */
  confirmLabel: string;
  isDanger?: boolean;
  /** Ask why; the reason goes into the audit trail. */
  asksReason?: boolean;
  reasonHint?: string;
  /** A rejection is shown in the dialog, which stays open with what was typed. */
  onConfirm: (reason: string) => Promise<unknown>;
  children?: ReactNode;
}

/** Shortest reason that says something, as the contract demands it. */
const REASON_MIN = 3;

/** Say what will happen, ask why where that must be kept, then do it. */
export function ConfirmDialog(props: ConfirmDialogProps) {
  // A fresh body for every opening: an old reason must not slip into a new entry.
  return props.isOpen ? <ConfirmBody {...props} /> : null;
}

function ConfirmBody(props: ConfirmDialogProps) {
  const { title, sentence, confirmLabel, isDanger, asksReason, reasonHint, onConfirm, onClose, children } =
    props;
  const [reason, setReason] = useState('');
  const [fault, setFault] = useState<{ reason?: string; whole?: string }>({});
  const [isPending, setIsPending] = useState(false);
  const confirm = async () => {
    if (asksReason && reason.trim().length < REASON_MIN) {
      setFault({ reason: 'Write the reason in a few words: it is kept with the change.' });
      return;
    }
    setIsPending(true);
    setFault({});
    try {
      await onConfirm(reason.trim());
      onClose();
    } catch (error) {
      setFault({ whole: error instanceof Error ? error.message : 'This could not be done. Try again.' });
    } finally {
      setIsPending(false);
    }
  };
  return (
    <Dialog
      isOpen
      onClose={onClose}
      title={title}
      sentence={sentence}
      isLocked={isPending}
      actions={
        <>
          <Button kind={isDanger ? 'danger' : 'primary'} isPending={isPending} onClick={confirm}>
            {confirmLabel}
          </Button>
          <Button onClick={onClose} disabled={isPending}>
            Leave as it is
          </Button>
        </>
      }
    >
      {children}
      {asksReason ? (
        <Field
          label="Reason"
          hint={reasonHint ?? 'Kept in the audit trail with your name.'}
          error={fault.reason}
        >
          <Textarea
            value={reason}
            onChange={(event) => setReason(event.target.value)}
            maxLength={1000}
            rows={3}
          />
        </Field>
      ) : null}
      {fault.whole ? (
        <p className="field-error" role="status">
          {fault.whole}
        </p>
      ) : null}
    </Dialog>
  );
}
