export type StripSize = 'row' | 'page' | 'bench';

/** The fixed measures of the drawing, in px; one set a size, because text in a scaled drawing becomes unreadable. */
export interface StripMeasures {
  width: number;
  height: number;
  /** px for one tolerance. */
  unit: number;
  /** The axis ends at this many tolerances on either side. */
  domain: number;
  dotRadius: number;
  axisY: number;
  post: readonly [top: number, bottom: number];
  postWidth: number;
  channel: readonly [top: number, bottom: number];
  hatchStep: number;
  stroke: number;
  capHalf: number;
  /** Earlier results: how far each sinks below the axis, newest first. */
  wake: readonly [number, number, number];
  wakeRadius: number;
  /** Baseline and size of the figures; null where none are printed. */
  figures: { y: number; fontSize: number; half: number } | null;
}

export const STRIP_MEASURES: Readonly<Record<StripSize, StripMeasures>> = {
  row: {
    width: 120,
    height: 20,
    unit: 40,
    domain: 1.4,
    dotRadius: 3.8,
    axisY: 12.5,
    post: [4, 20],
    postWidth: 2,
    channel: [7, 18],
    hatchStep: 3,
    stroke: 1.5,
    capHalf: 3,
    wake: [0, 0, 0],
    wakeRadius: 2.2,
    figures: null,
  },
  page: {
    width: 640,
    height: 72,
    unit: 200,
    domain: 1.5,
    dotRadius: 8,
    axisY: 26,
    post: [6, 50],
    postWidth: 2,
    channel: [12, 46],
    hatchStep: 6,
    stroke: 2,
    capHalf: 6,
    wake: [8, 13, 17],
    wakeRadius: 4,
    figures: { y: 67, fontSize: 13, half: 74 },
  },
  bench: {
    width: 360,
    height: 120,
    unit: 110,
    domain: 1.5,
    dotRadius: 11,
    axisY: 44,
    post: [12, 86],
    postWidth: 3,
    channel: [20, 80],
    hatchStep: 8,
    stroke: 2.5,
    capHalf: 9,
    wake: [13, 21, 28],
    wakeRadius: 5.5,
    figures: { y: 110, fontSize: 16, half: 72 },
  },
};
