import type { LiveBoard } from '../../../../../shared/contracts/readings.ts';

type Counts = LiveBoard['sites'][number]['counts'];
type Mark = 'fit' | 'care' | 'gone' | 'held' | 'stop';

const STEP = 14;
const SHAPES: Readonly<Record<Mark, { d: string; stroke: string; width: number; cap?: 'round' }>> = {
  fit: { d: 'M0 8H10', stroke: 'var(--fit)', width: 1.5 },
  care: { d: 'M0 8c1.7-5 3.3-5 5 0s3.3 5 5 0', stroke: 'var(--care)', width: 2.2 },
  gone: { d: 'M1.5 8h.01M8.5 8h.01', stroke: 'var(--gone)', width: 2.6, cap: 'round' },
  held: { d: 'M0 8H3.5M4.25 2.75h3.5v10.5h-3.5z', stroke: 'var(--ink)', width: 1.5 },
  stop: { d: 'M0 8H3M6 1V15', stroke: 'var(--stop)', width: 5 },
};

/** One water-line mark a point, the calm ones first: a site's shore. The sentence beside it says the same. */
export function Shore({ counts }: { counts: Counts }) {
  const marks: Mark[] = [
    ...Array<Mark>(counts.fit).fill('fit'),
    ...Array<Mark>(counts.useWithCare).fill('care'),
    ...Array<Mark>(counts.noSignal).fill('gone'),
    ...Array<Mark>(counts.held).fill('held'),
    ...Array<Mark>(counts.doNotUse).fill('stop'),
  ];
  return (
    <svg className="shore" width={marks.length * STEP} height={16} aria-hidden="true">
      {marks.map((mark, i) => {
        const { d, stroke, width, cap } = SHAPES[mark];
        return (
          <path
            key={i}
            d={d}
            transform={`translate(${i * STEP} 0)`}
            fill="none"
            stroke={stroke}
            strokeWidth={width}
            strokeLinecap={cap}
          />
        );
      })}
    </svg>
  );
}
