/** The two bundled families on paper, and which of their files holds a character. A PDF writer drops what a font lacks without a word. */
import { createRequire } from 'node:module';
import { readFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import type { Paper } from './paper.ts';

export type Face = 'say' | 'say-bold' | 'mono' | 'mono-medium' | 'mono-bold';

const require = createRequire(import.meta.url);
const folderOf = (name: string): string =>
  join(dirname(require.resolve(`@fontsource/${name}/package.json`)), 'files');

const SCRIPTS = ['latin', 'latin-ext', 'greek', 'cyrillic', 'cyrillic-ext', 'vietnamese'] as const;
const mono = (weight: number) => SCRIPTS.map((script) => ['roboto-mono', script, weight] as const);
const say = (weight: number) =>
  (['latin', 'latin-ext'] as const).map((script) => ['atkinson-hyperlegible-next', script, weight] as const);

/** First the face itself, then what stands in for a character it lacks. */
const STACKS: Readonly<Record<Face, readonly (readonly [family: string, script: string, weight: number])[]>> =
  {
    say: [...say(400), ...mono(400)],
    'say-bold': [...say(700), ...mono(700)],
    mono: mono(400),
    'mono-medium': mono(500),
    'mono-bold': mono(700),
  };

const fileNames = new Map<string, Buffer>();

function fontFile(name: string, family: string): Buffer {
  const known = fileNames.get(name);
  if (known) return known;
  const bytes = readFileSync(join(folderOf(family), `${name}-normal.woff`));
  fileNames.set(name, bytes);
  return bytes;
}

interface LoadedFont {
  name: string;
  has: (codePoint: number) => boolean;
}

/** What pdfkit keeps of the font in use; its types leave it out. */
interface WithFont {
  _font: { font: { hasGlyphForCodePoint: (codePoint: number) => boolean } };
}

export interface Fonts {
  /** The name of the font that draws a character in this face, or null when none of ours can. */
  fontFor: (face: Face, codePoint: number) => string | null;
  /** The font of the face itself, whose measures a line is set by. */
  base: (face: Face) => string;
}

/** Registers with one document; each file is embedded only when something is drawn with it. */
export function loadFonts(paper: Paper): Fonts {
  const loaded = new Map<string, LoadedFont>();
  const load = (family: string, script: string, weight: number): LoadedFont => {
    const name = `${family}-${script}-${weight}`;
    const known = loaded.get(name);
    if (known) return known;
    paper.registerFont(name, fontFile(name, family));
    paper.font(name);
    const { font } = (paper as unknown as WithFont)._font;
    const one = { name, has: (codePoint: number) => font.hasGlyphForCodePoint(codePoint) };
    loaded.set(name, one);
    return one;
  };
  return {
    fontFor: (face, codePoint) => {
      for (const [family, script, weight] of STACKS[face]) {
        const font = load(family, script, weight);
        if (font.has(codePoint)) return font.name;
      }
      return null;
    },
    base: (face) => {
      const [family, script, weight] = STACKS[face][0]!;
      return load(family, script, weight).name;
    },
  };
}
