import { hatchPath, px } from '../../../../../shared/format/strip-geometry.ts';

export const SETTLE_HEIGHT = 96;
/** Half the height of the clear channel: the range limit fills it. */
const CHANNEL_HALF = 12;
const EDGE = 3;

export interface SettleDrawing {
  line: string;
  hatch: string;
  limits: string;
  channel: { y: number; height: number };
}

/**
 * The last window as a line in a channel as high as the range limit. What lies farther out runs along the edge: while
 * a probe still warms up, how far it is off says nothing that the figures do not.
 */
export function settleDrawing(
  points: readonly { atMs: number; value: number }[],
  window: { endMs: number; lengthMs: number; middle: number; limitRange: number },
  width: number,
): SettleDrawing {
  const centre = SETTLE_HEIGHT / 2;
  const top = centre - CHANNEL_HALF;
  const bottom = centre + CHANNEL_HALF;
  const x = (atMs: number) => 2 + (1 - (window.endMs - atMs) / window.lengthMs) * (width - 4);
  const y = (value: number) => {
    const offset = ((value - window.middle) / (window.limitRange / 2)) * CHANNEL_HALF;
    return centre - Math.max(EDGE - centre, Math.min(centre - EDGE, offset));
  };
  const inside = points.filter((point) => x(point.atMs) >= 0);
  return {
    line:
      inside.length < 2
        ? ''
        : 'M' + inside.map((point) => `${px(x(point.atMs))} ${px(y(point.value))}`).join('L'),
    hatch:
      hatchPath(0, width, 2, top, 10, 'rising') +
      hatchPath(0, width, bottom, SETTLE_HEIGHT - 2, 10, 'falling'),
    limits: `M0 ${top}H${width}M0 ${bottom}H${width}`,
    channel: { y: top, height: bottom - top },
  };
}
