import type { ReactNode } from 'react';
import { useEffect, useState } from 'react';
import { Field } from './field.tsx';
import { TextInput } from './text-input.tsx';

/** The filters of a list in one line, above its head. */
export function Filters({ label, children }: { label: string; children: ReactNode }) {
  return (
    <div className="filters" role="search" aria-label={label}>
      {children}
    </div>
  );
}

export interface SearchFieldProps {
  label: string;
  placeholder?: string;
  /** What the list is filtered by now. */
  value: string;
  onSearch: (text: string) => void;
}

/** Long enough that a word typed at speed is one question, short enough to feel immediate. */
const PAUSE_MS = 200;

/** Free text that filters a list while one types; the list is asked when the fingers rest. */
export function SearchField({ label, placeholder, value, onSearch }: SearchFieldProps) {
  const [text, setText] = useState(value);
  const [seen, setSeen] = useState(value);
  if (value !== seen) {
    setSeen(value);
    // Cleared from outside, by a button or another link to this page.
    if (value === '') setText('');
  }
  useEffect(() => {
    if (text.trim() === value) return undefined;
    const timer = setTimeout(() => onSearch(text.trim()), PAUSE_MS);
    return () => clearTimeout(timer);
  }, [text, value, onSearch]);
  return (
    <Field label={label} className="filters-search">
      <TextInput
        type="search"
        value={text}
        placeholder={placeholder}
        maxLength={120}
        autoComplete="off"
        onChange={(event) => setText(event.target.value)}
      />
    </Field>
  );
}
