import type { ReactNode } from 'react';
import { useEffect, useState } from 'react';
import { Button, classNames } from './button.tsx';
import { Field } from './field.tsx';
import { TextInput } from './text-input.tsx';

export interface FiltersProps {
  label: string;
  /** Something narrows the list already: what does must be in sight. */
  isNarrowed?: boolean;
  children: ReactNode;
}

/** The filters of a list in one line, above its head; on a phone all but the search wait behind a button. */
export function Filters({ label, isNarrowed = false, children }: FiltersProps) {
  const [isOpen, setIsOpen] = useState(isNarrowed);
  return (
    <div className={classNames('filters', isOpen && 'is-open')} role="search" aria-label={label}>
      {children}
      <Button className="filters-more" aria-expanded={isOpen} onClick={() => setIsOpen(!isOpen)}>
        {isOpen ? 'Fewer filters' : 'Filters and order'}
      </Button>
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
