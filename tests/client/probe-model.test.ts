import { describe, expect, it } from 'vitest';
import {
  comparisonWords,
  foldTimeline,
  runWords,
  timelineShape,
  trustSentence,
} from '../../client/src/features/probes/model.ts';
import type { ProbeEvent } from '../../shared/contracts/probes.ts';
import type { Strip } from '../../shared/contracts/readings.ts';

const strip = (facts: Partial<Strip> = {}): Strip => ({
  at: '2026-09-08T10:41:00.000Z',
  stage: 'automatic',
  errorPercent: -1.7,
  expandedUncertaintyPercent: 0.85,
  coverageFactor: 2,
  tolerancePercent: 3,
  guardBandPercent: 0.85,
  decisionRule: 'guarded-u',
  outcome: 'within-clear',
  probabilityOutside: 0.0011,
  earlierErrorPercent: [-1, -0.3],
  ...facts,
});

let lastKey = 0;
function event(facts: Partial<ProbeEvent> = {}): ProbeEvent {
  lastKey += 1;
  return {
    key: `e-${lastKey}`,
    at: '2026-09-08T10:41:00.000Z',
    kind: 'check',
    pointId: 1,
    checkId: lastKey,
    title: 'Automatic check',
    by: null,
    detail: null,
    strip: strip(),
    ...facts,
  };
}

describe('the trust sentence of a probe', () => {
  const probe = (reason: 'as-compared' | 'within-unsure' | 'outside-clear', error: number) => ({
    trust: { level: 'fit' as const, reason, text: '' },
    strip: strip({ errorPercent: error }),
    device: null,
    cellConstantPerCm: 0.5118,
  });

  it('says which way and how far it reads, against its tolerance', () => {
    expect(trustSentence(probe('as-compared', -1.7)).replaceAll('\u00a0', ' ')).toBe(
      'Read low by 1.7 % at the last comparison, clearly within the 3 % tolerance.',
    );
    expect(trustSentence(probe('within-unsure', 2.6)).replaceAll('\u00a0', ' ')).toBe(
      'Read high by 2.6 % at the last comparison, and that is too near the 3 % tolerance to be sure.',
    );
    expect(trustSentence(probe('outside-clear', 9.7)).replaceAll('\u00a0', ' ')).toBe(
      'Read high by 9.7 % at the last comparison, and the tolerance is 3 %.',
    );
  });

  it('does not make an error of what is nothing beside U', () => {
    expect(trustSentence(probe('as-compared', 0.02))).toMatch(/^Read true at the last comparison/);
  });

  it('names both cell constants when the transmitter works with another', () => {
    const changed = {
      ...probe('as-compared', 0),
      trust: { level: 'do-not-use' as const, reason: 'cell-constant-changed' as const, text: '' },
      device: { reportedCellConstantPerCm: 0.112 } as never,
      cellConstantPerCm: 0.1021,
    };
    expect(trustSentence(changed).replaceAll('\u00a0', ' ')).toBe(
      'Its transmitter works with 0.1120 cm⁻¹, and the record says 0.1021 cm⁻¹. No record asked for the change.',
    );
  });
});

describe('the words beside the strip', () => {
  it('carry U, k, the rule and the probability with the outcome', () => {
    const words = comparisonWords(strip(), 'UTC');
    expect(words.opening.replaceAll('\u00a0', ' ')).toBe(
      'Automatic check on 8 Sep 2026: error −1.70 %, U 0.85 % (k = 2.0),',
    );
    expect(words.outcome).toBe('within, clear');
    expect(words.rest.replaceAll('\u00a0', ' ')).toBe(
      'Guard band 0.85 % (guard band equal to U). Probability that it was outside: < 1 %.',
    );
  });
});

describe('the timeline', () => {
  it('folds runs of routine checks and leaves every exception standing', () => {
    const routine = [event(), event({ strip: strip({ errorPercent: 0.12 }) }), event()];
    const doubtful = event({ strip: strip({ outcome: 'within-unsure', errorPercent: 2.5 }) });
    const cleaned = event({ kind: 'cleaned', strip: null });
    const invalid = event({ strip: null });
    const entries = foldTimeline([...routine, doubtful, cleaned, event(), event(), invalid]);
    expect(entries.map((entry) => entry.kind)).toEqual(['run', 'event', 'event', 'event', 'event', 'event']);
    expect(entries[0]).toMatchObject({ kind: 'run', events: routine });
    expect(runWords(routine).replaceAll('\u00a0', ' ')).toBe(
      '3 automatic checks, all within, clear: −1.70 to +0.12 %',
    );
  });

  it('does not fold what a person determined', () => {
    const asFound = () => event({ strip: strip({ stage: 'as-found-cleaned' }), by: 'Ines Falk' });
    expect(foldTimeline([asFound(), asFound(), asFound()]).every((entry) => entry.kind === 'event')).toBe(
      true,
    );
  });

  it('gives each kind of event its shape', () => {
    expect(timelineShape({ kind: 'check' })).toBe('determined');
    expect(timelineShape({ kind: 'cleaned' })).toBe('cleaned');
    expect(timelineShape({ kind: 'adjusted' })).toBe('adjusted');
    expect(timelineShape({ kind: 'moved' })).toBe('placed');
    expect(timelineShape({ kind: 'note' })).toBe('plain');
  });
});
