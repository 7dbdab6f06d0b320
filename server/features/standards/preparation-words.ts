/** Pure: what a preparation amounts to, in the columns and the words of a lot. */
import {
  inHouseWords,
  type DilutedPreparation,
  type Preparation,
  type WeighedPreparation,
} from '../../../shared/contracts/preparations.ts';
import { formatDate } from '../../../shared/format/dates.ts';
import { capitalise } from '../../../shared/format/labels.ts';
import { formatNumber } from '../../../shared/format/numbers.ts';
import { lotReferenceConductivity } from '../../../shared/science/certified-lots.ts';
import type { KclNominal } from '../../../shared/science/kcl-standards.ts';
import { citation } from '../../../shared/science/references.ts';
import type { BudgetRow } from '../../../shared/science/uncertainty.ts';

/** So near to a standard its temperature shape holds; the same bound as kclConductivityByMolality uses for the value. */
const nearStandard = 0.05;
const nominals: readonly KclNominal[] = [0.01, 0.1, 1];
/** Where a bench comparison is made. */
const tableTemperaturesC = [10, 15, 18, 20, 22, 24, 25, 26, 28, 30, 35];
/** Carbon dioxide of the air, 1.1 µS/cm at most, is then 2 % and more [Pratt et al. 2001]. */
const openBeakerFromUsCm = 50;

type Basis = { basis: 'molal'; nominal: KclNominal } | { basis: 'other'; nominal: null };

export function basisOfMolality(molalityMolKg: number): Basis {
  const nominal = nominals.find((one) => Math.abs(molalityMolKg / one - 1) <= nearStandard);
  return nominal === undefined ? { basis: 'other', nominal: null } : { basis: 'molal', nominal };
}

/** Values by temperature of a weighed solution, as every comparison with the stored lot will take them. */
export function temperatureTableOf(made: {
  molalityMolKg: number;
  conductivityUsCm: number;
  expandedUncertainty: number;
  coverageFactor: number;
}): Preparation['temperatureTable'] {
  const lot = {
    medium: 'kcl-aqueous' as const,
    ...basisOfMolality(made.molalityMolKg),
    certifiedConductivityUsCm: made.conductivityUsCm,
    referenceTemperatureC: 25,
    expandedUncertaintyUsCm: made.expandedUncertainty,
    coverageFactor: made.coverageFactor,
    temperatureTable: null,
  };
  return tableTemperaturesC.map((temperatureC) => ({
    temperatureC,
    conductivityUsCm: lotReferenceConductivity({ lot, temperatureC }).conductivityUsCm,
  }));
}

export const budgetLines = (rows: readonly BudgetRow[]): Preparation['budget'] =>
  rows.map((row) => ({
    name: row.name,
    distribution: row.distribution,
    contributionUsCm: row.contribution,
    sharePercent: 100 * row.share,
  }));

const compareFirst =
  'Compare it with an independent lot before it is released: a slip of the pen shows in no budget.';

export function weighingRemarks(given: WeighedPreparation, molalityMolKg: number): string[] {
  const { basis, nominal } = basisOfMolality(molalityMolKg);
  const shape =
    basis === 'molal'
      ? `Within 5 % of ${nominal} mol/kg: it follows the temperature table of that standard.`
      : 'Not near 0.01, 0.1 or 1 mol/kg: its temperature shape lies between those of the standards.';
  return [
    shape,
    ...(given.saltBalanceId === null
      ? ['No balance from the list weighed the salt: u of 0.2 mg is assumed.']
      : []),
    ...(given.waterBalanceId === null
      ? ['No balance from the list weighed the water: u of 20 mg is assumed.']
      : []),
    ...(given.waterBlankUsCm === 0 ? ['No water reads zero: measure the blank.'] : []),
    compareFirst,
  ];
}

export function dilutionRemarks(given: DilutedPreparation, conductivityUsCm: number): string[] {
  return [
    ...(given.isBlankInSameState
      ? []
      : ['Blank and solution may hold different carbon dioxide: up to 1.1 µS/cm is in doubt, and in U.']),
    ...(conductivityUsCm < openBeakerFromUsCm
      ? ['Below 50 µS/cm an open beaker measures carbon dioxide too: use it closed and at once.']
      : []),
    ...(given.balanceId === null
      ? ['No balance from the list weighed them: u of 10 mg is assumed for both readings.']
      : []),
    compareFirst,
  ];
}

export function productOf(made: Preparation): string {
  const strength = formatNumber(made.molalityMolKg, { significantDigits: 4, unit: 'mol/kg' });
  const how = made.method === 'weighed' ? 'by weighing' : `from ${made.source?.code ?? 'a lot'}`;
  return `Potassium chloride ${strength}, ${how}`;
}

export function traceabilityOf(facts: {
  made: Preparation;
  salt: string | null;
  balances: readonly { code: string; certificateNumber: string }[];
  issuedOn: string;
}): string {
  const { made, salt, balances, issuedOn } = facts;
  const how =
    made.method === 'weighed'
      ? `Salt: ${salt}. Value by the molality and the KCl tables: ${citation('pratt-2001')}`
      : `Diluted from lot ${made.source?.code}, by mass. Value by its molality: ${citation('pratt-2001')}`;
  const weighed = balances.map((one) => `${one.code}, certificate ${one.certificateNumber}`).join('; ');
  return [
    `${capitalise(inHouseWords)}.`,
    `Made by ${made.preparedBy} on ${formatDate(issuedOn)}, weighed in air.`,
    how,
    weighed ? `Weighed on ${weighed}.` : 'No balance with a certificate was named.',
  ].join(' ');
}
