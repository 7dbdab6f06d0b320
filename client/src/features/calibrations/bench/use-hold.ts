import type { KeyboardEvent, MouseEvent, PointerEvent } from 'react';
import { useEffect, useRef, useState } from 'react';

/** Long enough that drops of water and a brushing sleeve do not capture, short enough to do it thirty times. */
export const HOLD_MS = 600;

export interface Hold {
  isHolding: boolean;
  /** Put on the button. */
  handlers: {
    onPointerDown: (event: PointerEvent) => void;
    onPointerUp: () => void;
    onPointerCancel: () => void;
    onKeyDown: (event: KeyboardEvent) => void;
    onKeyUp: (event: KeyboardEvent) => void;
    onBlur: () => void;
    onClick: (event: MouseEvent) => void;
    onContextMenu: (event: MouseEvent) => void;
  };
}

const isPressKey = (key: string): boolean => key === ' ' || key === 'Enter';

/** Press and hold, by finger, mouse or keyboard. Letting go early does nothing. */
export function useHold(isEnabled: boolean, onHeld: () => void): Hold {
  const [isHolding, setIsHolding] = useState(false);
  const timer = useRef<ReturnType<typeof setTimeout> | null>(null);
  const release = () => {
    if (timer.current !== null) clearTimeout(timer.current);
    timer.current = null;
    setIsHolding(false);
  };
  const press = () => {
    if (!isEnabled || timer.current !== null) return;
    setIsHolding(true);
    timer.current = setTimeout(() => {
      release();
      onHeld();
    }, HOLD_MS);
  };
  useEffect(
    () => () => {
      if (timer.current !== null) clearTimeout(timer.current);
    },
    [],
  );
  return {
    isHolding,
    handlers: {
      onPointerDown: (event) => {
        if (event.button !== 0) return;
        event.currentTarget.setPointerCapture(event.pointerId);
        press();
      },
      onPointerUp: release,
      onPointerCancel: release,
      onKeyDown: (event) => {
        if (!isPressKey(event.key)) return;
        event.preventDefault();
        if (!event.repeat) press();
      },
      onKeyUp: (event) => {
        if (!isPressKey(event.key)) return;
        event.preventDefault();
        release();
      },
      onBlur: release,
      onClick: (event) => {
        // Screen readers activate without pressing anything that could be held; finger and mouse count their clicks.
        if (event.detail === 0 && isEnabled && timer.current === null) onHeld();
      },
      onContextMenu: (event) => event.preventDefault(),
    },
  };
}
