import type { LivePoint } from '../../../../../shared/contracts/realtime.ts';
import { useWidth } from '../../../lib/use-width.ts';
import type { Settling } from './stability.ts';
import { SETTLE_HEIGHT, settleDrawing } from './settle-geometry.ts';

export interface SettleTraceProps {
  points: readonly LivePoint[];
  settling: Settling;
  windowS: number;
  /** Range limit in the unit of the values, µS/cm. */
  limitRangeUsCm: number;
  sinceMs: number;
}

/** The readings of the window, in a channel as high as the range limit allows. */
export function SettleTrace({ points, settling, windowS, limitRangeUsCm, sinceMs }: SettleTraceProps) {
  const [ref, width] = useWidth<HTMLDivElement>(358);
  const last = points.at(-1);
  const endMs = last ? Date.parse(last.at) : 0;
  const lengthMs = windowS * 1000;
  const values = points
    .slice(-2000)
    .map((point) => ({ atMs: Date.parse(point.at), value: point.conductivityUsCm }))
    .filter(
      (point): point is { atMs: number; value: number } =>
        point.value !== null && point.atMs >= Math.max(endMs - lengthMs, sinceMs),
    );
  const middle = settling.conductivity?.middle ?? values.at(-1)?.value ?? 0;
  const drawing = settleDrawing(values, { endMs, lengthMs, middle, limitRange: limitRangeUsCm || 1 }, width);
  return (
    <div ref={ref}>
      <svg
        width={width}
        height={SETTLE_HEIGHT}
        viewBox={`0 0 ${width} ${SETTLE_HEIGHT}`}
        role="img"
        aria-label={`The last ${windowS} seconds; between the lines is the range the procedure allows`}
      >
        <rect x="0" y={drawing.channel.y} width={width} height={drawing.channel.height} fill="var(--sheet)" />
        <path d={drawing.limits} stroke="var(--ink)" strokeWidth="1.5" />
        <path d={drawing.hatch} stroke="var(--hatch-out)" fill="none" opacity=".75" />
        <path d={drawing.line} className="settle-casing" fill="none" strokeLinejoin="round" />
        <path d={drawing.line} className="settle-line" fill="none" strokeLinejoin="round" />
      </svg>
    </div>
  );
}
