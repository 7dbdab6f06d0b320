import type { Bottle } from '../../../../../shared/contracts/bottles.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Dialog } from '../../../components/ui/dialog.tsx';
import { bottleLabel } from '../api.ts';

/** The label as it is printed; printing this page prints the label alone. */
export function LabelDialog({ bottle, onClose }: { bottle: Bottle; onClose: () => void }) {
  return (
    <Dialog
      isOpen
      onClose={onClose}
      className="label-dialog"
      title={`Label of ${bottle.code}`}
      sentence="62 × 29 mm. The square holds the bottle’s code; a phone reads it at the start of a run."
      actions={
        <>
          <Button kind="primary" onClick={() => window.print()}>
            Print label
          </Button>
          <Button onClick={onClose}>Close</Button>
        </>
      }
    >
      <img className="bottle-label" src={bottleLabel(bottle.id)} alt={`Label of bottle ${bottle.code}`} />
    </Dialog>
  );
}
