import { expect, it } from 'vitest';
import * as vocabulary from '../../shared/contracts/vocabulary.ts';
import { HAZARD_CAUTIONS } from '../../shared/format/cautions.ts';
import * as labels from '../../shared/format/labels.ts';

const tables = Object.values(labels).filter((value) => typeof value === 'object');
const sentences = [
  ...tables.flatMap((table) => Object.values(table)),
  ...Object.values(HAZARD_CAUTIONS).map((c) => c.text),
];

it('avoids the words that promise more than a comparison can', () => {
  const forbidden = /\b(pass|fail|ok|smart|wizard|certified|accredited|health score)\b/i;
  expect(sentences.filter((sentence) => forbidden.test(sentence))).toEqual([]);
});

it('has words for every code of the vocabulary', () => {
  expect(Object.keys(labels.OUTCOME_LABELS)).toEqual([...vocabulary.outcomes]);
  expect(Object.keys(labels.TRUST_REASON_LABELS)).toEqual([...vocabulary.trustReasons]);
  expect(Object.keys(HAZARD_CAUTIONS)).toEqual([...vocabulary.hazardTags]);
});

it('opens a code that has no words yet', () => {
  expect(labels.labelOf(labels.AUDIT_ACTION_LABELS, 'probes.re-tag')).toBe('probes re tag');
  expect(labels.labelOf(labels.AUDIT_ACTION_LABELS, null)).toBe('–');
});

it('joins a list as a sentence does', () => {
  expect(labels.listInWords(['Intake'])).toBe('Intake');
  expect(labels.listInWords(['Intake', 'Feed', 'Brine'])).toBe('Intake, Feed and Brine');
});
