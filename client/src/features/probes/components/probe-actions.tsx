import { useState } from 'react';
import type { Probe } from '../../../../../shared/contracts/probes.ts';
import { Button } from '../../../components/ui/button.tsx';
import type { MenuItem } from '../../../components/ui/menu.tsx';
import { Menu } from '../../../components/ui/menu.tsx';
import { ChangeProbeDialog } from './change-probe-dialog.tsx';
import { NoteDialog } from './note-dialog.tsx';
import type { PointFieldRender } from './place-dialogs.tsx';
import { InstallDialog, MoveDialog, RemoveDialog, RetireDialog } from './place-dialogs.tsx';

type Step = 'install' | 'move' | 'remove' | 'retire' | 'note' | 'change';

export interface ProbeActionsProps {
  probe: Probe;
  timeZone: string;
  renderPointField: PointFieldRender;
  /** Hold or put back the point: the first thing one does at a probe. */
  hold: { label: string; onPress: () => void } | null;
}

/** What this person may do with the probe; the server said so in `can`. */
export function ProbeActions({ probe, timeZone, renderPointField, hold }: ProbeActionsProps) {
  const [step, setStep] = useState<Step | null>(null);
  const { can } = probe;
  const close = () => setStep(null);
  const items = [
    can.move && { label: 'Move to another point…', onSelect: () => setStep('move') },
    can.remove && { label: 'Take out of the point…', onSelect: () => setStep('remove') },
    can.addNote && { label: 'Write a note…', onSelect: () => setStep('note') },
    can.change && { label: 'Correct what is recorded…', onSelect: () => setStep('change') },
    can.retire && { label: 'Retire…', isDanger: true, onSelect: () => setStep('retire') },
  ].filter((item): item is MenuItem & { onSelect: () => void } => item !== false);
  const dialog = { probe, onClose: close };
  return (
    <>
      {can.install ? (
        <Button kind="primary" onClick={() => setStep('install')}>
          Install…
        </Button>
      ) : null}
      {hold ? (
        <Button kind={can.install ? 'plain' : 'primary'} onClick={hold.onPress}>
          {hold.label}
        </Button>
      ) : null}
      {items.length > 0 ? (
        <Menu label="More to do" align="end" items={items} trigger={<Button>More…</Button>} />
      ) : null}
      {step === 'install' ? <InstallDialog {...dialog} {...{ timeZone, renderPointField }} /> : null}
      {step === 'move' ? <MoveDialog {...dialog} {...{ timeZone, renderPointField }} /> : null}
      {step === 'remove' ? <RemoveDialog {...dialog} timeZone={timeZone} /> : null}
      {step === 'retire' ? <RetireDialog {...dialog} /> : null}
      {step === 'note' ? <NoteDialog {...dialog} /> : null}
      {step === 'change' ? <ChangeProbeDialog {...dialog} /> : null}
    </>
  );
}
