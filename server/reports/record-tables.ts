/** The tables of the calibration record: states, replicates, budget, steps. */
import type { Judgement, Verdict } from '../../shared/contracts/calibrations.ts';
import type { CaptureStep } from '../../shared/contracts/vocabulary.ts';
import {
  benchConductivity,
  benchUnit,
  decimalsOf,
  EXCLUSION_LABELS,
  SOURCE_LABELS,
  stateFigures,
  STEP_LABELS,
  verdictStrip,
} from '../../shared/format/calibration-words.ts';
import { formatDateTime, formatTime } from '../../shared/format/dates.ts';
import { capitalise } from '../../shared/format/labels.ts';
import { formatNumber, formatSigned } from '../../shared/format/numbers.ts';
import { INK, px } from './paper.ts';
import type { CalibrationContent, RecordCapture } from './record-content.ts';
import { gap, headingRows, STYLE, tableRow, textRows, type Cell, type Row, type Tools } from './sheet.ts';
import { drawStrip } from './strip-drawing.ts';

const quiet = (text: string, width: number, align: Cell['align'] = 'left'): Cell => ({
  text,
  style: STYLE.monoQuiet,
  width,
  align,
});
const mono = (text: string, width: number, align: Cell['align'] = 'left'): Cell => ({
  text,
  style: STYLE.mono,
  width,
  align,
});

const stripScale = px(84) / 120;
const stateWidths = {
  name: px(66),
  probe: px(54),
  reference: px(70),
  error: px(60),
  U: px(50),
  strip: px(84),
};

export function stateRows(
  tools: Tools,
  judgement: Judgement,
  tolerancePercent: number,
  width: number,
): Row[] {
  const states: [name: string, verdict: Verdict | null, words: string][] = [
    ['as found', judgement.asFound, 'not measured'],
    ['cleaned', judgement.cleaned, 'not measured'],
    judgement.asLeftEqualsCleaned
      ? ['as left', null, 'not adjusted: as left equals cleaned']
      : ['as left', judgement.asLeft, 'not measured'],
  ];
  const unit = benchUnit(states.map(([, verdict]) => verdict?.meanUsCm ?? null));
  const { name, probe, reference, error, U } = stateWidths;
  const headings = tableRow(tools, [
    quiet('State', name),
    quiet('Probe', probe, 'right'),
    quiet('Reference', reference, 'right'),
    quiet('Error', error, 'right'),
    quiet('U', U, 'right'),
  ]);
  const rows = states.map(([label, verdict, words]) => {
    if (!verdict)
      return tableRow(tools, [mono(label, name), { text: words, style: STYLE.small, width: width - name }]);
    const figures = stateFigures(verdict, unit);
    const cells = [
      mono(label, name),
      mono(figures.probe, probe, 'right'),
      mono(figures.reference, reference, 'right'),
      mono(figures.error, error, 'right'),
      mono(figures.uncertainty, U, 'right'),
    ];
    return tableRow(tools, cells, (x, y) =>
      drawStrip(tools.paper, tools.type, verdictStrip(verdict, tolerancePercent, label), 'row', {
        x: x + width - stateWidths.strip,
        y: y + px(6),
        scale: stripScale,
      }),
    );
  });
  const temperature = (judgement.cleaned ?? judgement.asFound)?.meanTemperatureC ?? null;
  const at = temperature === null ? '' : ` ${formatNumber(temperature, { decimals: 2, unit: '°C' })}`;
  return [
    ...headingRows(tools, 'Three states', width),
    { ...headings, isKeptWithNext: true },
    ...rows,
    gap(3),
    ...textRows(
      tools,
      [{ text: `${unit}, raw, at the temperature of the solution${at}.`, style: STYLE.note }],
      width,
      px(20),
    ),
  ];
}

/** A capture that came this much later was made without network. */
const OFFLINE_MS = 60_000;

export function replicateRows(
  tools: Tools,
  record: CalibrationContent,
  step: CaptureStep,
  width: number,
): Row[] {
  const captures = record.captures.filter((capture) => capture.step === step);
  if (captures.length === 0) return [];
  const unit = benchUnit(captures.map((one) => one.conductivityUsCm));
  return [
    ...headingRows(tools, `Readings, ${STEP_LABELS[step]}`, width),
    captureHead(tools, unit),
    ...captures.flatMap((capture) => captureRows(tools, capture, unit, record.site.timeZone, width)),
    gap(3),
    ...textRows(
      tools,
      [{ text: replicateNote(captures, record.judgement, step), style: STYLE.note }],
      width,
      px(18),
    ),
  ];
}

const captureWidths = { position: px(16), value: px(58), temperature: px(62), time: px(60) };

function captureHead(tools: Tools, unit: string): Row {
  const { position, value, temperature, time } = captureWidths;
  const heads = [
    quiet('', position),
    quiet(unit, value, 'right'),
    quiet('probe °C', temperature, 'right'),
    quiet('ref. °C', temperature, 'right'),
    quiet('time', time, 'right'),
  ];
  return { ...tableRow(tools, heads), isKeptWithNext: true };
}

