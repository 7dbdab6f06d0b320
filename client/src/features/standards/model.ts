import type { Standard } from '../../../../shared/contracts/standards.ts';
import type { StandardBasis } from '../../../../shared/contracts/vocabulary.ts';
import { formatDate } from '../../../../shared/format/dates.ts';
import { capitalise } from '../../../../shared/format/labels.ts';
import { countInWords, formatConductivity, formatNumber } from '../../../../shared/format/numbers.ts';

const BASIS_UNITS: Readonly<Record<Exclude<StandardBasis, 'other'>, string>> = {
  molal: 'mol/kg (molal)',
  demal: 'D (demal)',
  molar: 'mol/L at 25 °C (molar)',
};

/** The solution by its basis and value: "0.01" alone means three solutions that differ by 0.3 %. */
export function solutionName(lot: Pick<Standard, 'basis' | 'nominal' | 'product'>): string {
  if (lot.basis === 'other' || lot.nominal === null) return lot.product;
  return `KCl ${lot.nominal} ${BASIS_UNITS[lot.basis]}`;
}

type Certified = Pick<
  Standard,
  'certifiedConductivityUsCm' | 'expandedUncertaintyUsCm' | 'coverageFactor' | 'referenceTemperatureC'
>;

/** The certified value with its U; null where the lot states none and the table of its basis is used. */
export function certifiedQuantity(lot: Certified) {
  if (lot.certifiedConductivityUsCm === null) return null;
  return formatConductivity({
    conductivityUsCm: lot.certifiedConductivityUsCm,
    expandedUncertaintyUsCm: lot.expandedUncertaintyUsCm,
    // One unit down the column: two lots of different strength must not look alike.
    unit: 'µS/cm',
  });
}

/** `at 25 °C, k = 2` */
export function certifiedNote(lot: Certified): string {
  const at = `at ${formatNumber(lot.referenceTemperatureC, { unit: '°C' })}`;
  return lot.coverageFactor === null ? at : `${at}, k = ${formatNumber(lot.coverageFactor)}`;
}

export interface LotState {
  word: string;
  /** Why, or until when. */
  note: string;
  tone: 'plain' | 'care' | 'stop';
}

/** Whether a lot may be used, in words; recall outweighs quarantine, quarantine outweighs its last day. */
export function lotState(lot: Pick<Standard, 'state' | 'stateReason' | 'isExpired' | 'expiresOn'>): LotState {
  const reason = lot.stateReason ?? 'no reason given';
  if (lot.state === 'recalled') return { word: 'recalled', note: reason, tone: 'stop' };
  if (lot.state === 'quarantined') return { word: 'in quarantine', note: reason, tone: 'care' };
  const day = formatDate(lot.expiresOn);
  if (lot.isExpired) return { word: 'past its last day', note: `it was ${day}`, tone: 'care' };
  return { word: 'released for use', note: `up to and including ${day}`, tone: 'plain' };
}

/** Lots that may be used first, then the rest; within both the newest code first. */
export function inUseFirst(lots: readonly Standard[]): Standard[] {
  return [...lots].sort(
    (a, b) =>
      Number(b.isUsable) - Number(a.isUsable) || b.code.localeCompare(a.code, 'en', { numeric: true }),
  );
}

/** The situation of the lots in a sentence, with what keeps the others from use. */
export function lotsSentence(lots: readonly Standard[]): { all: string; exception: string } {
  const usable = lots.filter((lot) => lot.isUsable).length;
  const all =
    usable === 0
      ? 'No lot may be used today.'
      : `${capitalise(usable === 1 ? 'one lot' : `${countInWords(usable)} lots`)} may be used today.`;
  const counts: [number, string][] = [
    [lots.filter((lot) => lot.state === 'recalled').length, 'recalled'],
    [lots.filter((lot) => lot.state === 'quarantined').length, 'in quarantine'],
  ];
  const parts = counts
    .filter(([count]) => count > 0)
    .map(([count, word]) => `${countInWords(count)} ${count === 1 ? 'is' : 'are'} ${word}`);
  return { all, exception: parts.length > 0 ? `${capitalise(parts.join(', '))}.` : '' };
}
