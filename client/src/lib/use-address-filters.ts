import { useCallback } from 'react';
import { useSearchParams } from 'react-router-dom';

export interface AddressFilters {
  /** What the address says for this name; an empty text when it says nothing. */
  read: (name: string) => string;
  /** Puts values into the address; empty ones leave it. The back button goes to the page before, not the filter before. */
  write: (changes: Readonly<Record<string, string | number | null>>) => void;
}

/** Filters of a list live in the address: a reload, a rotation or a link keeps them. */
export function useAddressFilters(): AddressFilters {
  const [params, setParams] = useSearchParams();
  const write = useCallback<AddressFilters['write']>(
    (changes) =>
      setParams((before) => withChanges(before, changes), { replace: true, preventScrollReset: true }),
    [setParams],
  );
  return { read: (name) => params.get(name) ?? '', write };
}

function withChanges(before: URLSearchParams, changes: Parameters<AddressFilters['write']>[0]) {
  const next = new URLSearchParams(before);
  for (const [name, value] of Object.entries(changes)) {
    if (value === null || value === '') next.delete(name);
    else next.set(name, String(value));
  }
  return next;
}

/** A filter value that is one of a closed list, or undefined: an address can hold anything. */
export function oneOf<Code extends string>(codes: readonly Code[], text: string): Code | undefined {
  return codes.find((code) => code === text);
}

/** A filter value that is an identity, or undefined. */
export function idOf(text: string): number | undefined {
  return /^[1-9]\d{0,9}$/.test(text) ? Number(text) : undefined;
}
