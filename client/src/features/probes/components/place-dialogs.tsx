import type { FormEvent, ReactNode } from 'react';
import { useRef, useState } from 'react';
import type { Probe } from '../../../../../shared/contracts/probes.ts';
import { zonedInputToInstant } from '../../../../../shared/format/zoned-input.ts';
import { Button } from '../../../components/ui/button.tsx';
import { ConfirmDialog } from '../../../components/ui/confirm-dialog.tsx';
import { Dialog } from '../../../components/ui/dialog.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { Textarea, TextInput } from '../../../components/ui/text-input.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { useSubmission } from '../../../lib/use-submission.ts';
import { usePlaceProbe } from '../api.ts';
import { probeName } from '../model.ts';

export interface PointFieldProps {
  value: number | null;
  onChange: (pointId: number | null) => void;
  error?: string | undefined;
}
/** The choice of a free point; points are another slice, so the page brings it. */
export type PointFieldRender = (props: PointFieldProps) => ReactNode;

interface DialogProps {
  probe: Probe;
  onClose: () => void;
}
interface PlaceDialogProps extends DialogProps {
  timeZone: string;
  renderPointField: PointFieldRender;
}

export function InstallDialog(props: PlaceDialogProps) {
  const install = usePlaceProbe(props.probe.id, 'install');
  return (
    <PlaceDialog
      {...props}
      title={`Install ${props.probe.tag}`}
      sentence="From then on its readings count for that point and are judged by its tolerance."
      verb="Install"
      send={({ pointId, at, text }) =>
        install.mutateAsync({ pointId, ...at, note: text || null, version: props.probe.version })
      }
      textLabel="Note"
      said="is installed."
    />
  );
}

export function MoveDialog(props: PlaceDialogProps) {
  const move = usePlaceProbe(props.probe.id, 'move');
  return (
    <PlaceDialog
      {...props}
      title={`Move ${props.probe.tag}`}
      sentence={`It stands at ${probeName(props.probe)} now. Its history and its device credentials go with it.`}
      verb="Move"
      send={({ pointId, at, text }) =>
        move.mutateAsync({ pointId, ...at, note: null, reason: text, version: props.probe.version })
      }
      textLabel="Reason"
      said="is moved."
    />
  );
}

interface Placing {
  pointId: number;
  at: { at?: string };
  text: string;
}

interface PlaceFormProps extends PlaceDialogProps {
  title: string;
  sentence: string;
  verb: string;
  textLabel: 'Note' | 'Reason';
  said: string;
  send: (placing: Placing) => Promise<unknown>;
}

function PlaceDialog(props: PlaceFormProps) {
  const { probe, onClose, timeZone, renderPointField, title, sentence, verb, textLabel, said, send } = props;
  const form = useRef<HTMLFormElement>(null);
  const [pointId, setPointId] = useState<number | null>(null);
  const [when, setWhen] = useState('');
  const [text, setText] = useState('');
  const { isPending, refusal, issueFor, submit } = useSubmission(form);
  const say = useToast();
  const place = async (event?: FormEvent) => {
    event?.preventDefault();
    const at = when ? { at: zonedInputToInstant(when, timeZone) } : {};
    const issues = {
      ...(pointId === null ? { pointId: 'Choose the point.' } : {}),
      ...(textLabel === 'Reason' && !text.trim() ? { reason: 'Write the reason in a few words.' } : {}),
    };
    if (!(await submit(() => send({ pointId: pointId ?? 0, at, text: text.trim() }), issues))) return;
    say(`${probe.tag} ${said}`);
    onClose();
  };
  return (
    <Dialog
      isOpen
      onClose={onClose}
      isLocked={isPending}
      title={title}
      sentence={sentence}
      actions={
        <>
          <Button kind="primary" isPending={isPending} onClick={() => place()}>
            {verb}
          </Button>
          <Button onClick={onClose} disabled={isPending}>
            Cancel
          </Button>
        </>
      }
    >
      <form ref={form} className="form" onSubmit={(event) => void place(event)} noValidate>
        {renderPointField({
          value: pointId,
          onChange: setPointId,
          error: issueFor('pointId'),
        })}
        <WhenField value={when} onChange={setWhen} timeZone={timeZone} error={issueFor('at')} />
        <Field
          label={textLabel}
          isOptional={textLabel === 'Note'}
          hint={textLabel === 'Reason' ? 'Kept in the audit trail with your name.' : undefined}
          error={issueFor('reason') ?? issueFor('note')}
        >
          <Textarea
            rows={2}
            maxLength={1000}
            value={text}
            onChange={(event) => setText(event.target.value)}
          />
        </Field>
        {refusal ? (
          <p className="field-error" role="alert">
            {refusal}
          </p>
        ) : null}
      </form>
    </Dialog>
  );
}

interface WhenFieldProps {
  value: string;
  onChange: (value: string) => void;
  timeZone: string;
  error: string | undefined;
}

function WhenField({ value, onChange, timeZone, error }: WhenFieldProps) {
  return (
    <Field
      label="When"
      isOptional
      hint={`Empty means now. Otherwise the time at the site, ${timeZone}.`}
      error={error}
    >
      <TextInput type="datetime-local" value={value} onChange={(event) => onChange(event.target.value)} />
    </Field>
  );
}

export function RemoveDialog({ probe, onClose, timeZone }: DialogProps & { timeZone: string }) {
  const remove = usePlaceProbe(probe.id, 'remove');
  const [when, setWhen] = useState('');
  const say = useToast();
  return (
    <ConfirmDialog
      isOpen
      onClose={onClose}
      title={`Take ${probe.tag} out of ${probeName(probe)}?`}
      sentence="The point is without a probe then. The probe is kept as a spare with all its history."
      confirmLabel="Take out"
      asksReason
      onConfirm={async (reason) => {
        const at = when ? { at: zonedInputToInstant(when, timeZone) } : {};
        await remove.mutateAsync({ ...at, reason, version: probe.version });
        say(`${probe.tag} is taken out and kept as a spare.`);
      }}
    >
      <WhenField value={when} onChange={setWhen} timeZone={timeZone} error={undefined} />
    </ConfirmDialog>
  );
}

export function RetireDialog({ probe, onClose }: DialogProps) {
  const retire = usePlaceProbe(probe.id, 'retire');
  const say = useToast();
  return (
    <ConfirmDialog
      isOpen
      onClose={onClose}
      title={`Retire ${probe.tag}?`}
      sentence="It is taken out of its point, and its device can no longer sign in. Its history stays readable. This cannot be undone."
      confirmLabel="Retire probe"
      isDanger
      asksReason
      onConfirm={async (reason) => {
        await retire.mutateAsync({ reason, version: probe.version });
        say(`${probe.tag} is retired.`);
      }}
    />
  );
}
