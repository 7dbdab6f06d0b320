import type { Instrument, UncertaintyUnit } from '../../../../shared/contracts/instruments.ts';
import type { InstrumentKind } from '../../../../shared/contracts/vocabulary.ts';
import { formatDate } from '../../../../shared/format/dates.ts';
import { capitalise } from '../../../../shared/format/labels.ts';
import { countInWords, formatNumber } from '../../../../shared/format/numbers.ts';
import { UNCERTAINTY_UNIT_LABELS } from '../../../../shared/format/reference-labels.ts';
import type { Issues } from '../../lib/use-submission.ts';

/** The unit a certificate of that kind usually states U in. */
export const USUAL_UNIT: Readonly<Record<InstrumentKind, UncertaintyUnit>> = {
  meter: 'percent',
  thermometer: 'C',
  cell: 'percent',
  'resistor-set': 'ohm',
  balance: 'g',
};

/** `± 0.05 °C, k = 2` */
export const uncertaintyWords = (one: Instrument): string =>
  `± ${formatNumber(one.expandedUncertainty, { unit: UNCERTAINTY_UNIT_LABELS[one.uncertaintyUnit] })}, k = ${formatNumber(one.coverageFactor)}`;

export interface InstrumentState {
  word: string;
  note: string;
  tone: 'plain' | 'care';
}

export function instrumentState(one: Instrument): InstrumentState {
  const due = formatDate(one.dueOn);
  if (one.state === 'out-of-use') return { word: 'out of use', note: `was due ${due}`, tone: 'care' };
  if (!one.isUsable) return { word: 'past its due date', note: `it was ${due}`, tone: 'care' };
  return { word: 'in use', note: `due ${due}`, tone: 'plain' };
}

export function instrumentsSentence(all: readonly Instrument[]): { all: string; exception: string } {
  const usable = all.filter((one) => one.isUsable).length;
  const late = all.filter((one) => one.state === 'in-use' && !one.isUsable);
  return {
    all: `${capitalise(countInWords(usable))} of ${countInWords(all.length)} may be used today.`,
    exception:
      late.length === 0
        ? ''
        : `${late.map((one) => one.code).join(', ')} ${late.length === 1 ? 'is' : 'are'} past the due date.`,
  };
}

/** An instrument while its certificate is being copied; a number is null while its field is empty. */
export interface InstrumentDraft {
  kind: InstrumentKind;
  name: string;
  serial: string;
  certificateNumber: string;
  issuedOn: string;
  dueOn: string;
  expandedUncertainty: number | null;
  uncertaintyUnit: UncertaintyUnit;
  coverageFactor: number | null;
  correction: number | null;
  traceability: string;
}

export const EMPTY_INSTRUMENT: InstrumentDraft = {
  kind: 'thermometer',
  name: '',
  serial: '',
  certificateNumber: '',
  issuedOn: '',
  dueOn: '',
  expandedUncertainty: null,
  uncertaintyUnit: 'C',
  coverageFactor: 2,
  correction: 0,
  traceability: '',
};

export const draftOf = (one: Instrument): InstrumentDraft => ({
  kind: one.kind,
  name: one.name,
  serial: one.serial,
  certificateNumber: one.certificateNumber,
  issuedOn: one.issuedOn,
  dueOn: one.dueOn,
  expandedUncertainty: one.expandedUncertainty,
  uncertaintyUnit: one.uncertaintyUnit,
  coverageFactor: one.coverageFactor,
  correction: one.correction,
  traceability: one.traceability,
});

/** What is plainly missing, said before the server is asked. */
export function instrumentIssues(draft: InstrumentDraft): Issues {
  const texts = [
    ['name', 'Write what it is, as people call it.'],
    ['serial', 'Write the serial number from the instrument.'],
    ['certificateNumber', 'Write the number of its certificate.'],
    ['issuedOn', 'Write the date of the certificate.'],
    ['dueOn', 'Write when it is due again.'],
  ] as const;
  const numbers = [
    ['expandedUncertainty', 'Write U as the certificate states it.'],
    ['coverageFactor', 'Write k as the certificate states it, often 2.'],
    ['correction', 'Write what is added to its indication; 0 when nothing is.'],
  ] as const;
  const issues: Record<string, string> = {};
  for (const [key, says] of texts) if (!draft[key].trim()) issues[key] = says;
  for (const [key, says] of numbers) if (draft[key] === null || Number.isNaN(draft[key])) issues[key] = says;
  return issues;
}

export const contentOf = (draft: InstrumentDraft) => ({
  ...draft,
  expandedUncertainty: draft.expandedUncertainty ?? Number.NaN,
  coverageFactor: draft.coverageFactor ?? Number.NaN,
  correction: draft.correction ?? Number.NaN,
});
