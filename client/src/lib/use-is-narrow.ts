import { useLayoutEffect, useRef, useState } from 'react';

/** Below this container width the phone layout takes over. */
export const NARROW_PX = 600;

/**
 * Whether an element is narrower than a limit; the container decides, not the window. Used where the two layouts
 * differ in content, so that only one of them is in the document; plain restyling is left to container queries.
 */
export function useIsNarrow<E extends HTMLElement>(limitPx = NARROW_PX) {
  const ref = useRef<E>(null);
  const [isNarrow, setIsNarrow] = useState(false);
  useLayoutEffect(() => {
    const element = ref.current;
    if (!element) return undefined;
    const measure = () => {
      const width = element.clientWidth;
      // An element that is not laid out yet has no width and says nothing.
      if (width > 0) setIsNarrow(width < limitPx);
    };
    measure();
    const observer = new ResizeObserver(measure);
    observer.observe(element);
    return () => observer.disconnect();
  }, [limitPx]);
  return [ref, isNarrow] as const;
}
