import type { CreateStandard } from '../../../../shared/contracts/standards.ts';
import type { StandardBasis, StandardMedium } from '../../../../shared/contracts/vocabulary.ts';
import { parseDecimal } from '../../../../shared/format/numbers.ts';
import type { Issues } from '../../lib/use-submission.ts';

/** A certificate while it is being copied; a number is null while its field is empty. */
export interface LotDraft {
  code: string;
  producer: string;
  product: string;
  medium: StandardMedium;
  basis: StandardBasis;
  nominal: string;
  certifiedConductivityUsCm: number | null;
  expandedUncertaintyUsCm: number | null;
  coverageFactor: number | null;
  coverageProbabilityPercent: number | null;
  referenceTemperatureC: number | null;
  /** One row a line: temperature, then conductivity, as pasted from the certificate. */
  temperatureTable: string;
  traceability: string;
  isInHouse: boolean;
  issuedOn: string;
  expiresOn: string;
  openedLifeDays: number | null;
  storage: string;
}

export const EMPTY_LOT: LotDraft = {
  code: '',
  producer: '',
  product: '',
  medium: 'kcl-aqueous',
  basis: 'molal',
  nominal: '0.01',
  certifiedConductivityUsCm: null,
  expandedUncertaintyUsCm: null,
  coverageFactor: 2,
  coverageProbabilityPercent: null,
  referenceTemperatureC: 25,
  temperatureTable: '',
  traceability: '',
  isInHouse: false,
  issuedOn: '',
  expiresOn: '',
  openedLifeDays: null,
  storage: '',
};

export type TemperatureRow = NonNullable<CreateStandard['temperatureTable']>[number];

/** The rows of a pasted table, or what is wrong with the first line that cannot be read. */
export function readTemperatureTable(text: string): { rows: TemperatureRow[]; fault: string | null } {
  const rows: TemperatureRow[] = [];
  for (const [i, line] of text.split('\n').entries()) {
    if (line.trim() === '') continue;
    const [temperatureC, conductivityUsCm, ...more] = line
      .trim()
      .split(/[\t; ]+/)
      .map(parseDecimal);
    if (temperatureC == null || conductivityUsCm == null || more.length > 0) {
      return {
        rows,
        fault: `Line ${i + 1} needs two numbers, temperature in °C and conductivity in µS/cm: “${line.trim().slice(0, 40)}”.`,
      };
    }
    rows.push({ temperatureC, conductivityUsCm });
  }
  return { rows, fault: null };
}

/** What is plainly missing, said before the server is asked. */
export function lotIssues(draft: LotDraft): Issues {
  const texts: [keyof LotDraft, string][] = [
    ['code', 'Write the code from the bottle.'],
    ['producer', 'Write who made it.'],
    ['product', 'Write the name on the label.'],
    ['traceability', 'Write what the certificate says about traceability.'],
    ['issuedOn', 'Write the date of the certificate.'],
    ['expiresOn', 'Write the last day on which it may be used.'],
  ];
  const issues: Record<string, string> = {};
  for (const [key, says] of texts) if (!String(draft[key]).trim()) issues[key] = says;
  const numbers = [
    'certifiedConductivityUsCm',
    'expandedUncertaintyUsCm',
    'coverageFactor',
    'coverageProbabilityPercent',
    'openedLifeDays',
  ] as const;
  for (const key of numbers) if (Number.isNaN(draft[key])) issues[key] = 'Write a number, or leave it empty.';
  const reference = draft.referenceTemperatureC;
  if (reference === null || Number.isNaN(reference))
    issues['referenceTemperatureC'] = 'Write the temperature of the certified value, often 25.';
  const { fault } = readTemperatureTable(draft.temperatureTable);
  if (fault) issues['temperatureTable'] = fault;
  return issues;
}

/** The draft as the contract takes it. */
export function contentOfLot(draft: LotDraft): CreateStandard {
  const { rows } = readTemperatureTable(draft.temperatureTable);
  const isByBasis = draft.basis !== 'other';
  const hasValue = draft.certifiedConductivityUsCm !== null;
  return {
    ...draft,
    nominal: isByBasis && draft.nominal ? (Number(draft.nominal) as 0.01 | 0.1 | 1) : null,
    coverageFactor: hasValue || draft.expandedUncertaintyUsCm !== null ? draft.coverageFactor : null,
    referenceTemperatureC: draft.referenceTemperatureC ?? Number.NaN,
    temperatureTable: rows.length > 0 ? rows : null,
  };
}
