import type { ReactNode } from 'react';
import { useState } from 'react';
import type { CheckStage } from '../../../../shared/contracts/vocabulary.ts';
import { formatDate, formatDay } from '../../../../shared/format/dates.ts';
import { capitalise, STAGE_LABELS } from '../../../../shared/format/labels.ts';
import { formatNumber, MINUS } from '../../../../shared/format/numbers.ts';
import { useWidth } from '../../lib/use-width.ts';
import type { CellConstantGeometry, CellConstantInput, PlacedPoint } from './cell-constant-geometry.ts';
import { cellConstantGeometry } from './cell-constant-geometry.ts';
import { cellConstantWords } from './cell-constant-words.ts';
import { ChartTable, TableToggle } from './chart-table.tsx';

export type CellConstantChartProps = CellConstantInput;

/** Digits of a cell constant as they are set in transmitters: 0.5118. */
const CONSTANT_DECIMALS = 4;
/** An automatic check a day makes many points; these are drawn small and without caps. */
const SMALL_DOT = 2.2;

/** Cell constant as determined in KCl against the channel of tolerance around the constant in use. */
export function CellConstantChart(props: CellConstantChartProps) {
  const [ref, width] = useWidth<HTMLDivElement>(872);
  const [isTable, setIsTable] = useState(false);
  return (
    <figure className="chart-frame">
      <div className="chart-tools">
        <TableToggle isTable={isTable} onToggle={() => setIsTable(!isTable)} />
      </div>
      <div ref={ref}>
        {isTable ? (
          <ConstantTable {...props} />
        ) : (
          <Drawing geometry={cellConstantGeometry(props, width)} {...props} />
        )}
      </div>
      {isTable ? null : <ChartKey {...props} />}
    </figure>
  );
}

function Drawing({ geometry: g, ...input }: CellConstantInput & { geometry: CellConstantGeometry }) {
  const isNarrow = g.width < 500;
  return (
    <svg
      width={g.width}
      height={g.height}
      viewBox={`0 0 ${g.width} ${g.height}`}
      role="img"
      aria-label={cellConstantWords(input)}
    >
      {g.channels.map((channel) => (
        <g key={channel.x}>
          <rect
            x={channel.x}
            y={channel.top}
            width={channel.width}
            height={channel.bottom - channel.top}
            fill="var(--sheet)"
          />
          <path d={channel.hatch} stroke="var(--hatch-in)" strokeWidth={0.8} fill="none" opacity={0.8} />
          <path
            d={`M${channel.x} ${channel.top}h${channel.width}M${channel.x} ${channel.bottom}h${channel.width}`}
            stroke="var(--ink)"
            strokeWidth={2}
          />
        </g>
      ))}
      {g.bands.map((band) => (
        <path key={band.opacity} d={band.d} fill="var(--kelp)" opacity={band.opacity} />
      ))}
      {g.forecastLine ? (
        <path d={g.forecastLine} stroke="var(--kelp)" strokeWidth={1.5} strokeDasharray="5 4" fill="none" />
      ) : null}
      <path d={g.constantLine} fill="none" stroke="var(--ink)" strokeWidth={1.75} />
      <Dates g={g} isNarrow={isNarrow} due={input.due ?? null} timeZone={input.timeZone} />
      {g.joins.map((join) => (
        <path key={join.x} d={`M${join.x} ${join.y1}V${join.y2}`} stroke="var(--ink)" strokeDasharray="2 2" />
      ))}
      {g.placed.map((placed) => (
        <PointShape key={`${placed.point.at}-${placed.point.stage}`} placed={placed} />
      ))}
      {isNarrow ? null : <StepWords g={g} />}
      <Axes g={g} tolerancePercent={input.tolerancePercent} />
    </svg>
  );
}

