import { expect, it } from 'vitest';
import { bytesOf, rawParts } from '../../client/src/features/quarantine/model.ts';

const raw = (bytes: Iterable<number>) => rawParts(Uint8Array.from(bytes));
const utf8 = (text: string) => [...new TextEncoder().encode(text)];

it('shows valid text as text, line breaks and letters beyond ASCII included', () => {
  expect(raw(utf8('{"κ": 214,\n\t"unit": "µS/cm"} 🜔'))).toEqual([
    { kind: 'text', text: '{"κ": 214,\n\t"unit": "µS/cm"} 🜔' },
  ]);
});

it('shows bytes that print nothing as hexadecimal, a run of them together', () => {
  expect(raw([0x00, 0x01, ...utf8('ok'), 0x07, 0x7f])).toEqual([
    { kind: 'bytes', text: '00 01' },
    { kind: 'text', text: 'ok' },
    { kind: 'bytes', text: '07 7f' },
  ]);
});

it('shows broken UTF-8 byte by byte and goes on after it', () => {
  // c3 opens a pair that never comes; ff stands in no UTF-8; e2 82 is cut off at the end.
  expect(raw([0xc3, ...utf8('a'), 0xff, ...utf8('b'), 0xe2, 0x82])).toEqual([
    { kind: 'bytes', text: 'c3' },
    { kind: 'text', text: 'a' },
    { kind: 'bytes', text: 'ff' },
    { kind: 'text', text: 'b' },
    { kind: 'bytes', text: 'e2 82' },
  ]);
});

it('hides no invisible character: a mark that turns the direction of writing is shown by its bytes', () => {
  expect(raw(utf8('a\u202eb'))).toEqual([
    { kind: 'text', text: 'a' },
    { kind: 'bytes', text: 'e2 80 ae' },
    { kind: 'text', text: 'b' },
  ]);
});

it('loses no byte of any message', () => {
  const all = Array.from({ length: 256 }, (_, i) => i);
  const count = raw(all).reduce(
    (sum, part) =>
      sum +
      (part.kind === 'bytes' ? part.text.split(' ').length : new TextEncoder().encode(part.text).length),
    0,
  );
  expect(count).toBe(256);
});

it('reads the base64 that the server sends', () => {
  expect([...bytesOf('AAH/')]).toEqual([0, 1, 255]);
});
