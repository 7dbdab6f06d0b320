/** Pages with head and foot, and columns whose rows go on over as many pages as they need. */
import { loadFonts } from './fonts.ts';
import {
  BOTTOM,
  CONTENT_WIDTH,
  INK,
  MARGIN,
  newPaper,
  PAGE,
  px,
  TOP,
  type Paper,
  type PaperFacts,
} from './paper.ts';
import { newTypesetter, type Span, type TextStyle, type Typesetter } from './typesetting.ts';

export const STYLE = {
  title: { face: 'mono-medium', size: px(30), leading: px(38) },
  say: { face: 'say', size: px(15), leading: px(20), colour: INK.ink },
  sayBold: { face: 'say-bold', size: px(15), leading: px(20), colour: INK.ink },
  small: { face: 'say', size: px(13), leading: px(17.5), colour: INK.say },
  smallBold: { face: 'say-bold', size: px(13), leading: px(17.5), colour: INK.ink },
  note: { face: 'say', size: px(12), leading: px(16), colour: INK.quiet },
  head: { face: 'mono-medium', size: px(13), leading: px(18) },
  mono: { face: 'mono', size: px(12.5), leading: px(17) },
  monoBold: { face: 'mono-bold', size: px(12.5), leading: px(17) },
  monoQuiet: { face: 'mono', size: px(12), leading: px(16), colour: INK.quiet },
} as const satisfies Record<string, TextStyle>;

export interface Tools {
  paper: Paper;
  type: Typesetter;
}

/** Something of a fixed height in a column. */
export interface Row {
  height: number;
  draw: (x: number, y: number) => void;
  /** A heading does not stand at the foot of a page without what it heads. */
  isKeptWithNext?: boolean;
}

export interface Place {
  page: number;
  y: number;
}

export interface Frame {
  /** Beside the mark, on every page: what this is, and its number. */
  kind: string;
  number: string;
  foot: string;
}

export class Sheet implements Tools {
  readonly paper: Paper;
  readonly type: Typesetter;
  private pages = 0;

  constructor(facts: PaperFacts) {
    this.paper = newPaper(facts);
    this.type = newTypesetter(this.paper, loadFonts(this.paper));
    this.openPage(0);
  }

  private openPage(page: number): void {
    while (this.pages <= page) {
      this.paper.addPage();
      this.pages += 1;
    }
    this.paper.switchToPage(page);
  }

  /** Draws rows one under the other from a place on; answers where they end. */
  flow(rows: readonly Row[], x: number, from: Place): Place {
    let { page, y } = from;
    for (const [index, row] of rows.entries()) {
      if (y + keptHeight(rows, index) > BOTTOM && y > TOP) {
        page += 1;
        y = TOP;
      }
      this.openPage(page);
      row.draw(x, y);
      y += row.height;
    }
    return { page, y };
  }

  /** Head and foot last: only now is it known how many pages there are. */
  frame({ kind, number, foot }: Frame): void {
    for (let page = 0; page < this.pages; page += 1) {
      this.paper.switchToPage(page);
      this.head(kind, number, page);
      this.foot(foot);
    }
  }

  private head(kind: string, number: string, page: number): void {
    const { paper, type } = this;
    drawMark(paper, MARGIN, px(67));
    const put = (text: string, style: TextStyle, x: number, y: number): void =>
      type.draw(type.lay([{ text, style }], CONTENT_WIDTH), x, y);
    put('Saltmark', { face: 'mono-bold', size: px(16) }, MARGIN + px(41), px(66));
    put(kind, STYLE.mono, MARGIN + px(298), px(56));
    put(number, STYLE.monoBold, MARGIN + px(298), px(72));
    const count = `page ${page + 1} of ${this.pages}`;
    const laid = type.lay([{ text: count, style: STYLE.mono }], CONTENT_WIDTH);
    type.draw(laid, MARGIN, px(72), { align: 'right', width: CONTENT_WIDTH });
    drawRule(paper, MARGIN, px(98), CONTENT_WIDTH, INK.ink, 1.1);
  }

  private foot(text: string): void {
    const laid = this.type.lay([{ text, style: STYLE.note }], CONTENT_WIDTH);
    const y = PAGE.height - px(64);
    drawRule(this.paper, MARGIN, y - 4, CONTENT_WIDTH, INK.rule, 0.6);
    this.type.draw(laid, MARGIN, y);
  }
}

function keptHeight(rows: readonly Row[], index: number): number {
  const row = rows[index]!;
  const next = rows[index + 1];
  return row.height + (row.isKeptWithNext && next ? keptHeight(rows, index + 1) : 0);
}

export function drawRule(
  paper: Paper,
  x: number,
  y: number,
  width: number,
  colour: string,
  thickness: number,
): void {
  paper
    .moveTo(x, y)
    .lineTo(x + width, y)
    .lineWidth(thickness)
    .strokeColor(colour)
    .stroke();
}

/** The mark: a potassium chloride cube, half under the water line, between two posts. */
function drawMark(paper: Paper, x: number, y: number): void {
  paper
    .save()
    .translate(x, y)
    .scale(px(33) / 42);
  const stroke = (path: string, width: number): void =>
    void paper.path(path).lineWidth(width).strokeColor(INK.ink).stroke();
  stroke('M2 6V22M40 6V22', 2.5);
  stroke('M2 14H40', 1.75);
  paper.rect(13, 6, 16, 16).lineWidth(2.5).fillAndStroke(INK.sheet, INK.ink);
  paper.path('M13 14H29V22H13Z').fill(INK.ink);
  paper.restore();
}

/** Running text as a row per line, so that it may break over pages. */
export function textRows({ type }: Tools, spans: readonly Span[], width: number, after = 0): Row[] {
  const paragraph = type.lay(spans, width);
  const rows = paragraph.lines.map((line) => {
    const one = { ...paragraph, lines: [line], height: paragraph.leading };
    return { height: paragraph.leading, draw: (x: number, y: number) => type.draw(one, x, y) };
  });
  return after > 0 ? [...rows, gap(after)] : rows;
}

export const gap = (height: number): Row => ({ height, draw: () => undefined });

export const ruleRow = (
  { paper }: Tools,
  width: number,
  colour: string = INK.rule,
  thickness = 0.6,
): Row => ({
  height: 1,
  draw: (x, y) => drawRule(paper, x, y, width, colour, thickness),
});

export const headingRows = (tools: Tools, text: string, width: number): Row[] =>
  textRows(tools, [{ text, style: STYLE.head }], width, 3).map((row) => ({ ...row, isKeptWithNext: true }));

export interface Cell {
  text: string;
  style: TextStyle;
  width: number;
  align?: 'left' | 'right';
  isStruck?: boolean;
}

/** Cells beside each other over a hairline; the highest makes the row's height. */
export function tableRow(tools: Tools, cells: readonly Cell[], draw?: (x: number, y: number) => void): Row {
  const { paper, type } = tools;
  const laid = cells.map((cell) => type.lay([cell], cell.width));
  const height = Math.max(...laid.map((one) => one.height)) + px(9);
  const width = cells.reduce((sum, cell) => sum + cell.width, 0);
  return {
    height,
    draw: (x, y) => {
      let at = x;
      for (const [index, cell] of cells.entries()) {
        type.draw(laid[index]!, at, y + px(4), { align: cell.align ?? 'left', width: cell.width });
        at += cell.width;
      }
      draw?.(x, y);
      drawRule(paper, x, y + height - 1, width, INK.rule, 0.6);
    },
  };
}
