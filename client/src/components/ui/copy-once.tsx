import { useState } from 'react';
import { Button } from './button.tsx';

export interface CopyOnceProps {
  /** What it is: "Password of device sk-04". */
  label: string;
  secret: string;
}

/** A secret that is shown once: whole, selectable, with a copy button that says what happened. */
export function CopyOnce({ label, secret }: CopyOnceProps) {
  const [outcome, setOutcome] = useState<'none' | 'copied' | 'refused'>('none');
  const copy = async () => {
    try {
      await navigator.clipboard.writeText(secret);
      setOutcome('copied');
    } catch {
      // Browsers allow the clipboard on secure addresses only; the text can still be selected.
      setOutcome('refused');
    }
  };
  return (
    <div className="secret">
      <p className="field-label">{label}</p>
      <code className="secret-value">{secret}</code>
      <div className="mt-3 flex flex-wrap items-center gap-4">
        <Button onClick={copy}>Copy</Button>
        <span role="status">
          {outcome === 'copied' ? 'Copied. Store it now: it is not shown again.' : null}
          {outcome === 'refused'
            ? 'The browser did not allow copying. Select the text and copy it by hand.'
            : null}
          {outcome === 'none' ? 'Shown once. Store it before you close this.' : null}
        </span>
      </div>
    </div>
  );
}