function PointShape({ placed: { point, x, y, whisker } }: { placed: PlacedPoint }) {
  if (point.stage === 'automatic') {
    return (
      <>
        {whisker ? <path d={`M${x} ${whisker[0]}V${whisker[1]}`} stroke="var(--edge)" /> : null}
        <circle cx={x} cy={y} r={SMALL_DOT} fill="var(--ink)" />
      </>
    );
  }
  return (
    <>
      {whisker ? (
        <path
          d={`M${x} ${whisker[0]}V${whisker[1]}M${x - 4} ${whisker[0]}h8M${x - 4} ${whisker[1]}h8`}
          stroke="var(--ink)"
          strokeWidth={1.4}
        />
      ) : null}
      {point.stage === 'as-found' ? (
        <rect
          x={x - 4}
          y={y - 4}
          width={8}
          height={8}
          fill="var(--sheet)"
          stroke="var(--ink)"
          strokeWidth={1.5}
        />
      ) : (
        <circle cx={x} cy={y} r={4.5} fill="var(--ink)" stroke="var(--sheet)" strokeWidth={1.5} />
      )}
      {point.stage === 'as-left' ? (
        <circle cx={x} cy={y} r={7} fill="none" stroke="var(--ink)" strokeWidth={1.25} />
      ) : null}
    </>
  );
}

interface DatesProps {
  g: CellConstantGeometry;
  isNarrow: boolean;
  due: number | null;
  timeZone: string | undefined;
}

function Dates({ g, isNarrow, due, timeZone }: DatesProps) {
  const { top, bottom } = g.plot;
  const isDueLater = g.dueX !== null && g.dueX >= g.nowX;
  const dueText = due === null ? '' : `due ${formatDay(due, timeZone ? { timeZone } : {})}`;
  return (
    <g fontSize={12}>
      <path d={`M${g.nowX} ${top - 6}V${bottom}`} stroke="var(--ink)" />
      {isNarrow && g.dueX !== null ? null : (
        <text
          x={g.nowX + (isDueLater || g.dueX === null ? -6 : 6)}
          y={top - 12}
          textAnchor={isDueLater || g.dueX === null ? 'end' : 'start'}
          fill="var(--ink-2)"
        >
          today
        </text>
      )}
      {g.dueX === null ? null : (
        <>
          <path d={`M${g.dueX} ${top - 6}V${bottom}`} stroke="var(--kelp)" strokeWidth={2} />
          <text
            x={g.dueX + (isNarrow ? -4 : isDueLater ? 6 : -6)}
            y={top - 12}
            textAnchor={isNarrow ? 'middle' : isDueLater ? 'start' : 'end'}
            fill="var(--kelp)"
            fontWeight={700}
          >
            {dueText}
          </text>
        </>
      )}
    </g>
  );
}

function StepWords({ g }: { g: CellConstantGeometry }) {
  const figure = (value: number) => formatNumber(value, { decimals: CONSTANT_DECIMALS });
  return (
    <g fontSize={12} fill="var(--ink-2)" paintOrder="stroke" stroke="var(--sheet)" strokeWidth={4}>
      {g.steps.map((step) => (
        <g key={step.x}>
          <text x={step.x + 9} y={step.y + 2}>
            adjusted
          </text>
          <text x={step.x + 9} y={step.y + 18}>
            {`${figure(step.from)} → ${figure(step.to)}`}
          </text>
        </g>
      ))}
    </g>
  );
}

