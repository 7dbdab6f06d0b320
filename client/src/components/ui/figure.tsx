import type { CSSProperties, ReactNode } from 'react';
import { useEffect, useRef } from 'react';
import type { ValueWithUncertainty } from '../../../../shared/format/numbers.ts';
import { NO_VALUE } from '../../../../shared/format/numbers.ts';
import { classNames } from './button.tsx';

export interface FigureProps {
  /** A formatted number; null prints a dash. */
  text: string | null;
  /** Characters before the point that the column reserves. */
  whole?: number;
  /** Characters from the point on that the column reserves. */
  fraction?: number;
}

/** A figure in a column: points stand in one line, integers right-aligned. */
export function Figure({ text, whole = 5, fraction = 3 }: FigureProps) {
  const [before = '', after] = (text ?? NO_VALUE).split('.');
  const style = { '--whole': whole, '--fraction': fraction } as CSSProperties;
  return (
    <span className="fig" style={style}>
      <span className="fig-whole">{before}</span>
      <span className="fig-fraction">{after === undefined ? '' : `.${after}`}</span>
    </span>
  );
}

export interface QuantityProps {
  /** From formatWithUncertainty or formatConductivity. */
  quantity: ValueWithUncertainty;
  /** How the value may be taken: struck through, held, gone. A value that must not be used has no U. */
  state?: 'plain' | 'stop' | 'held' | 'gone';
  /** Value and unit above, U below: the phone row. */
  isStacked?: boolean;
  /** Underline for a moment when the value changes. */
  isLive?: boolean;
  whole?: number;
  fraction?: number;
}

/** Value, ± U and unit, each at its fixed place. */
export function Quantity(props: QuantityProps) {
  const { quantity, state = 'plain', isStacked = false, isLive = false, whole = 5, fraction = 3 } = props;
  const ref = useChangeMark(quantity.value, isLive);
  const hasU = quantity.uncertainty !== null && state === 'plain';
  return (
    <span className={classNames('quantity', state !== 'plain' && `is-${state}`, isStacked && 'is-stacked')}>
      <span className="quantity-value" ref={ref}>
        <Figure text={quantity.value} whole={whole} fraction={fraction} />
      </span>
      <span
        className="quantity-u"
        style={isStacked ? undefined : { width: `calc(${4 + fraction}ch + 12px)` }}
      >
        {hasU ? (
          <>
            ±{' '}
            {isStacked ? (
              quantity.uncertainty
            ) : (
              <Figure text={quantity.uncertainty} whole={2} fraction={fraction} />
            )}
          </>
        ) : null}
      </span>
      <span className="quantity-unit">{quantity.unit}</span>
    </span>
  );
}

/** Restarts the underline each time the text changes; put the ref on the element of the figure. */
export function useChangeMark(text: string, isLive: boolean) {
  const ref = useRef<HTMLSpanElement>(null);
  const last = useRef(text);
  useEffect(() => {
    const element = ref.current;
    if (!isLive || !element || last.current === text) return;
    last.current = text;
    element.classList.remove('figure-changed');
    // Reading a layout value makes the browser notice the removal, so that the animation runs again.
    void element.offsetWidth;
    element.classList.add('figure-changed');
  }, [text, isLive]);
  return ref;
}

export interface NameCellProps {
  name: ReactNode;
  /** Kind and tag, or whatever says which one. */
  note?: ReactNode;
  /** For a second name in a row: who works there. */
  isSmall?: boolean;
}

/** First cell of a ledger row: name in mono, kind and tag under it. */
export function NameCell({ name, note, isSmall = false }: NameCellProps) {
  return (
    <span className={classNames('name-cell', isSmall && 'is-small')}>
      <b>{name}</b>
      {note ? <small>{note}</small> : null}
    </span>
  );
}
