import { readFileSync, readdirSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { citation, constant, references } from '../../shared/science/references.ts';

const folder = new URL('../../shared/science/', import.meta.url);
const sources = readdirSync(folder)
  .filter((name) => name.endsWith('.ts'))
  .map((name) => ({ name, text: readFileSync(new URL(name, folder), 'utf8') }));

describe('the bibliography', () => {
  it.each(Object.entries(references))('%s says what was read and what was recalled', (_, reference) => {
    expect(reference.citation.length).toBeGreaterThan(20);
    const confidence = 'confidence' in reference ? reference.confidence : undefined;
    if (reference.provenance === 'from-memory') expect(['high', 'medium', 'low']).toContain(confidence);
    else expect(confidence).toBeUndefined();
  });

  it('is cited with its provenance, so that nobody takes a recalled number for a read one', () => {
    expect(citation('pratt-2001')).toMatch(/\(published\)$/);
    expect(citation('jones-bradshaw-1933')).toMatch(/\(from memory, confidence high\)$/);
  });

  it('holds no source that no file or docstring uses', () => {
    const everything = sources.map(({ name, text }) => (name === 'references.ts' ? '' : text)).join('\n');
    const tests = ['../reference/', './'].flatMap((path) =>
      readdirSync(new URL(path, import.meta.url))
        .filter((name) => name.endsWith('.ts'))
        .map((name) => readFileSync(new URL(path + name, import.meta.url), 'utf8')),
    );
    // Sources that numbers were only compared with live in the reference tests under their full citation.
    const compared = tests.join('\n');
    const words = (key: string) => key.split('-').filter((word) => !/^\d+$/.test(word));
    const unused = Object.keys(references).filter(
      (key) => !everything.includes(key) && !words(key).some((word) => compared.toLowerCase().includes(word)),
    );
    expect(unused).toEqual([]);
  });

  it('keeps the unit, the source and the uncertainty beside a constant', () => {
    expect(constant(1.5, 'K', 'its-90', 0.1)).toEqual({
      value: 1.5,
      unit: 'K',
      source: 'its-90',
      standardUncertainty: 0.1,
    });
  });
});
