import { readFileSync, readdirSync } from 'node:fs';
import { describe, expect, it } from 'vitest';

/** Every export of the science carries an @example; each is run here as written, so none can rot. */
const folder = new URL('../../shared/science/', import.meta.url);
const files = readdirSync(folder).filter((name) => name.endsWith('.ts'));

const modules = new Map<string, Record<string, unknown>>(
  await Promise.all(
    files.map(
      async (name) => [name, (await import(new URL(name, folder).href)) as Record<string, unknown>] as const,
    ),
  ),
);
const everything: Record<string, unknown> = Object.assign({}, ...modules.values());
const names = Object.keys(everything);

type Example = { file: string; expression: string; expected: string };

/** `@example expression // ≈ 1.5` or `// 'text'`; an example may go on over the next lines of the comment. */
function examplesOf(file: string): Example[] {
  const text = readFileSync(new URL(file, folder), 'utf8');
  const comments = text.match(/\/\*\*[\s\S]*?\*\//g) ?? [];
  return comments.flatMap((comment) => {
    const plain = comment.replace(/^\s*\*\/?\s?/gm, '').replace(/\*\/$/, '');
    return plain
      .split(/@example\s/)
      .slice(1)
      .map((part) => part.split(/\n\s*@|\n\s*\n/)[0] as string)
      .map((part) => {
        const joined = part.replace(/\s*\n\s*/g, ' ').trim();
        const at = joined.lastIndexOf('//');
        const expected = at < 0 ? '' : joined.slice(at + 2).trim();
        return { file, expression: at < 0 ? joined : joined.slice(0, at).trim(), expected };
      });
  });
}

function run(expression: string): unknown {
  const body = `return (${expression.replace(/;$/, '')});`;
  return (new Function(...names, body) as (...values: unknown[]) => unknown)(
    ...names.map((name) => everything[name]),
  );
}

/** A printed number is matched to half of its last digit. */
function matchesNumber(actual: number, printed: string): void {
  const [mantissa = '', exponent = '0'] = printed.toLowerCase().split('e');
  const decimals = (mantissa.split('.')[1] ?? '').length;
  const half = 0.5 * 10 ** (Number(exponent) - decimals);
  expect(Math.abs(actual - Number(printed)), `${actual} against ${printed}`).toBeLessThanOrEqual(
    // Examples printed to the last digit of a double may differ in it.
    Math.max(half * (1 + 1e-6), 1e-13 * Math.abs(actual)),
  );
}

const isNumeral = (text: string): boolean => text !== '' && Number.isFinite(Number(text));

describe('examples in the docstrings of the science', () => {
  const examples = files.flatMap(examplesOf);

  it.each(examples)('$file: $expression', ({ expression, expected }) => {
    expect(expected, 'an example states its result after //').not.toBe('');
    const actual = run(expression);
    const stated = expected.replace(/^(≈|=>|→)\s*/, '');
    if (typeof actual === 'number' && isNumeral(stated)) matchesNumber(actual, stated);
    else expect(actual).toEqual(run(stated));
  });

  it.each(files)('%s: every exported function has an example', (file) => {
    const exported = Object.entries(modules.get(file) ?? {})
      .filter(([, value]) => typeof value === 'function' && !/^class\s/.test(String(value)))
      .map(([name]) => name);
    const shown = examplesOf(file)
      .map(({ expression }) => expression)
      .join('\n');
    const isInfrastructure = file === 'errors.ts' || file === 'references.ts';
    const missing = isInfrastructure ? [] : exported.filter((name) => !shown.includes(`${name}(`));
    expect(missing).toEqual([]);
  });
});
