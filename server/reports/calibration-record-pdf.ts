/** The calibration record as a PDF: the signed JSON in, bytes out; the same record gives the same bytes. */
import { OUTCOME_LABELS, capitalise } from '../../shared/format/labels.ts';
import { verdictStrip } from '../../shared/format/calibration-words.ts';
import { formatDate } from '../../shared/format/dates.ts';
import { captureSteps } from '../../shared/contracts/vocabulary.ts';
import { bytesOf, CONTENT_WIDTH, MARGIN, px, TOP } from './paper.ts';
import {
  cautionRows,
  chainRows,
  conditionRows,
  factRows,
  findingRows,
  sectionRule,
  signatureRows,
} from './record-chain.ts';
import {
  lastState,
  type AmendmentContent,
  type CalibrationContent,
  type LastState,
  type SignedRecord,
} from './record-content.ts';
import { budgetRows, replicateRows, stateRows, stepRows } from './record-tables.ts';
import { decisionSentence, performed, subtitle } from './record-words.ts';
import { gap, Sheet, STYLE, textRows, type Place, type Row } from './sheet.ts';
import { drawStrip } from './strip-drawing.ts';

const leftWidth = px(384);
const rightWidth = px(258);
const rightX = MARGIN + CONTENT_WIDTH - rightWidth;

export async function calibrationRecordPdf(signed: SignedRecord): Promise<Buffer> {
  const { record } = signed;
  const isAmendment = record.kind === 'amendment';
  const sheet = new Sheet({
    title: `Calibration record ${record.number}`,
    subject: `${record.point.name}, probe ${record.probe.tag}, serial ${record.probe.serial}`,
    createdAt: new Date(record.signedAt),
  });
  const body =
    record.kind === 'amendment'
      ? drawAmendment(sheet, record, signed)
      : drawCalibration(sheet, record, signed);
  const due = dueRows(sheet, signed);
  sheet.flow(
    [...due, ...cautionRows(sheet, record, CONTENT_WIDTH), ...signatureRows(sheet, signed)],
    MARGIN,
    body,
  );
  sheet.frame({
    kind: isAmendment ? 'Calibration record, amendment' : 'Calibration record',
    number: record.number,
    foot: `${record.organisation}. In-house calibration, traceable through the lot named. Results relate only to the probe named. Times are of the site (${record.site.timeZone}).`,
  });
  return bytesOf(sheet.paper);
}

function drawCalibration(sheet: Sheet, record: CalibrationContent, signed: SignedRecord): Place {
  const last = lastState(record.judgement);
  const tolerance = signed.tolerancePercent;
  const head = sheet.flow(
    [
      ...headRows(sheet, record, performed(record)),
      ...(last ? outcomeRows(sheet, last, tolerance, signed) : []),
    ],
    MARGIN,
    { page: 0, y: TOP },
  );
  const left = [
    ...stateRows(sheet, record.judgement, tolerance, leftWidth),
    ...chainRows(sheet, record, leftWidth),
    ...findingRows(sheet, record, leftWidth),
    ...conditionRows(sheet, record, leftWidth),
  ];
  const right = [
    ...(last ? budgetRows(sheet, last.verdict, rightWidth) : []),
    ...captureSteps.flatMap((step) => replicateRows(sheet, record, step, rightWidth)),
  ];
  const leftEnd = sheet.flow(left, MARGIN, head);
  const rightEnd = sheet.flow(right, rightX, head);
  const end = later(leftEnd, rightEnd);
  return sheet.flow([sectionRule(sheet), ...stepRows(sheet, record, CONTENT_WIDTH)], MARGIN, end);
}

function drawAmendment(sheet: Sheet, record: AmendmentContent, signed: SignedRecord): Place {
  const words = `amends ${record.amends.number}, which stays as it was signed and is read with this`;
  const facts: [string, string][] = [
    ['Amends', `${record.amends.number}, sha-256 ${record.amends.recordHash}`],
    ['Concerns', record.aspect],
    ['Amendment', record.text],
    ['Reason', record.reason],
    ['Author', record.author.name],
  ];
  const last = lastState(record.judgement);
  const rows = [
    ...headRows(sheet, record, words),
    ...factRows(sheet, 'What is amended', facts, CONTENT_WIDTH),
    ...(last ? stateRows(sheet, record.judgement, signed.tolerancePercent, leftWidth) : []),
    ...findingRows(sheet, record, CONTENT_WIDTH),
  ];
  return sheet.flow(rows, MARGIN, { page: 0, y: TOP });
}

function headRows(sheet: Sheet, record: SignedRecord['record'], words: string): Row[] {
  return [
    gap(px(6)),
    ...textRows(sheet, [{ text: record.point.name, style: STYLE.title }], CONTENT_WIDTH, px(6)),
    ...textRows(
      sheet,
      [{ text: `${subtitle(record)} · ${words}`, style: STYLE.small }],
      CONTENT_WIDTH,
      px(16),
    ),
    sectionRule(sheet),
  ];
}

function outcomeRows(sheet: Sheet, last: LastState, tolerancePercent: number, signed: SignedRecord): Row[] {
  const { verdict, what } = last;
  const scale = px(1);
  const strip: Row = {
    height: px(72) + px(20),
    draw: (x, y) =>
      drawStrip(
        sheet.paper,
        sheet.type,
        { ...verdictStrip(verdict, tolerancePercent, what), earlier: signed.earlierErrors },
        'page',
        { x: x + (CONTENT_WIDTH - 640 * scale) / 2, y: y + px(4), scale },
      ),
  };
  const sentence = [
    { text: `${capitalise(OUTCOME_LABELS[verdict.outcome])}. `, style: STYLE.sayBold },
    { text: decisionSentence(last, tolerancePercent), style: STYLE.say },
  ];
  return [strip, ...textRows(sheet, sentence, CONTENT_WIDTH, px(14)), sectionRule(sheet)];
}

/** No recommendation of an interval unless the site has agreed to it [ISO/IEC 17025, 7.8.4.3]. */
function dueRows(sheet: Sheet, { dueOn }: SignedRecord): Row[] {
  if (dueOn === null) return [];
  return factRows(sheet, 'Agreed interval', [['Next due', formatDate(dueOn)]], CONTENT_WIDTH);
}

const later = (one: Place, other: Place): Place =>
  one.page !== other.page ? (one.page > other.page ? one : other) : one.y > other.y ? one : other;
