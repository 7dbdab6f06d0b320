/**
 * What a schema says about a value it refuses, in plain words: what it is and what to do. A schema's own message goes
 * first; these stand in for the library's defaults.
 */
import type { z } from 'zod';

type Issue = z.core.$ZodRawIssue;

/** The sentence for one refused value, or undefined where the library's own is as good. */
export function plainMessage(issue: Issue): string | undefined {
  switch (issue.code) {
    case 'invalid_type':
      return issue.input === undefined || issue.input === null
        ? 'This is missing.'
        : typeWords(issue.expected);
    case 'too_small':
      return sizeWords(
        issue.origin,
        Number(issue.minimum),
        issue.inclusive === false ? 'more than' : 'at least',
      );
    case 'too_big':
      return sizeWords(
        issue.origin,
        Number(issue.maximum),
        issue.inclusive === false ? 'less than' : 'at most',
      );
    case 'invalid_value':
      return `Choose one of these: ${issue.values.map(String).join(', ')}.`;
    case 'invalid_format':
      return FORMAT_WORDS[issue.format];
    case 'unrecognized_keys':
      return `Leave out what is not known here: ${issue.keys.join(', ')}.`;
    default:
      return undefined;
  }
}

const TYPE_WORDS: Readonly<Record<string, string>> = {
  number: 'Write a number.',
  int: 'Write a whole number.',
  string: 'Write text.',
  boolean: 'Say true or false.',
  array: 'Give a list.',
  object: 'Give an object with named fields.',
};

const typeWords = (expected: string): string | undefined => TYPE_WORDS[expected];

const FORMAT_WORDS: Readonly<Record<string, string>> = {
  date: 'Write a date such as 2026-12-01.',
  datetime: 'Write a moment with its offset, such as 2026-12-01T13:22:07Z.',
  email: 'Write the whole e-mail address.',
};

function sizeWords(origin: string, limit: number, relation: string): string {
  if (origin === 'string') {
    if (relation === 'at least' && limit === 1) return 'This is missing.';
    return `Write ${relation} ${limit} characters.`;
  }
  if (origin === 'array' || origin === 'set') return `Give ${relation} ${limit}.`;
  return `This must be ${relation} ${limit}.`;
}
