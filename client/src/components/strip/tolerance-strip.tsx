import { useLayoutEffect, useRef } from 'react';
import type { Outcome } from '../../../../shared/contracts/vocabulary.ts';
import { useIsNarrow } from '../../lib/use-width.ts';
import type { StripGeometry, StripInput, StripResult } from '../../../../shared/format/strip-geometry.ts';
import { stripGeometry } from '../../../../shared/format/strip-geometry.ts';
import type { StripSize } from '../../../../shared/format/strip-sizes.ts';

export interface ToleranceStripProps extends StripInput {
  /** row 120 × 20 in ledgers, page 640 × 72, bench 360 × 120. */
  size?: StripSize;
}

/** The state colour of an outcome; the shape of the mark says the same without colour. */
export const OUTCOME_COLOUR: Readonly<Record<Outcome, string>> = {
  'within-clear': 'var(--out-within-clear)',
  'within-unsure': 'var(--out-within-unsure)',
  'outside-unsure': 'var(--out-outside-unsure)',
  'outside-clear': 'var(--out-outside-clear)',
};

/**
 * The tolerance strip: posts are the tolerance, hatching is "too close to be sure", the whisker is U, earlier results
 * sink and fade, the open caret is where drift puts the probe today.
 */
export function ToleranceStrip({ size = 'row', ...input }: ToleranceStripProps) {
  const strip = stripGeometry(input, size);
  const { width, height } = strip.measures;
  return (
    <svg
      className={`strip strip-${size}`}
      width={width}
      height={height}
      viewBox={`0 0 ${width} ${height}`}
      role="img"
      aria-label={strip.words}
    >
      <Channel strip={strip} size={size} isEmpty={!strip.result && !input.closed} />
      {input.closed && size !== 'row' ? <CoverPlate words={input.closed} strip={strip} /> : null}
      {strip.wake.map((dot, i) => (
        <circle key={i} cx={dot.x} cy={dot.y} r={dot.r} fill="var(--ink)" opacity={dot.opacity} />
      ))}
      {strip.caret ? (
        <path
          d={strip.caret}
          fill="none"
          stroke="var(--kelp)"
          strokeWidth={strip.measures.stroke}
          strokeLinecap="square"
        />
      ) : null}
      {strip.result ? <Result result={strip.result} strip={strip} /> : null}
      <Figures strip={strip} isEmpty={!strip.result && !input.closed} />
    </svg>
  );
}

/** A page strip that gives way to the bench strip where its container is narrower than 600 px. */
export function PageStrip(props: StripInput) {
  const [ref, isNarrow] = useIsNarrow<HTMLDivElement>(640);
  return (
    <div ref={ref} className="strip-fit">
      <ToleranceStrip {...props} size={isNarrow ? 'bench' : 'page'} />
    </div>
  );
}

function Channel({ strip, size, isEmpty }: { strip: StripGeometry; size: StripSize; isEmpty: boolean }) {
  const { measures: z, posts, ends, centre } = strip;
  const [left, right] = posts;
  const [top, bottom] = z.channel;
  return (
    <>
      <rect x={left} y={top} width={right - left} height={bottom - top} fill="var(--sheet)" />
      <path d={strip.hatchInside} stroke="var(--hatch-in)" fill="none" />
      <path d={strip.hatchOutside} stroke="var(--hatch-out)" fill="none" />
      {size === 'row' ? null : (
        <path d={`M${left} ${top}H${right}M${left} ${bottom}H${right}`} stroke="var(--rule)" />
      )}
      <path
        d={`M${left} ${z.axisY}H${right}`}
        stroke="var(--edge)"
        strokeDasharray={isEmpty ? '2 3' : undefined}
      />
      <path
        d={`M${ends[0]} ${z.axisY}H${left}M${right} ${z.axisY}H${ends[1]}`}
        stroke="var(--edge)"
        strokeDasharray="1 3"
      />
      <path d={`M${centre} ${top}V${bottom}`} stroke="var(--ink)" />
      <path
        d={`M${left} ${z.post[0]}V${z.post[1]}M${right} ${z.post[0]}V${z.post[1]}`}
        stroke="var(--ink)"
        strokeWidth={z.postWidth}
      />
    </>
  );
}

