import { useEffect } from 'react';

/** The page's name in the browser tab, most particular first. */
export function useDocumentTitle(name: string): void {
  useEffect(() => {
    document.title = name ? `${name} · Saltmark` : 'Saltmark';
  }, [name]);
}
