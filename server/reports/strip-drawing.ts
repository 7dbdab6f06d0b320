/** The tolerance strip on paper, from the geometry that draws it on the screen. */
import { stripGeometry, type StripGeometry, type StripInput } from '../../shared/format/strip-geometry.ts';
import type { StripSize } from '../../shared/format/strip-sizes.ts';
import type { Outcome } from '../../shared/contracts/vocabulary.ts';
import { INK, type Paper } from './paper.ts';
import type { Typesetter } from './typesetting.ts';

const OUTCOME_INK: Readonly<Record<Outcome, string>> = {
  'within-clear': INK.ink,
  'within-unsure': INK.care,
  'outside-unsure': INK.stop,
  'outside-clear': INK.stop,
};

export interface StripPlace {
  x: number;
  y: number;
  /** Points for one px of the drawing. */
  scale: number;
}

/** Draws the strip with its upper left corner at the place given. */
export function drawStrip(
  paper: Paper,
  type: Typesetter,
  input: StripInput,
  size: StripSize,
  place: StripPlace,
): void {
  const strip = stripGeometry(input, size);
  paper.save().translate(place.x, place.y).scale(place.scale);
  drawChannel(paper, strip, size);
  drawResult(paper, type, strip);
  paper.restore();
}

function line(paper: Paper, path: string, colour: string, width = 1): void {
  if (path === '') return;
  paper.path(path).lineWidth(width).strokeColor(colour).stroke();
}

function drawChannel(paper: Paper, strip: StripGeometry, size: StripSize): void {
  const { measures: z, posts, ends, centre } = strip;
  const [left, right] = posts;
  const [top, bottom] = z.channel;
  const hatchWidth = size === 'row' ? 0.6 : 0.8;
  line(paper, strip.hatchInside, INK.hatchIn, hatchWidth);
  line(paper, strip.hatchOutside, INK.hatchOut, hatchWidth);
  if (size !== 'row') line(paper, `M${left} ${top}H${right}M${left} ${bottom}H${right}`, INK.rule);
  line(paper, `M${left} ${z.axisY}H${right}`, INK.edge);
  paper.save().dash(1, { space: 3 });
  line(paper, `M${ends[0]} ${z.axisY}H${left}M${right} ${z.axisY}H${ends[1]}`, INK.edge);
  paper.undash().restore();
  line(paper, `M${centre} ${top}V${bottom}`, INK.ink);
  line(paper, `M${left} ${z.post[0]}V${z.post[1]}M${right} ${z.post[0]}V${z.post[1]}`, INK.ink, z.postWidth);
}

function drawResult(paper: Paper, type: Typesetter, strip: StripGeometry): void {
  const { measures: z, result } = strip;
  for (const dot of strip.wake) paper.circle(dot.x, dot.y, dot.r).fillOpacity(dot.opacity).fill(INK.ink);
  paper.fillOpacity(1);
  drawFigures(paper, type, strip);
  if (!result) return;
  const colour = OUTCOME_INK[result.outcome];
  if (result.whisker) {
    const { from, to, caps } = result.whisker;
    line(paper, `M${from} ${z.axisY}H${to}`, INK.sheet, z.stroke + 3);
    line(paper, `M${from} ${z.axisY}H${to}`, colour, z.stroke);
    const ends = caps.map((x) => `M${x} ${z.axisY - z.capHalf}V${z.axisY + z.capHalf}`).join('');
    line(paper, ends, colour, z.stroke);
  }
  const { shape, half } = result.marker;
  const fill = half === null ? colour : INK.sheet;
  paper
    .path(shape)
    .lineWidth(z.stroke * 2.6)
    .fillAndStroke(fill, INK.sheet);
  paper.path(shape).lineWidth(z.stroke).fillAndStroke(fill, colour);
  if (half !== null) paper.path(half).fill(colour);
  for (const chevron of result.chevrons) line(paper, chevron, colour, z.stroke * 1.1);
  if (result.leader) line(paper, `M${result.x} ${result.leader.y1}V${result.leader.y2}`, colour);
}

function drawFigures(paper: Paper, type: Typesetter, strip: StripGeometry): void {
  const { measures: z, result, scale } = strip;
  const write = (
    text: string,
    at: { x: number; y: number; size: number; isBold: boolean; colour: string },
    anchor: 'start' | 'middle' | 'end',
  ): void => {
    const face = at.isBold ? ('mono-bold' as const) : ('mono' as const);
    const laid = type.lay(
      [{ text, style: { face, size: at.size, colour: at.colour, leading: at.size } }],
      1e4,
    );
    const width = laid.lines[0]?.width ?? 0;
    const x = anchor === 'middle' ? at.x - width / 2 : anchor === 'end' ? at.x - width : at.x;
    // The geometry gives the baseline, the typesetter wants the top of the line.
    type.draw(laid, x, at.y - at.size * 0.85);
  };
  if (z.figures) {
    const { y, fontSize } = z.figures;
    for (const mark of scale)
      write(mark.text, { x: mark.x, y, size: fontSize, isBold: false, colour: INK.quiet }, 'middle');
  }
  if (!result?.figure) return;
  const { x, y, text, anchor, fontSize } = result.figure;
  write(text, { x, y, size: fontSize, isBold: true, colour: OUTCOME_INK[result.outcome] }, anchor);
}
