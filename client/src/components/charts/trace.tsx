import { hatchPath, px } from '../../../../shared/format/strip-geometry.ts';

export interface TraceProps {
  /** Evenly or unevenly spaced: [ms, value]; null is a gap. In order of time. */
  points: readonly (readonly [t: number, value: number | null])[];
  from: number;
  to: number;
  /** stop draws in the state's colour; held and gone end the line and say so. */
  state?: 'plain' | 'stop' | 'held' | 'gone';
}

const WIDTH = 112;
const HEIGHT = 26;
/** Keeps the end dot inside the drawing. */
const INSET = 3;
/** A flat line stays flat: below this part of its value a change is not blown up to full height. */
const LEAST_SPAN = 0.01;

/** The last hours of a point in a ledger: small, secondary, no scale. */
export function Trace({ points, from, to, state = 'plain' }: TraceProps) {
  const runs = traceRuns(points, from, to);
  const colour = state === 'stop' ? 'var(--stop)' : 'var(--ink)';
  const last = runs.at(-1)?.at(-1);
  return (
    <svg
      className="trace"
      width={WIDTH}
      height={HEIGHT}
      viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
      aria-hidden="true"
    >
      {runs.map((run) => (
        <path
          key={run[0]?.[0]}
          d={'M' + run.map(([x, y]) => `${px(x)} ${px(y)}`).join('L')}
          fill="none"
          stroke={colour}
          strokeWidth={1.25}
          strokeLinejoin="round"
        />
      ))}
      {last ? <TraceEnd x={last[0]} y={last[1]} state={state} colour={colour} /> : null}
    </svg>
  );
}

interface TraceEndProps {
  x: number;
  y: number;
  state: NonNullable<TraceProps['state']>;
  colour: string;
}

function TraceEnd({ x, y, state, colour }: TraceEndProps) {
  if (state === 'held') {
    return (
      <>
        <path
          d={hatchPath(x + 1, WIDTH - 1, 3, HEIGHT - 3, 5, 'rising')}
          stroke="var(--hatch-out)"
          fill="none"
        />
        <path d={`M${px(x + 1)} 1V${HEIGHT - 1}`} stroke="var(--ink)" />
      </>
    );
  }
  if (state === 'gone') {
    return (
      <path
        d={`M${px(x + 5)} ${px(y)}H${WIDTH - 2}`}
        stroke="var(--gone)"
        strokeWidth={1.6}
        strokeDasharray="1 5"
        strokeLinecap="round"
      />
    );
  }
  return <circle cx={px(x)} cy={px(y)} r={2.2} fill={colour} />;
}

/** The runs of a trace between its gaps, in px. */
export function traceRuns(points: TraceProps['points'], from: number, to: number): [number, number][][] {
  const values = points.map(([, value]) => value).filter((value) => value !== null);
  const low = Math.min(...values);
  const high = Math.max(...values);
  const span = Math.max(high - low, Math.abs(high) * LEAST_SPAN, Number.MIN_VALUE);
  const middle = (low + high) / 2;
  const runs: [number, number][][] = [[]];
  for (const [t, value] of points) {
    if (value === null) {
      if (runs.at(-1)?.length) runs.push([]);
      continue;
    }
    const x = INSET + ((t - from) / (to - from)) * (WIDTH - 2 * INSET);
    const y = HEIGHT / 2 - ((value - middle) / span) * (HEIGHT - 2 * INSET);
    runs.at(-1)?.push([Math.max(INSET, Math.min(WIDTH - INSET, x)), y]);
  }
  return runs.filter((run) => run.length > 0);
}
