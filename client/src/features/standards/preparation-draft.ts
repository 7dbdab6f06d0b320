import type { DilutedPreparation, WeighedPreparation } from '../../../../shared/contracts/preparations.ts';
import type { Issues } from '../../lib/use-submission.ts';

/** Readings while they are typed; a number is null while its field is empty. */
export interface WeighingDraft {
  kclReadingG: number | null;
  waterReadingG: number | null;
  airDensityKgM3: number | null;
  purityPercent: number | null;
  dryingLossPercent: number | null;
  waterBlankUsCm: number | null;
  saltBalanceId: string;
  waterBalanceId: string;
}

/** Sea level at 20 °C; a salt that was dried. */
export const EMPTY_WEIGHING: WeighingDraft = {
  kclReadingG: null,
  waterReadingG: null,
  airDensityKgM3: 1.2,
  purityPercent: 99.9,
  dryingLossPercent: 0,
  waterBlankUsCm: null,
  saltBalanceId: '',
  waterBalanceId: '',
};

export interface DilutionDraft {
  standardId: string;
  stockReadingG: number | null;
  waterReadingG: number | null;
  airDensityKgM3: number | null;
  waterBlankUsCm: number | null;
  isBlankInSameState: boolean;
  balanceId: string;
}

export const EMPTY_DILUTION: DilutionDraft = {
  standardId: '',
  stockReadingG: null,
  waterReadingG: null,
  airDensityKgM3: 1.2,
  waterBlankUsCm: null,
  isBlankInSameState: true,
  balanceId: '',
};

export interface LotDraftOfPreparation {
  code: string;
  expiresOn: string;
  openedLifeDays: number | null;
  storage: string;
}

export const EMPTY_MADE_LOT: LotDraftOfPreparation = {
  code: '',
  expiresOn: '',
  openedLifeDays: 30,
  storage: '',
};

const isNumber = (value: number | null): value is number => value !== null && !Number.isNaN(value);
const idOf = (text: string): number | null => (text === '' ? null : Number(text));

/** What the preview asks for, or null while a reading is missing. */
export function weighingOf(draft: WeighingDraft): WeighedPreparation | null {
  const { kclReadingG, waterReadingG, airDensityKgM3, purityPercent, dryingLossPercent, waterBlankUsCm } =
    draft;
  if (
    !isNumber(kclReadingG) ||
    !isNumber(waterReadingG) ||
    !isNumber(airDensityKgM3) ||
    !isNumber(purityPercent) ||
    !isNumber(dryingLossPercent) ||
    !isNumber(waterBlankUsCm)
  )
    return null;
  return {
    kclReadingG,
    waterReadingG,
    airDensityKgM3,
    purityPercent,
    dryingLossPercent,
    waterBlankUsCm,
    waterBlankStandardUncertaintyUsCm: null,
    saltBalanceId: idOf(draft.saltBalanceId),
    waterBalanceId: idOf(draft.waterBalanceId),
  };
}

export function dilutionOf(draft: DilutionDraft): DilutedPreparation | null {
  const { stockReadingG, waterReadingG, airDensityKgM3, waterBlankUsCm } = draft;
  const standardId = idOf(draft.standardId);
  if (
    standardId === null ||
    !isNumber(stockReadingG) ||
    !isNumber(waterReadingG) ||
    !isNumber(airDensityKgM3) ||
    !isNumber(waterBlankUsCm)
  )
    return null;
  return {
    standardId,
    stockReadingG,
    waterReadingG,
    airDensityKgM3,
    waterBlankUsCm,
    waterBlankStandardUncertaintyUsCm: null,
    isBlankInSameState: draft.isBlankInSameState,
    balanceId: idOf(draft.balanceId),
  };
}

export function madeLotIssues(lot: LotDraftOfPreparation, isComplete: boolean): Issues {
  return {
    code: lot.code.trim() ? undefined : 'Write the code for the labels.',
    expiresOn: lot.expiresOn ? undefined : 'Write the last day on which it may be used.',
    ...(isComplete
      ? {}
      : { readings: 'Fill in every reading first; the value and its U appear beside them.' }),
  };
}
