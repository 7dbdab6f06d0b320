import type { KeyboardEvent } from 'react';
import { useEffect, useId, useRef, useState } from 'react';

export interface SearchResult {
  key: string;
  label: string;
  /** Where it is and what it is, in a few words. */
  hint?: string;
}

export interface SearchBoxProps {
  label: string;
  placeholder?: string;
  text: string;
  onTextChange: (text: string) => void;
  /** Results for the text; the list is shown while there is text and focus. */
  results: readonly SearchResult[];
  isSearching?: boolean;
  /** Said when there is text and no result. */
  emptySentence?: string;
  onChoose: (result: SearchResult) => void;
  /** Focus from anywhere by pressing this key outside a field. */
  hotkey?: string;
}

/** A search field with its results as a listbox: arrow keys move, Enter goes, Escape closes. */
export function SearchBox(props: SearchBoxProps) {
  const { label, placeholder, text, onTextChange, results, isSearching, emptySentence, onChoose, hotkey } =
    props;
  const id = useId();
  const ref = useRef<HTMLInputElement>(null);
  const [isOpen, setIsOpen] = useState(false);
  const [active, setActive] = useState(0);
  useHotkey(hotkey, () => ref.current?.focus());
  const isShown = isOpen && text.trim() !== '';
  const at = Math.min(active, Math.max(0, results.length - 1));

  const choose = (result: SearchResult) => {
    setIsOpen(false);
    onTextChange('');
    ref.current?.blur();
    onChoose(result);
  };
  const onKeyDown = (event: KeyboardEvent) => {
    const step = { ArrowDown: 1, ArrowUp: -1 }[event.key];
    const chosen = results[at];
    if (step !== undefined && results.length > 0) {
      event.preventDefault();
      setActive((at + step + results.length) % results.length);
    } else if (event.key === 'Enter' && isShown && chosen) {
      event.preventDefault();
      choose(chosen);
    } else if (event.key === 'Escape') {
      setIsOpen(false);
      onTextChange('');
    }
  };
  return (
    <div className="rail-search listbox-frame" role="search">
      <input
        ref={ref}
        type="search"
        role="combobox"
        aria-label={label}
        aria-expanded={isShown}
        aria-controls={`${id}-list`}
        aria-autocomplete="list"
        aria-activedescendant={isShown && results.length > 0 ? `${id}-${at}` : undefined}
        autoComplete="off"
        placeholder={placeholder ?? (hotkey ? `Search  ${hotkey}` : 'Search')}
        value={text}
        onChange={(event) => {
          setActive(0);
          setIsOpen(true);
          onTextChange(event.target.value);
        }}
        onFocus={() => setIsOpen(true)}
        onBlur={() => setIsOpen(false)}
        onKeyDown={onKeyDown}
      />
      {isShown ? (
        <div className="listbox">
          <div id={`${id}-list`} role="listbox" aria-label={label}>
            {results.map((result, i) => (
              <div
                key={result.key}
                id={`${id}-${i}`}
                role="option"
                aria-selected={i === at}
                className="menu-item"
                // The press must land before the field loses focus and the list goes.
                onPointerDown={(event) => {
                  event.preventDefault();
                  choose(result);
                }}
                onPointerMove={() => setActive(i)}
              >
                <span>{result.label}</span>
                {result.hint ? <small>{result.hint}</small> : null}
              </div>
            ))}
          </div>
          {results.length === 0 ? (
            <p className="listbox-note" role="status">
              {isSearching
                ? 'Searching…'
                : (emptySentence ?? 'Nothing found. Try a part of the name or the tag.')}
            </p>
          ) : null}
        </div>
      ) : null}
    </div>
  );
}

function useHotkey(key: string | undefined, act: () => void): void {
  const latest = useRef(act);
  useEffect(() => {
    latest.current = act;
  });
  useEffect(() => {
    if (!key) return undefined;
    const listen = (event: globalThis.KeyboardEvent) => {
      const isTyping =
        event.target instanceof Element && event.target.closest('input,textarea,select,[contenteditable]');
      if (event.key !== key || isTyping || event.ctrlKey || event.metaKey || event.altKey) return;
      event.preventDefault();
      latest.current();
    };
    document.addEventListener('keydown', listen);
    return () => document.removeEventListener('keydown', listen);
  }, [key]);
}
