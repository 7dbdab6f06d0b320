import { beforeAll, expect, it } from 'vitest';
import { z } from 'zod';
import { plainMessage } from '../../shared/contracts/messages.ts';

beforeAll(() => {
  z.config({ customError: plainMessage });
});

const say = (schema: z.ZodType, value: unknown) => schema.safeParse(value).error?.issues[0]?.message;

it.each([
  ['a number beyond its limit', z.number().max(3), 9, 'This must be at most 3.'],
  ['a number that must be more', z.number().gt(0), 0, 'This must be more than 0.'],
  ['a number below its limit', z.number().min(1), 0.5, 'This must be at least 1.'],
  ['a missing field', z.object({ name: z.string() }), {}, 'This is missing.'],
  ['an empty text', z.string().min(1), '', 'This is missing.'],
  ['a short text', z.string().min(3), 'ab', 'Write at least 3 characters.'],
  ['a long text', z.string().max(4), 'abcde', 'Write at most 4 characters.'],
  ['text for a number', z.number(), 'twelve', 'Write a number.'],
  ['a fraction for a whole number', z.number().int(), 1.5, 'Write a whole number.'],
  ['a choice that is none', z.enum(['fit', 'gone']), 'fine', 'Choose one of these: fit, gone.'],
  ['a date written the other way', z.iso.date(), '01.12.2026', 'Write a date such as 2026-12-01.'],
])('says what is wrong and what to do with %s', (_case, schema, value, sentence) => {
  expect(say(schema, value)).toBe(sentence);
});

it('leaves the sentence that a schema brings itself', () => {
  expect(say(z.string().min(12, 'Use at least 12 characters.'), 'short')).toBe('Use at least 12 characters.');
});