function CoverPlate({ words, strip }: { words: string; strip: StripGeometry }) {
  // 13 px mono is 7.8 px a character; 8.4 leaves a little air.
  const width = Math.min(words.length * 8.4 + 20, strip.measures.width - 8);
  const { axisY } = strip.measures;
  return (
    <>
      <rect
        x={strip.centre - width / 2}
        y={axisY - 14}
        width={width}
        height={28}
        fill="var(--sheet)"
        stroke="var(--edge)"
      />
      <text x={strip.centre} y={axisY + 5} textAnchor="middle" fontSize={13} fill="var(--ink-2)">
        {words}
      </text>
    </>
  );
}

function Result({ result, strip }: { result: StripResult; strip: StripGeometry }) {
  const ref = useSlide(result.x);
  const { axisY, stroke, capHalf } = strip.measures;
  const colour = OUTCOME_COLOUR[result.outcome];
  const { whisker, figure, leader } = result;
  return (
    <>
      <g ref={ref}>
        {whisker ? (
          <>
            <path
              d={`M${whisker.from} ${axisY}H${whisker.to}`}
              stroke="var(--sheet)"
              strokeWidth={stroke + 3}
            />
            <path d={`M${whisker.from} ${axisY}H${whisker.to}`} stroke={colour} strokeWidth={stroke} />
            <path
              d={whisker.caps.map((x) => `M${x} ${axisY - capHalf}V${axisY + capHalf}`).join('')}
              stroke={colour}
              strokeWidth={stroke}
            />
          </>
        ) : null}
        <OutcomeShape {...result.marker} colour={colour} stroke={stroke} />
        {result.chevrons.map((d) => (
          <path key={d} d={d} fill="none" stroke={colour} strokeWidth={stroke * 1.1} />
        ))}
      </g>
      {leader ? <path d={`M${result.x} ${leader.y1}V${leader.y2}`} stroke={colour} /> : null}
      {figure ? (
        <text
          x={figure.x}
          y={figure.y}
          textAnchor={figure.anchor}
          fontSize={figure.fontSize}
          fontWeight={700}
          letterSpacing={strip.measures.figures ? undefined : -0.4}
          fill={colour}
          paintOrder="stroke"
          stroke={strip.measures.figures ? undefined : 'var(--sheet)'}
          strokeWidth={strip.measures.figures ? undefined : 4}
        >
          {figure.text}
        </text>
      ) : null}
    </>
  );
}

function Figures({ strip, isEmpty }: { strip: StripGeometry; isEmpty: boolean }) {
  const { figures } = strip.measures;
  if (!figures) return null;
  return (
    <>
      {isEmpty ? (
        <text x={strip.centre + 12} y={figures.y} fontSize={figures.fontSize} fill="var(--gone)">
          no result yet
        </text>
      ) : null}
      {strip.scale.map((mark) => (
        <text
          key={mark.text}
          x={mark.x}
          y={figures.y}
          textAnchor="middle"
          fontSize={figures.fontSize}
          fill="var(--ink-3)"
        >
          {mark.text}
        </text>
      ))}
    </>
  );
}

interface OutcomeShapeProps {
  shape: string;
  half: string | null;
  colour: string;
  stroke: number;
}

/** The mark itself, cased in the channel's colour so that it stands clear of hatch and whisker. */
export function OutcomeShape({ shape, half, colour, stroke }: OutcomeShapeProps) {
  const fill = half === null ? colour : 'var(--sheet)';
  return (
    <>
      <path d={shape} fill={fill} stroke="var(--sheet)" strokeWidth={stroke * 2.6} />
      <path d={shape} fill={fill} stroke={colour} strokeWidth={stroke} strokeLinejoin="round" />
      {half === null ? null : <path d={half} fill={colour} />}
    </>
  );
}

/** On a new result the mark slides once from where the last one stood. */
function useSlide(x: number) {
  const ref = useRef<SVGGElement>(null);
  const last = useRef(x);
  useLayoutEffect(() => {
    const from = last.current - x;
    last.current = x;
    const prefersStill = window.matchMedia('(prefers-reduced-motion: reduce)').matches;
    if (from === 0 || prefersStill) return;
    ref.current?.animate?.([{ transform: `translateX(${from}px)` }, { transform: 'none' }], {
      duration: 900,
      easing: 'cubic-bezier(.2,.6,.2,1)',
    });
  }, [x]);
  return ref;
}
