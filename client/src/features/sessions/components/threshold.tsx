import type { ReactNode } from 'react';
import { useDocumentTitle } from '../../../lib/use-document-title.ts';
import { Tide, WordMark } from './tide.tsx';

export interface ThresholdProps {
  /** What is done here: "Sign in". */
  title: string;
  /** The form; it stands on the water line. */
  children: ReactNode;
  /** Under the water line. */
  below?: ReactNode;
}

/** The pages before the door: tide lines, the mark on the water, one form. */
export function Threshold({ title, children, below }: ThresholdProps) {
  useDocumentTitle(title);
  return (
    <main className="threshold">
      <div className="threshold-air">
        <Tide />
        <h1 className="threshold-name">
          <span className="sr-only">Saltmark</span>
          <WordMark />
        </h1>
        <p className="threshold-line">Which probes can be trusted, and by how much.</p>
        <section className="threshold-form" aria-label={title}>
          {children}
        </section>
      </div>
      <div className="threshold-water">{below}</div>
    </main>
  );
}
