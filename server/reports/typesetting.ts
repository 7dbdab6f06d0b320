/** Text on paper: broken into lines, each drawn with fonts that hold all of its characters. */
import type { Face, Fonts } from './fonts.ts';
import { INK, type Paper } from './paper.ts';

export interface TextStyle {
  face: Face;
  /** Points. */
  size: number;
  colour?: string;
  /** Baseline to baseline, points; 1.4 times the size unless given. */
  leading?: number;
}

/** A stretch of text in one style; bold words in a sentence are a stretch of their own. */
export interface Span {
  text: string;
  style: TextStyle;
  isStruck?: boolean;
}

interface Glyphs {
  font: string;
  size: number;
  /** Above the baseline, points: exponents. */
  rise: number;
  text: string;
  width: number;
  span: Span;
}

interface Word {
  glyphs: Glyphs[];
  width: number;
  /** A space before it, when it does not begin a line. */
  space: Glyphs | null;
}

export interface Line {
  words: Word[];
  width: number;
}

export interface Paragraph {
  lines: Line[];
  leading: number;
  size: number;
  height: number;
}

export interface Typesetter {
  lay: (spans: readonly Span[], width: number) => Paragraph;
  widthOf: (text: string, style: TextStyle) => number;
  draw: (paragraph: Paragraph, x: number, y: number, options?: DrawOptions) => void;
}

export interface DrawOptions {
  align?: 'left' | 'right' | 'centre';
  /** Needed to align to the right. */
  width?: number;
}

/** Characters that neither family has, and how they are written instead. */
const EXPONENTS: Readonly<Record<string, string>> = { '⁻': '\u2212', '¹': '1', '²': '2', '³': '3' };
const INDICES: Readonly<Record<string, string>> = { ₙ: 'n' };
const SPELLED: Readonly<Record<string, string>> = {
  '→': 'to',
  '≤': 'at most',
  '≥': 'at least',
  '\u202f': '\u00a0',
};
const SMALL = 0.68;

export function newTypesetter(paper: Paper, fonts: Fonts): Typesetter {
  const widths = new Map<string, number>();
  const measure = (font: string, size: number, text: string): number => {
    const key = `${font} ${size} ${text}`;
    const known = widths.get(key);
    if (known !== undefined) return known;
    const width = paper.font(font).fontSize(size).widthOfString(text);
    widths.set(key, width);
    return width;
  };

  const glyphsOf = (text: string, span: Span): Glyphs[] => {
    const { face, size } = span.style;
    const runs: Glyphs[] = [];
    for (const character of text) {
      const exponent = EXPONENTS[character];
      const index = INDICES[character];
      const isSmall = exponent !== undefined || index !== undefined;
      const spelled = exponent ?? index ?? SPELLED[character] ?? character;
      for (const one of spelled) {
        const [font, drawn] = drawable(fonts, face, one);
        const last = runs.at(-1);
        const drawnSize = isSmall ? size * SMALL : size;
        const rise = exponent === undefined ? (index === undefined ? 0 : -size * 0.15) : size * 0.33;
        if (last?.font === font && last.size === drawnSize && last.rise === rise) last.text += drawn;
        else runs.push({ font, size: drawnSize, rise, text: drawn, width: 0, span });
      }
    }
    for (const run of runs) run.width = measure(run.font, run.size, run.text);
    return runs;
  };

  const lay = (spans: readonly Span[], width: number): Paragraph => {
    const words = wordsOf(spans, glyphsOf);
    const lines: Line[] = [];
    let line: Line = { words: [], width: 0 };
    for (const word of words) {
      const space = line.words.length > 0 ? (word.space?.width ?? 0) : 0;
      const isFull = line.words.length > 0 && word.space !== null && line.width + space + word.width > width;
      if (isFull) {
        lines.push(line);
        line = { words: [], width: 0 };
      }
      line.words.push(word);
      line.width += word.width + (isFull ? 0 : space);
    }
    if (line.words.length > 0) lines.push(line);
    const size = Math.max(...spans.map(({ style }) => style.size), 1);
    const leading = Math.max(...spans.map(({ style }) => style.leading ?? style.size * 1.4), 1);
    return { lines, leading, size, height: lines.length * leading };
  };

  const draw = (paragraph: Paragraph, x: number, y: number, options: DrawOptions = {}): void => {
    const { align = 'left', width = 0 } = options;
    for (const [index, line] of paragraph.lines.entries()) {
      const room = width - line.width;
      const from = align === 'right' ? x + room : align === 'centre' ? x + room / 2 : x;
      // The baseline sits where capitals are centred in the line.
      const baseline = y + index * paragraph.leading + (paragraph.leading + paragraph.size * 0.7) / 2;
      drawLine(paper, line, from, baseline);
    }
  };

  return {
    lay,
    draw,
    widthOf: (text, style) => glyphsOf(text, { text, style }).reduce((sum, run) => sum + run.width, 0),
  };
}

/** A character none of our fonts has is written as its code, so that nothing is left out unseen. */
function drawable(fonts: Fonts, face: Face, character: string): [font: string, text: string] {
  const codePoint = character.codePointAt(0)!;
  const font = fonts.fontFor(face, codePoint);
  if (font !== null) return [font, character];
  return [fonts.base(face), `[U+${codePoint.toString(16).toUpperCase().padStart(4, '0')}]`];
}

function wordsOf(spans: readonly Span[], glyphsOf: (text: string, span: Span) => Glyphs[]): Word[] {
  const words: Word[] = [];
  let pendingSpace: Glyphs | null = null;
  for (const span of spans) {
    for (const part of span.text.split(/( +|\n)/)) {
      if (part === '') continue;
      if (part.trim() === '' && !/[\u00a0\u2009]/.test(part)) {
        pendingSpace = glyphsOf(' ', span)[0] ?? null;
        continue;
      }
      const glyphs = glyphsOf(part, span);
      words.push({ glyphs, width: glyphs.reduce((sum, run) => sum + run.width, 0), space: pendingSpace });
      pendingSpace = null;
    }
  }
  return words;
}

function drawLine(paper: Paper, line: Line, from: number, baseline: number): void {
  let at = from;
  for (const [index, word] of line.words.entries()) {
    if (index > 0 && word.space) at = drawGlyphs(paper, word.space, at, baseline);
    for (const run of word.glyphs) at = drawGlyphs(paper, run, at, baseline);
  }
}

function drawGlyphs(paper: Paper, run: Glyphs, x: number, baseline: number): number {
  const colour = run.span.style.colour ?? INK.ink;
  paper.font(run.font).fontSize(run.size).fillColor(colour);
  paper.text(run.text, x, baseline - run.rise, { lineBreak: false, baseline: 'alphabetic' });
  if (run.span.isStruck) {
    const y = baseline - run.size * 0.27;
    paper
      .moveTo(x, y)
      .lineTo(x + run.width, y)
      .lineWidth(0.8)
      .strokeColor(colour)
      .stroke();
  }
  return x + run.width;
}