function Axes({ g, tolerancePercent }: { g: CellConstantGeometry; tolerancePercent: number }) {
  const { left, right, top, bottom } = g.plot;
  const limit = formatNumber(tolerancePercent, { unit: '%' });
  return (
    <g fontSize={12} fill="var(--ink-2)">
      <path d={`M${left} ${top}V${bottom}H${right}`} fill="none" stroke="var(--ink)" />
      <text x={left - 10} y={top - 12} textAnchor="end">
        cm⁻¹
      </text>
      {g.values.map(({ value, y }) => (
        <g key={value}>
          <path d={`M${left - 5} ${y}h5`} stroke="var(--ink)" />
          <text x={left - 10} y={y + 4} textAnchor="end">
            {formatNumber(value, { decimals: g.decimals })}
          </text>
        </g>
      ))}
      {g.times.map((tick) => (
        <g key={tick.t}>
          <path d={`M${tick.x} ${bottom}v5`} stroke="var(--ink)" />
          <text x={tick.x} y={bottom + 20} textAnchor="middle">
            {tick.text}
          </text>
        </g>
      ))}
      {g.limits ? (
        <>
          <text x={right + 10} y={g.limits.top + 4}>{`${MINUS}${limit}`}</text>
          <text x={right + 10} y={g.limits.top + 21} fill="var(--ink-3)">
            reads low
          </text>
          <text x={right + 10} y={g.limits.middle + 4}>
            0
          </text>
          <text x={right + 10} y={g.limits.bottom + 4}>{`+${limit}`}</text>
          <text x={right + 10} y={g.limits.bottom - 13} fill="var(--ink-3)">
            reads high
          </text>
        </>
      ) : null}
    </g>
  );
}

/** Each shape with its words, and whether it is drawn at all. */
const KEY: readonly [ReactNode, string, (input: CellConstantInput) => boolean][] = [
  [
    <>
      <path d="M13 0V14" stroke="var(--ink)" strokeWidth="1.4" />
      <circle cx="13" cy="7" r="4.5" fill="var(--ink)" />
    </>,
    'determined, cleaned, with U',
    hasStage('as-found-cleaned'),
  ],
  [
    <rect x="9" y="3" width="8" height="8" fill="var(--sheet)" stroke="var(--ink)" strokeWidth="1.5" />,
    'as found, uncleaned',
    hasStage('as-found'),
  ],
  [
    <>
      <circle cx="13" cy="7" r="3.6" fill="var(--ink)" />
      <circle cx="13" cy="7" r="6.2" fill="none" stroke="var(--ink)" strokeWidth="1.25" />
    </>,
    'as left',
    hasStage('as-left'),
  ],
  [<circle cx="13" cy="7" r={SMALL_DOT} fill="var(--ink)" />, 'automatic check', hasStage('automatic')],
  [<path d="M4 11H13V3H22" fill="none" stroke="var(--ink)" strokeWidth="2" />, 'constant in use', () => true],
  [
    <path d="M1 9L25 1V13L1 11Z" fill="var(--kelp)" opacity=".35" />,
    'forecast, 50 · 80 · 95 %',
    ({ forecast = [] }) => forecast.length > 0,
  ],
];

function hasStage(stage: CheckStage) {
  return ({ points }: CellConstantInput) => points.some((point) => point.stage === stage);
}

function ChartKey(input: CellConstantInput) {
  return (
    <ul className="chart-key" aria-label="Key">
      {KEY.filter(([, , isDrawn]) => isDrawn(input)).map(([shape, words]) => (
        <li key={words}>
          <svg width="26" height="14" viewBox="0 0 26 14" aria-hidden="true">
            {shape}
          </svg>
          {words}
        </li>
      ))}
    </ul>
  );
}

function ConstantTable({ points, timeZone = 'UTC' }: CellConstantInput) {
  const figure = (value: number | null | undefined) => formatNumber(value, { decimals: CONSTANT_DECIMALS });
  return (
    <ChartTable
      caption="Cell constant as determined, cm⁻¹"
      heads={['Date', 'Stage', 'Cell constant, cm⁻¹', 'U, cm⁻¹']}
      rows={points.map((point) => ({
        key: `${point.at}-${point.stage}`,
        cells: [
          formatDate(point.at, { timeZone }),
          capitalise(STAGE_LABELS[point.stage]),
          figure(point.cellConstantPerCm),
          figure(point.expandedUncertaintyPerCm),
        ],
      }))}
    />
  );
}
