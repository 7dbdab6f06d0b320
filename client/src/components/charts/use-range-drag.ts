import type { PointerEvent } from 'react';
import { useState } from 'react';

/** Narrower than this it was a press, not a drag, px. */
const DRAG_MIN = 8;

export interface RangeDrag {
  start: number;
  end: number;
}

/** Choosing a range of time by dragging over a chart; places in px from its left edge. */
export function useRangeDrag(onChosen: ((left: number, right: number) => void) | undefined) {
  const [drag, setDrag] = useState<RangeDrag | null>(null);
  const place = (event: PointerEvent<HTMLElement>) =>
    event.clientX - event.currentTarget.getBoundingClientRect().left;
  if (!onChosen) return { drag: null, pointerProps: {} };
  return {
    drag,
    pointerProps: {
      onPointerDown: (event: PointerEvent<HTMLElement>) => {
        // A finger scrolls the page; the range buttons serve it.
        if (event.button !== 0 || event.pointerType === 'touch') return;
        event.currentTarget.setPointerCapture(event.pointerId);
        setDrag({ start: place(event), end: place(event) });
      },
      onPointerUp: (event: PointerEvent<HTMLElement>) => {
        if (!drag) return;
        const [left, right] = [Math.min(drag.start, place(event)), Math.max(drag.start, place(event))];
        setDrag(null);
        if (right - left >= DRAG_MIN) onChosen(left, right);
      },
      onPointerCancel: () => setDrag(null),
    },
    follow: (event: PointerEvent<HTMLElement>) => {
      if (drag) setDrag({ start: drag.start, end: place(event) });
      return place(event);
    },
  };
}
