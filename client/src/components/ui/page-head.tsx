import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';
import { useDocumentTitle } from '../../lib/use-document-title.ts';
import { useHeadingFocus } from '../../lib/use-heading-focus.ts';
import { classNames } from './button.tsx';

export interface PageHeadProps {
  /** The page's name; also the title of the browser tab. */
  name: string;
  /** One or two sentences: the situation and its exception (in <b>). */
  sentence?: ReactNode;
  /** Right: a <Clock/>, an as-of date or the page's one button. */
  aside?: ReactNode;
  /** On a phone the rail shows this name already: it is then kept for screen readers only. */
  isNamedInRail?: boolean;
}

/** Name | sentence | clock. Every page opens with it. */
export function PageHead({ name, sentence, aside, isNamedInRail = false }: PageHeadProps) {
  useDocumentTitle(name);
  const heading = useHeadingFocus();
  return (
    <div className={classNames('page-head', isNamedInRail && 'is-named-in-rail')}>
      <h1 ref={heading} tabIndex={-1}>
        {name}
      </h1>
      <p className="page-head-sentence">{sentence}</p>
      {aside}
    </div>
  );
}

export interface Crumb {
  label: string;
  to: string;
}

/** Where this page is, above its name. */
export function Crumbs({ items }: { items: readonly Crumb[] }) {
  return (
    <nav className="crumbs" aria-label="Where this is">
      <ol>
        {items.map((item) => (
          <li key={item.to}>
            <Link to={item.to}>{item.label}</Link>
          </li>
        ))}
      </ol>
    </nav>
  );
}

export interface SectionTitleProps {
  children: ReactNode;
  /** Said after the name: unit, order, what the band is. */
  note?: ReactNode;
}

/** Head of a section of a page. */
export function SectionTitle({ children, note }: SectionTitleProps) {
  return (
    <h2 className="section-title">
      {children}
      {note ? <small>{note}</small> : null}
    </h2>
  );
}
