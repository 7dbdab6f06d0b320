import { useState } from 'react';
import type { ExclusionCode } from '../../../../../shared/contracts/vocabulary.ts';
import { exclusionCodes } from '../../../../../shared/contracts/vocabulary.ts';
import { EXCLUSION_LABELS } from '../../../../../shared/format/calibration-words.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Dialog } from '../../../components/ui/dialog.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { RadioGroup } from '../../../components/ui/radio-group.tsx';
import { TextInput } from '../../../components/ui/text-input.tsx';
import { excludeDeed } from '../offline/deeds.ts';
import type { RunCapture } from '../offline/run-state.ts';
import { useBench } from './bench-context.ts';

/** A reading is never edited or deleted: it is excluded, with a reason from the list, and stays visible. */
export function ExcludeDialog({ capture, onClose }: { capture: RunCapture; onClose: () => void }) {
  const { view, add } = useBench();
  const [code, setCode] = useState<ExclusionCode | null>(null);
  const [note, setNote] = useState('');
  const exclude = async () => {
    if (!code) return;
    const reason = { code, note: note.trim() || null, capturedAt: new Date().toISOString() };
    await add(excludeDeed(view.calibration.id, capture.key, reason));
    onClose();
  };
  return (
    <Dialog
      isOpen
      onClose={onClose}
      title={`Exclude replicate ${capture.position}`}
      sentence="It stays in the record, struck through with this reason, and does not count. This cannot be taken back."
      actions={
        <>
          <Button kind="danger" onClick={exclude} disabled={code === null}>
            Exclude it
          </Button>
          <Button onClick={onClose}>Keep it</Button>
        </>
      }
    >
      <RadioGroup
        legend="What happened"
        options={exclusionCodes.map((value) => ({ value, label: EXCLUSION_LABELS[value] }))}
        value={code}
        onChange={(value) => setCode(exclusionCodes.find((one) => one === value) ?? null)}
      />
      <Field label="In your words" isOptional>
        <TextInput value={note} maxLength={400} onChange={(event) => setNote(event.target.value)} />
      </Field>
    </Dialog>
  );
}
