import { useEffect, useRef } from 'react';
import { useLocation } from 'react-router-dom';

/** The address whose heading had the focus last; the first page keeps the browser's own start. */
let focusedFor: string | null = null;

/** Moves the focus to the page's heading after navigation, so that screen readers announce where one is now. */
export function useHeadingFocus() {
  const { pathname } = useLocation();
  const ref = useRef<HTMLHeadingElement>(null);
  useEffect(() => {
    if (focusedFor !== null && focusedFor !== pathname) ref.current?.focus({ preventScroll: true });
    focusedFor = pathname;
  }, [pathname]);
  return ref;
}
