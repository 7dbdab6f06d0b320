import type { ReactNode } from 'react';
import type { Outcome, TrustLevel } from '../../../../shared/contracts/vocabulary.ts';
import { OUTCOME_LABELS, TRUST_LABELS } from '../../../../shared/format/labels.ts';
import { markerPaths } from '../../../../shared/format/strip-geometry.ts';
import { OUTCOME_COLOUR, OutcomeShape } from '../strip/tolerance-strip.tsx';
import { classNames } from './button.tsx';

type Glyph = 'fit' | 'care' | 'stop' | 'held' | 'gone';

const GLYPHS: Readonly<Record<TrustLevel, Glyph>> = {
  fit: 'fit',
  'use-with-care': 'care',
  'do-not-use': 'stop',
  'no-signal': 'gone',
};

/** The water line: calm, ripple, stopped by a shut gate, gone. */
const WATER_LINES: Readonly<Record<Glyph, ReactNode>> = {
  fit: <path d="M1 7H25" stroke="currentColor" strokeWidth="1.5" />,
  care: (
    <path d="M1 7c2-5 4-5 6 0s4 5 6 0s4-5 6 0s4 5 6 0" fill="none" stroke="currentColor" strokeWidth="2.2" />
  ),
  stop: (
    <>
      <path d="M1 7H10" stroke="currentColor" strokeWidth="2.2" />
      <rect x="10" y="0" width="6" height="14" fill="currentColor" />
    </>
  ),
  held: (
    <>
      <path d="M1 7H10" stroke="currentColor" strokeWidth="1.5" />
      <rect
        x="10.75"
        y=".75"
        width="4.5"
        height="12.5"
        fill="var(--sheet)"
        stroke="currentColor"
        strokeWidth="1.5"
      />
    </>
  ),
  gone: (
    <path
      d="M2.5 7h.01M9.5 7h.01M16.5 7h.01M23.5 7h.01"
      stroke="currentColor"
      strokeWidth="2.6"
      strokeLinecap="round"
    />
  ),
};

export interface TrustMarkProps {
  trust: TrustLevel;
  /** Somebody has it (held for maintenance, or taken): the gate is outlined and nothing is reversed. */
  isHeld?: boolean;
  /** The reason in words, under the mark; leave out only where it stands right beside. */
  reason?: ReactNode;
  /** 18 px, opening a sentence. */
  isLead?: boolean;
}

/** Trust of a live reading: water line, word, reason. */
export function TrustMark({ trust, isHeld = false, reason, isLead = false }: TrustMarkProps) {
  const glyph = trust === 'do-not-use' && isHeld ? 'held' : GLYPHS[trust];
  return (
    <>
      <span className={classNames('trust', `trust-${glyph}`, isLead && 'trust-lead')}>
        <WaterLine glyph={glyph} />
        {TRUST_LABELS[trust]}
      </span>
      {reason ? <span className="trust-reason">{reason}</span> : null}
    </>
  );
}

function WaterLine({ glyph }: { glyph: Glyph }) {
  return (
    <svg width="26" height="14" viewBox="0 0 26 14" aria-hidden="true">
      {WATER_LINES[glyph]}
    </svg>
  );
}

export interface OutcomeMarkProps {
  outcome: Outcome;
  /** Edge of the glyph, px. */
  size?: number;
  /** Without words only where they stand right beside. */
  hasWords?: boolean;
}

/** Outcome of a comparison: round within, lozenge outside; solid sure, half not sure; and its words. */
export function OutcomeMark({ outcome, size = 18, hasWords = true }: OutcomeMarkProps) {
  const colour = OUTCOME_COLOUR[outcome];
  return (
    <span className="outcome">
      <svg width={size} height={size} viewBox="0 0 20 20" aria-hidden="true">
        <OutcomeShape {...markerPaths(outcome, 10, 10, 6.4, 1)} colour={colour} stroke={1.8} />
      </svg>
      {hasWords ? OUTCOME_LABELS[outcome] : null}
    </span>
  );
}

/** The mark: a potassium chloride cube, half under the water line, between two posts. */
export function Mark({ height = 24 }: { height?: number }) {
  return (
    <svg width={height * 1.5} height={height} viewBox="0 0 42 28" aria-hidden="true">
      <path d="M2 6V22M40 6V22" stroke="var(--ink)" strokeWidth="2.5" />
      <path d="M2 14H40" stroke="var(--ink)" strokeWidth="1.75" />
      <rect x="13" y="6" width="16" height="16" fill="var(--paper)" stroke="var(--ink)" strokeWidth="2.5" />
      <path d="M13 14H29V22H13Z" fill="var(--ink)" />
    </svg>
  );
}
