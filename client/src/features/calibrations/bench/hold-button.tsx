import { classNames } from '../../../components/ui/button.tsx';
import { useHold } from './use-hold.ts';

export interface HoldButtonProps {
  isEnabled: boolean;
  /** While it cannot be pressed: what one waits for. */
  waiting: string;
  /** What holding does: `capture replicate 4`. */
  what: string;
  label?: string;
  onHeld: () => void;
}

/** Press and hold to capture: fills while held, lets go without harm. */
export function HoldButton({ isEnabled, waiting, what, label = 'Press and hold', onHeld }: HoldButtonProps) {
  const { isHolding, handlers } = useHold(isEnabled, onHeld);
  return (
    <button
      type="button"
      className={classNames('capture', isHolding && 'is-held')}
      aria-disabled={!isEnabled || undefined}
      {...handlers}
    >
      <i className="capture-fill" aria-hidden="true" />
      <span>{!isEnabled ? waiting : isHolding ? 'Keep holding' : label}</span>
      <small>
        {!isEnabled ? 'then press and hold' : isHolding ? `capturing ${what}` : `to capture ${what}`}
      </small>
    </button>
  );
}
