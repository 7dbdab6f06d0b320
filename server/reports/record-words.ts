/** Sentences of the calibration record. */
import type { Judgement, Verdict } from '../../shared/contracts/calibrations.ts';
import {
  benchUnit,
  cellConstantText,
  changeWords,
  decimalsOf,
  stateFigures,
} from '../../shared/format/calibration-words.ts';
import { formatDate, formatDateTime, formatOffset, formatTime } from '../../shared/format/dates.ts';
import { PROBE_KIND_LABELS } from '../../shared/format/labels.ts';
import {
  formatConductivity,
  formatNumber,
  formatProbability,
  formatSigned,
} from '../../shared/format/numbers.ts';
import type {
  CalibrationContent,
  LastState,
  RecordContent,
  RecordInstrument,
  RecordLot,
} from './record-content.ts';

export function subtitle({ organisation, site, point, probe }: RecordContent): string {
  const kind = PROBE_KIND_LABELS[probe.kind];
  return `${organisation}, ${site.name}, ${point.area} · point ${point.code} · ${kind} probe ${probe.tag}, serial ${probe.serial}`;
}

export function performed({ startedAt, signedAt, site, performer }: CalibrationContent): string {
  const zone = { timeZone: site.timeZone };
  const isOneDay = formatDate(startedAt, zone) === formatDate(signedAt, zone);
  const until = isOneDay ? formatTime(signedAt, zone) : formatDateTime(signedAt, zone);
  return `performed on site by ${performer.name}, ${formatDateTime(startedAt, zone)} to ${until} (${formatOffset(signedAt, zone)})`;
}

/** Result, rule and risk in one breath: an outcome without its rule says nothing [ISO/IEC 17025, 7.8.6]. */
export function decisionSentence({ what, verdict }: LastState, tolerancePercent: number): string {
  const decimals = decimalsOf(verdict.expandedUncertaintyPercent);
  const figure = (value: number): string => formatNumber(value, { decimals });
  const error = formatSigned(verdict.errorPercent, decimals, '%');
  const U = figure(verdict.expandedUncertaintyPercent);
  const k = formatNumber(verdict.coverageFactor, { significantDigits: 3 });
  const tolerance = formatNumber(tolerancePercent, { unit: '%' });
  return `${what} error ${error}, U = ${U} % (k = ${k}, about 95 %), tolerance ±${tolerance}. ${ruleSentence(verdict, tolerancePercent)} Probability that the true error lies outside: ${formatProbability(verdict.probabilityOutside)}.`;
}

function ruleSentence(verdict: Verdict, tolerancePercent: number): string {
  const decimals = decimalsOf(verdict.expandedUncertaintyPercent);
  const figure = (value: number): string => formatNumber(value, { decimals });
  const limit = verdict.acceptanceLimitPercent;
  if (limit >= tolerancePercent) return 'Rule: within when the error is no larger than the tolerance.';
  const tolerance = formatNumber(tolerancePercent);
  return `Rule: within, clear when the error is no larger than tolerance less guard band, ${tolerance} \u2212 ${figure(tolerancePercent - limit)} = ${figure(limit)} %.`;
}

/** What follows from the states, as term and value. */
export function findings(record: RecordContent): [term: string, value: string][] {
  const { judgement, cellConstantBeforePerCm: before, cellConstantAfterPerCm: after } = record;
  const isAdjusted = after !== null && after !== before;
  const rows: ([string, string] | null)[] = [
    judgement.fouling && ['Fouling', changeWords(judgement.fouling)],
    judgement.driftSinceAsLeft && ['Drift since last as left', changeWords(judgement.driftSinceAsLeft)],
    [
      'Cell constant',
      isAdjusted
        ? `${cellConstantText(before)}, adjusted to ${cellConstantText(after)}`
        : `${cellConstantText(before)}, left as it was`,
    ],
    secondPointRow(judgement),
    judgement.temperatureErrorC === null
      ? null
      : [
          'Temperature sensor',
          `${formatSigned(judgement.temperatureErrorC, 2, '°C')} against the thermometer`,
        ],
    judgement.zeroUsCm === null
      ? null
      : ['Zero in air', formatNumber(judgement.zeroUsCm, { significantDigits: 2, unit: 'µS/cm' })],
    judgement.advice && ['Advice before the decision', judgement.advice.sentence],
  ];
  return rows.filter((row) => row !== null);
}

function secondPointRow({ secondPoint, secondPointAgrees }: Judgement): [string, string] | null {
  if (!secondPoint) return null;
  const unit = benchUnit([secondPoint.meanUsCm, secondPoint.referenceUsCm]);
  const { probe, reference, error, uncertainty } = stateFigures(secondPoint, unit);
  const agrees = secondPointAgrees === null ? '' : secondPointAgrees ? ' It agrees.' : ' It does not agree.';
  return [
    'Second point',
    `${error} ± ${uncertainty}: probe ${probe} against ${reference} ${unit} of lot ${secondPoint.lotCode}.${agrees}`,
  ];
}

export function lotWords(lot: RecordLot): string {
  const { certifiedConductivityUsCm: value, expandedUncertaintyUsCm: U, coverageFactor: k } = lot;
  const at = `at ${formatNumber(lot.referenceTemperatureC)} °C`;
  const certified =
    value === null
      ? `value of its basis, ${lot.basis}`
      : `${formatConductivity({ conductivityUsCm: value, expandedUncertaintyUsCm: U }).text} ${at}${k === null ? '' : `, k = ${formatNumber(k)}`}`;
  const inHouse = lot.isInHouse ? ' In-house lot.' : '';
  return `${lot.product}, ${lot.producer}: ${certified}; use by ${formatDate(lot.expiresOn)}, ${lot.state}.${inHouse}`;
}

export function certificateWords({ certificate, traceability }: RecordLot | RecordInstrument): string {
  const file = certificate
    ? ` File ${certificate.fileName} held, SHA-256 ${certificate.sha256.slice(0, 16)}, unchanged since received.`
    : ' No certificate file is held.';
  return `${traceability}${file}`;
}

export function thermometerWords(one: RecordInstrument): string {
  const U = formatNumber(one.expandedUncertaintyC, { significantDigits: 2, unit: '°C' });
  const correction = formatSigned(one.correctionC, 2, '°C');
  return `${one.name}, serial ${one.serial}: U = ${U} (k = ${formatNumber(one.coverageFactor)}), correction ${correction}, certificate ${one.certificateNumber}, due ${formatDate(one.dueOn)}.`;
}
