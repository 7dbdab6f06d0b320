import type { FormEvent } from 'react';
import { useRef, useState } from 'react';
import { capitalise } from '../../../../../shared/format/labels.ts';
import { formatCount } from '../../../../../shared/format/numbers.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Dialog } from '../../../components/ui/dialog.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { FormRefusal } from '../../../components/ui/form-refusal.tsx';
import { NumberInput } from '../../../components/ui/number-input.tsx';
import { Select } from '../../../components/ui/select.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { useSubmission } from '../../../lib/use-submission.ts';
import { useReceiveBottles } from '../api.ts';

interface ReceiveDialogProps {
  lot: { id: number; code: string };
  sites: readonly { id: number; name: string }[];
  onClose: () => void;
}

/** Take bottles into stock; the server numbers them on from the last one. */
export function ReceiveDialog({ lot, sites, onClose }: ReceiveDialogProps) {
  const form = useRef<HTMLFormElement>(null);
  const [count, setCount] = useState<number | null>(1);
  const [volumeMl, setVolumeMl] = useState<number | null>(500);
  const [siteId, setSiteId] = useState('');
  const receive = useReceiveBottles();
  const say = useToast();
  const { isPending, refusal, issueFor, submit } = useSubmission(form);
  const send = async (event?: FormEvent) => {
    event?.preventDefault();
    const isDone = await submit(() =>
      receive.mutateAsync({
        standardId: lot.id,
        siteId: siteId === '' ? null : Number(siteId),
        count: count ?? Number.NaN,
        volumeMl: volumeMl ?? Number.NaN,
      }),
    );
    if (!isDone) return;
    say(`${capitalise(formatCount(count ?? 0, 'bottle'))} of ${lot.code} received. Print the labels next.`);
    onClose();
  };
  return (
    <Dialog
      isOpen
      onClose={onClose}
      isLocked={isPending}
      title={`Receive bottles of ${lot.code}`}
      sentence="Each gets the next number of the lot and a label with a code to scan."
      actions={
        <>
          <Button kind="primary" isPending={isPending} onClick={() => send()}>
            Receive
          </Button>
          <Button onClick={onClose} disabled={isPending}>
            Cancel
          </Button>
        </>
      }
    >
      <form ref={form} className="form" onSubmit={(event) => void send(event)} noValidate>
        <div className="form-pair">
          <Field label="Bottles" error={issueFor('count')}>
            <NumberInput value={count} onChange={setCount} />
          </Field>
          <Field label="Volume of each" error={issueFor('volumeMl')}>
            <NumberInput unit="mL" value={volumeMl} onChange={setVolumeMl} />
          </Field>
        </div>
        <Field label="Kept at" error={issueFor('siteId')}>
          <Select
            placeholder="no site: carried along"
            options={sites.map((site) => ({ value: String(site.id), label: site.name }))}
            value={siteId}
            onChange={(event) => setSiteId(event.target.value)}
          />
        </Field>
        <FormRefusal>{refusal}</FormRefusal>
      </form>
    </Dialog>
  );
}
