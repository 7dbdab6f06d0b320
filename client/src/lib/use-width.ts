import { useCallback, useState } from 'react';

/** Below this container width the phone layout takes over. */
export const NARROW_PX = 600;

/**
 * The width of an element as laid out, px, kept up to date; `initial` until then. The ref is a function because the
 * element may come later than the component, after an empty or loading face.
 */
export function useWidth<E extends HTMLElement>(initial: number) {
  const [width, setWidth] = useState(initial);
  const ref = useCallback((element: E | null) => {
    if (!element) return undefined;
    const measure = () => {
      // An element that is not laid out yet has no width and says nothing.
      if (element.clientWidth > 0) setWidth(element.clientWidth);
    };
    measure();
    const observer = new ResizeObserver(measure);
    observer.observe(element);
    return () => observer.disconnect();
  }, []);
  return [ref, width] as const;
}

/**
 * Whether an element is narrower than a limit; the container decides, not the window. Used where the two layouts
 * differ in content, so that only one of them is in the document; plain restyling is left to container queries.
 */
export function useIsNarrow<E extends HTMLElement>(limitPx = NARROW_PX) {
  const [ref, width] = useWidth<E>(Number.MAX_SAFE_INTEGER);
  return [ref, width < limitPx] as const;
}
