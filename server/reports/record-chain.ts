/** Where the reference comes from, under which conditions, and who answers for it. */
import type { Signature } from '../../shared/contracts/calibrations.ts';
import { MEANING_LABELS } from '../../shared/format/calibration-words.ts';
import { LIMITS_OF_USE, SITE_RULES_FIRST } from '../../shared/format/cautions.ts';
import { formatDate, formatDateTime } from '../../shared/format/dates.ts';
import { formatNumber } from '../../shared/format/numbers.ts';
import { CONTENT_WIDTH, INK, px } from './paper.ts';
import type { CalibrationContent, RecordContent, SignedRecord } from './record-content.ts';
import { certificateWords, findings, lotWords, thermometerWords } from './record-words.ts';
import {
  drawRule,
  gap,
  headingRows,
  ruleRow,
  STYLE,
  tableRow,
  textRows,
  type Row,
  type Tools,
} from './sheet.ts';

const indent = px(20);

/** A link of the chain: a square on a line down to the next. */
function linkRows(tools: Tools, title: string, text: string, width: number, isLast: boolean): Row[] {
  const spans = [
    [{ text: title, style: STYLE.smallBold }],
    [{ text, style: { ...STYLE.small, colour: INK.ink } }],
  ];
  const rows = spans.flatMap((one) => textRows(tools, one, width - indent));
  const lined = [...rows, gap(px(8))];
  return lined.map((row, index) => ({
    height: row.height,
    isKeptWithNext: index === 0,
    draw: (x, y) => {
      const from = index === 0 ? y + px(13) : y;
      if (!isLast)
        tools.paper
          .moveTo(x + px(7), from)
          .lineTo(x + px(7), y + row.height + px(5))
          .lineWidth(0.8)
          .strokeColor(INK.ink)
          .stroke();
      if (index === 0)
        tools.paper
          .rect(x + px(3), y + px(5), px(8), px(8))
          .lineWidth(0.8)
          .fillAndStroke(INK.sheet, INK.ink);
      row.draw(x + indent, y);
    },
  }));
}

export function chainRows(tools: Tools, record: CalibrationContent, width: number): Row[] {
  const { lot, bottle, secondLot, thermometer } = record.traceability;
  const links: [title: string, text: string][] = [];
  if (bottle) links.push([`Bottle ${bottle.code}`, bottleWords(bottle, record.site.timeZone)]);
  links.push([`Lot ${lot.code}`, lotWords(lot)], ['Producer’s certificate', certificateWords(lot)]);
  if (secondLot)
    links.push([
      `Second point, lot ${secondLot.code}`,
      `${lotWords(secondLot)} ${certificateWords(secondLot)}`,
    ]);
  links.push(
    thermometer
      ? [
          `Thermometer ${thermometer.code}`,
          `${thermometerWords(thermometer)} ${certificateWords(thermometer)}`,
        ]
      : ['No reference thermometer', 'The probe’s own temperature was taken.'],
  );
  return [
    ...headingRows(tools, 'Where the reference comes from', width),
    ...links.flatMap(([title, text], index) =>
      linkRows(tools, title, text, width, index === links.length - 1),
    ),
    gap(px(14)),
  ];
}

type Bottle = NonNullable<CalibrationContent['traceability']['bottle']>;
const bottleWords = ({ openedAt, useByOn, remainingMl }: Bottle, timeZone: string): string =>
  [
    openedAt === null ? 'not opened before' : `opened ${formatDate(openedAt, { timeZone })}`,
    useByOn === null ? null : `use by ${formatDate(useByOn)}`,
    `${formatNumber(remainingMl, { decimals: 0, unit: 'mL' })} left`,
  ]
    .filter((one) => one !== null)
    .join(', ');

/** Term and value in two columns. */
export function factRows(
  tools: Tools,
  title: string,
  facts: readonly [string, string][],
  width: number,
): Row[] {
  const termWidth = px(128);
  return [
    ...headingRows(tools, title, width),
    ...facts.map(([term, value]) =>
      tableRow(tools, [
        { text: term, style: STYLE.small, width: termWidth },
        { text: value, style: { ...STYLE.small, colour: INK.ink }, width: width - termWidth },
      ]),
    ),
    gap(px(20)),
  ];
}

export const findingRows = (tools: Tools, record: RecordContent, width: number): Row[] =>
  factRows(tools, 'What follows', findings(record), width);