function captureRows(
  tools: Tools,
  capture: RecordCapture,
  unit: ReturnType<typeof benchUnit>,
  timeZone: string,
  width: number,
): Row[] {
  const isStruck = capture.excluded !== null;
  const { position, value, temperature, time } = captureWidths;
  const struck = (text: string, cellWidth: number): Cell => ({ ...mono(text, cellWidth, 'right'), isStruck });
  const figures = tableRow(tools, [
    mono(String(capture.position), position),
    struck(benchConductivity(capture.conductivityUsCm, unit), value),
    struck(formatNumber(capture.temperatureC, { decimals: 2 }), temperature),
    struck(formatNumber(capture.referenceTemperatureC, { decimals: 2 }), temperature),
    mono(formatTime(capture.capturedAt, { timeZone, seconds: true }), time, 'right'),
  ]);
  const words = [
    capture.source === 'typed' ? SOURCE_LABELS.typed : null,
    capture.isStable ? null : 'not stable within the time-out',
    capture.referenceConductivityUsCm === null
      ? null
      : `portable meter ${benchConductivity(capture.referenceConductivityUsCm, unit)}`,
    capture.excluded ? exclusionWords(capture.excluded) : null,
  ].filter((one) => one !== null);
  if (words.length === 0) return [figures];
  const note = textRows(
    tools,
    [{ text: capitalise(words.join(', ')) + '.', style: STYLE.note }],
    width - px(16),
  );
  return [
    { ...figures, isKeptWithNext: true },
    ...note.map((row) => ({ ...row, draw: (x: number, y: number) => row.draw(x + px(16), y) })),
  ];
}

const exclusionWords = ({ code, note, by }: NonNullable<RecordCapture['excluded']>): string =>
  `excluded by ${by ?? 'the performer'}: ${EXCLUSION_LABELS[code]}${note ? `, ${note}` : ''}`;

const verdictOfStep: Partial<
  Record<CaptureStep, keyof Judgement & ('asFound' | 'cleaned' | 'asLeft' | 'secondPoint')>
> = {
  'as-found': 'asFound',
  'as-found-cleaned': 'cleaned',
  'as-left': 'asLeft',
  'second-point': 'secondPoint',
};

function replicateNote(captures: readonly RecordCapture[], judgement: Judgement, step: CaptureStep): string {
  const key = verdictOfStep[step];
  const verdict = key ? judgement[key] : null;
  const excluded = captures.filter((one) => one.excluded !== null).length;
  const isOffline = captures.some(
    (one) => Date.parse(one.receivedAt) - Date.parse(one.capturedAt) > OFFLINE_MS,
  );
  const offset = captures.find((one) => one.clockOffsetMs !== null)?.clockOffsetMs;
  return [
    verdict ? `s = ${formatNumber(verdict.repeatabilityPercent, { decimals: 2 })} %.` : null,
    excluded === 0 ? 'None excluded.' : `${excluded} excluded, kept and struck through.`,
    isOffline ? 'Captured without network, sent later.' : null,
    offset == null
      ? null
      : `The clock of the phone stood ${formatSigned(offset / 1000, 1, 's')} against the server.`,
  ]
    .filter((one) => one !== null)
    .join(' ');
}

export function budgetRows(tools: Tools, verdict: Verdict, width: number): Row[] {
  const parts = verdict.budget.toSorted(
    (one, other) => other.standardUncertaintyPercent - one.standardUncertaintyPercent,
  );
  const largest = parts[0]?.standardUncertaintyPercent || 1;
  const barWidth = px(62);
  const nameWidth = width - barWidth - px(66);
  const rows = parts.map((part) =>
    tableRow(
      tools,
      [
        { text: capitalise(part.name), style: STYLE.mono, width: nameWidth },
        { text: '', style: STYLE.mono, width: barWidth },
        mono(formatNumber(part.standardUncertaintyPercent, { decimals: 2, unit: '%' }), px(66), 'right'),
      ],
      (x, y) =>
        void tools.paper
          .rect(
            x + nameWidth,
            y + px(9),
            Math.max(0.5, (barWidth * part.standardUncertaintyPercent) / largest),
            px(8),
          )
          .fill(INK.ink),
    ),
  );
  const U = verdict.expandedUncertaintyPercent;
  const k = formatNumber(verdict.coverageFactor, { significantDigits: 3 });
  const total = tableRow(tools, [
    { text: `Expanded, k = ${k}`, style: STYLE.monoBold, width: width - px(66) },
    {
      text: formatNumber(U, { decimals: decimalsOf(U), unit: '%' }),
      style: STYLE.monoBold,
      width: px(66),
      align: 'right',
    },
  ]);
  return [...headingRows(tools, 'What makes up U, standard', width), ...rows, total, gap(px(22))];
}

/** When each step was done at the probe, and when the server had it. */
export function stepRows(tools: Tools, record: CalibrationContent, width: number): Row[] {
  const { timeZone } = record.site;
  const widths = [px(150), px(190), px(170), width - px(510)] as const;
  const headings = tableRow(tools, [
    quiet('Step', widths[0]),
    quiet('Done at the probe', widths[1]),
    quiet('Received', widths[2]),
    quiet('By', widths[3]),
  ]);
  const rows = record.steps.map((step) =>
    tableRow(tools, [
      { text: STEP_LABELS[step.step], style: STYLE.small, width: widths[0] },
      mono(formatDateTime(step.capturedAt, { timeZone, seconds: true }), widths[1]),
      mono(formatDateTime(step.receivedAt, { timeZone, seconds: true }), widths[2]),
      { text: step.by ?? '', style: STYLE.small, width: widths[3] },
    ]),
  );
  return [
    ...headingRows(tools, 'Steps, in the order they were done', width),
    { ...headings, isKeptWithNext: true },
    ...rows,
    gap(px(20)),
  ];
}
