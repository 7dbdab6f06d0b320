import type { ReactNode } from 'react';

export interface RangeChoice {
  label: string;
  seconds: number;
}

export const RANGE_CHOICES: readonly RangeChoice[] = [
  { label: '1 h', seconds: 3600 },
  { label: '6 h', seconds: 21_600 },
  { label: '24 h', seconds: 86_400 },
  { label: '7 d', seconds: 604_800 },
  { label: '30 d', seconds: 2_592_000 },
  { label: '1 year', seconds: 31_557_600 },
];

export interface RangeButtonsProps {
  from: number;
  to: number;
  /** The end of the ranges offered, normally the present. */
  now: number;
  choices?: readonly RangeChoice[];
  onRangeChange: (from: number, to: number) => void;
  children?: ReactNode;
}

/** Ranges back from now, and steps earlier and later: everything the drag can do, by keyboard. */
export function RangeButtons({
  from,
  to,
  now,
  choices = RANGE_CHOICES,
  onRangeChange,
  children,
}: RangeButtonsProps) {
  const span = to - from;
  const reachesNow = now - to < span * 0.02;
  const shift = (steps: number) => {
    const end = Math.min(now, to + steps * span);
    onRangeChange(end - span, end);
  };
  return (
    <div className="chart-tools" role="group" aria-label="Period shown">
      {choices.map((choice) => (
        <button
          key={choice.label}
          type="button"
          className="chart-tool"
          aria-pressed={reachesNow && Math.abs(span / 1000 - choice.seconds) < choice.seconds * 0.02}
          onClick={() => onRangeChange(now - choice.seconds * 1000, now)}
        >
          {choice.label}
        </button>
      ))}
      <button type="button" className="chart-tool" onClick={() => shift(-0.5)}>
        earlier
      </button>
      <button type="button" className="chart-tool" disabled={reachesNow} onClick={() => shift(0.5)}>
        later
      </button>
      {children}
    </div>
  );
}
