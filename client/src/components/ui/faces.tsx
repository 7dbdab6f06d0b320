import type { ReactNode } from 'react';
import { Button } from './button.tsx';

export interface LoadingFaceProps {
  /** What is being fetched: "Fetching probes". */
  label: string;
  /** Rows that will come, so that nothing jumps. */
  rows?: number;
  /** Height of one row, px. */
  rowHeight?: number;
}

const WIDTHS = ['62%', '48%', '55%', '41%', '58%'];

/** Still lines in the shape of the ledger that will come; nothing pulses. */
export function LoadingFace({ label, rows = 6, rowHeight = 52 }: LoadingFaceProps) {
  return (
    <div role="status" aria-label={label}>
      {Array.from({ length: rows }, (_, i) => (
        <div
          key={i}
          aria-hidden="true"
          className="grid content-center gap-2 border-b border-rule"
          style={{ height: rowHeight }}
        >
          <span className="skeleton-line" style={{ width: WIDTHS[i % WIDTHS.length] }} />
          {rowHeight >= 40 ? <span className="skeleton-line" style={{ width: '24%', height: 6 }} /> : null}
        </div>
      ))}
    </div>
  );
}

export interface EmptyFaceProps {
  /** What is not there: "No probe is registered yet." */
  title: string;
  /** Why that may be, and the next step. */
  children?: ReactNode;
  /** The button or link of the next step. */
  actions?: ReactNode;
}

/** Nothing there, said plainly, with the next step. */
export function EmptyFace({ title, children, actions }: EmptyFaceProps) {
  return (
    <div className="face">
      <p className="face-title">{title}</p>
      {children ? <p className="face-sentence">{children}</p> : null}
      {actions ? <div className="face-actions">{actions}</div> : null}
    </div>
  );
}

export interface FailedFaceProps {
  /** What could not be shown: "The probes could not be fetched." */
  title: string;
  /** The error; a refusal brings its own sentence and request id. */
  error?: unknown;
  /** Instead of the error's own sentence. */
  children?: ReactNode;
  onRetry?: () => unknown;
  actions?: ReactNode;
}

/** What failed, what to do, a retry, and the number to quote. */
export function FailedFace({ title, error, children, onRetry, actions }: FailedFaceProps) {
  const requestId = requestIdOf(error);
  const sentence = children ?? (error instanceof Error ? error.message : 'Try again in a moment.');
  return (
    <div className="face face-failed" role="status">
      <p className="face-title">{title}</p>
      <p className="face-sentence">{sentence}</p>
      <div className="face-actions">
        {onRetry ? <Button onClick={onRetry}>Try again</Button> : null}
        {actions}
      </div>
      {requestId ? (
        <p className="face-request">
          If it stays, give this number to your administrator: <b>{requestId}</b>
        </p>
      ) : null}
    </div>
  );
}

function requestIdOf(error: unknown): string | null {
  if (!(error instanceof Error) || !('requestId' in error)) return null;
  return typeof error.requestId === 'string' ? error.requestId : null;
}