export function conditionRows(tools: Tools, record: CalibrationContent, width: number): Row[] {
  const { procedure, plan, override, permitNumber, point, requirement } = record;
  const cleaning = record.steps.find(({ step }) => step === 'clean')?.data;
  const facts: ([string, string] | null)[] = [
    ['Procedure', `${procedure.name} (${procedure.code}), version ${procedure.version}`],
    [
      'Requirement',
      `tolerance ±${formatNumber(requirement.tolerancePercent, { unit: '%' })} of the reference value`,
    ],
    point.medium ? ['Medium', point.medium] : null,
    cleaning ? ['Cleaned with', `${String(cleaning['agent'])}, ${String(cleaning['minutes'])} min`] : null,
    ['Planned', plan.sentence],
    permitNumber === null
      ? null
      : ['Site permit', `${permitNumber} recorded; the permit itself is the site’s`],
    override && ['Used although not released', `${override.by} answered for it. ${override.reason}`],
  ];
  return factRows(
    tools,
    'Conditions',
    facts.filter((fact) => fact !== null),
    width,
  );
}

export const cautionRows = (tools: Tools, record: RecordContent, width: number): Row[] => [
  ...headingRows(tools, 'To be read with it', width),
  ...textRows(tools, [{ text: record.remark, style: STYLE.small }], width, px(5)),
  ...textRows(
    tools,
    [
      {
        text: `This is an in-house calibration record and no certificate of an accredited laboratory. ${LIMITS_OF_USE} ${SITE_RULES_FIRST}`,
        style: STYLE.small,
      },
    ],
    width,
    px(16),
  ),
];

const spaced = (hash: string): string => hash.replace(/.{4}(?=.)/g, '$& ');

/** Name, time, meaning, statement, method and hash of each signature: the manifest [21 CFR 11.50]. */
export function signatureRows(tools: Tools, signed: SignedRecord): Row[] {
  const { timeZone } = signed.record.site;
  const columns = [
    ...signed.signatures.map((signature) => signatureColumn(tools, signature, timeZone)),
    changedColumn(tools, signed),
  ];
  const perRow = 3;
  const bands: Row[] = [];
  for (let from = 0; from < columns.length; from += perRow)
    bands.push(bandOf(columns.slice(from, from + perRow)));
  return [
    { ...ruleRow(tools, CONTENT_WIDTH, INK.ink, 1.1), isKeptWithNext: true },
    { ...gap(px(10)), isKeptWithNext: true },
    ...bands,
    gap(px(14)),
  ];
}

const columnGap = px(20);
const columnWidth = (CONTENT_WIDTH - 2 * columnGap) / 3;

/** Columns side by side, kept on one page. */
function bandOf(columns: readonly Row[][]): Row {
  const heightOf = (rows: readonly Row[]): number => rows.reduce((sum, row) => sum + row.height, 0);
  return {
    height: Math.max(...columns.map(heightOf)) + px(10),
    draw: (x, y) => {
      for (const [index, rows] of columns.entries()) {
        let at = y;
        for (const row of rows) {
          row.draw(x + index * (columnWidth + columnGap), at);
          at += row.height;
        }
      }
    },
  };
}

const signatureColumn = (tools: Tools, signature: Signature, timeZone: string): Row[] => {
  const small = (text: string): Row[] =>
    textRows(tools, [{ text, style: { ...STYLE.small, colour: INK.ink } }], columnWidth);
  return [
    ...headingRows(tools, MEANING_LABELS[signature.meaning], columnWidth),
    ...textRows(
      tools,
      [
        { text: signature.name, style: STYLE.smallBold },
        { text: `, ${signature.role}`, style: { ...STYLE.small, colour: INK.ink } },
      ],
      columnWidth,
    ),
    ...small(formatDateTime(signature.signedAt, { timeZone, seconds: true, offset: true })),
    ...small(`“${signature.statement}”`),
    ...(signature.note ? small(signature.note) : []),
    ...textRows(tools, [{ text: signature.method, style: STYLE.note }], columnWidth),
    ...hashRows(tools, signature.recordHash),
  ];
};

const hashRows = (tools: Tools, hash: string): Row[] =>
  textRows(tools, [{ text: `sha-256 ${spaced(hash)}`, style: STYLE.monoQuiet }], columnWidth);

function changedColumn(tools: Tools, { recordHash, amendedBy, amends, status }: SignedRecord): Row[] {
  const words = amendedBy ? `amended by ${amendedBy}` : 'no';
  const notes = [
    amends ? `Amends ${amends}.` : null,
    status === 'signed' ? 'Waits for the review of another person.' : null,
    status === 'returned' ? 'Returned to the performer: not in force.' : null,
  ].filter((one) => one !== null);
  return [
    ...headingRows(tools, 'Changed since signing', columnWidth),
    ...textRows(tools, [{ text: words, style: STYLE.smallBold }], columnWidth),
    ...notes.flatMap((text) => textRows(tools, [{ text, style: STYLE.small }], columnWidth)),
    ...textRows(
      tools,
      [{ text: 'The record is its JSON in canonical form (RFC 8785).', style: STYLE.note }],
      columnWidth,
    ),
    ...hashRows(tools, recordHash),
  ];
}

export const sectionRule = (tools: Tools): Row => ({
  height: px(16),
  draw: (x, y) => drawRule(tools.paper, x, y, CONTENT_WIDTH, INK.rule, 0.6),
});
