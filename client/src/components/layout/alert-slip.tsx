import type { ReactNode } from 'react';

export interface AlertSlipProps {
  /** "Respond now": the only level that may be a slab. */
  level: string;
  /** By when: "by 13:27". */
  due?: ReactNode;
  /** What, why and what follows it; the subject in <b>. */
  children: ReactNode;
  /** Two buttons: kinds slip and slip-second. */
  actions?: ReactNode;
}

/** The one loud thing: an alarm that nobody has taken. One slip for each. */
export function AlertSlip({ level, due, children, actions }: AlertSlipProps) {
  return (
    <section className="slip" role="alert">
      <p className="slip-level">
        <b>{level}</b>
        {due ? <span>{due}</span> : null}
      </p>
      <p className="slip-text">{children}</p>
      {actions ? <div className="slip-actions">{actions}</div> : null}
    </section>
  );
}
