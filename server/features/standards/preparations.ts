/**
 * Lots made in house. The value and its budget come from the readings alone, the same for the preview and for what is
 * stored; such a lot is never called certified, and it is quarantined until somebody has compared it.
 */
import {
  inHouseWords,
  type CreateDilutedStandard,
  type CreatePreparedStandard,
  type DilutedPreparation,
  type Preparation,
  type WeighedPreparation,
} from '../../../shared/contracts/preparations.ts';
import { lotReferenceConductivity } from '../../../shared/science/certified-lots.ts';
import { diluteLot } from '../../../shared/science/kcl-dilution.ts';
import { prepareKcl } from '../../../shared/science/kcl-preparation.ts';
import { Standard, type Instrument } from '../../db/models/index.ts';
import { inTransaction } from '../../db/transaction.ts';
import { refusingByConstraint } from '../../db/violations.ts';
import { AppError } from '../../errors.ts';
import type { Actor } from '../../http/actor.ts';
import type { Parts } from '../../parts.ts';
import { recordAuditEvent } from '../audit-events/service.ts';
import { refusingByScience } from '../calculations/service.ts';
import { requireUsableInstrument } from '../instruments/service.ts';
import { readSetting } from '../settings/service.ts';
import {
  basisOfMolality,
  budgetLines,
  dilutionRemarks,
  productOf,
  temperatureTableOf,
  traceabilityOf,
  weighingRemarks,
} from './preparation-words.ts';
import type { StandardRow } from './queries.ts';
import { authoriseSomewhere, lotCodeTaken, readStandard } from './service.ts';

type Balance = Pick<
  Instrument,
  'id' | 'code' | 'certificateNumber' | 'expandedUncertainty' | 'coverageFactor'
>;

async function balanceOf(parts: Parts, id: number | null): Promise<Balance | null> {
  if (id === null) return null;
  const balance = await requireUsableInstrument(parts, id, 'balance');
  if (balance.uncertaintyUnit === 'g') return balance;
  throw new AppError('request.invalid', {
    issues: [{ path: 'balanceId', message: 'The U of this balance is not stated in grams.' }],
  });
}

const standardUncertaintyG = (balance: Balance | null): number | undefined =>
  balance === null ? undefined : balance.expandedUncertainty / balance.coverageFactor;

/** Leaves out what is not known, so that the science uses its bench values. */
function known<T extends object>(values: T): { [K in keyof T]: Exclude<T[K], null | undefined> } {
  return Object.fromEntries(Object.entries(values).filter(([, value]) => value != null)) as never;
}

const namesOf = (balances: readonly (Balance | null)[]): Balance[] => [
  ...new Map(
    balances.filter((one): one is Balance => one !== null).map((one) => [one.id, one] as const),
  ).values(),
];

interface Worked {
  preparation: Preparation;
  balances: Balance[];
}

async function workWeighing(parts: Parts, given: WeighedPreparation): Promise<Worked> {
  const salt = await balanceOf(parts, given.saltBalanceId);
  const water = await balanceOf(parts, given.waterBalanceId);
  return refusingByScience(() => {
    const made = prepareKcl({
      kclReadingG: given.kclReadingG,
      waterReadingG: given.waterReadingG,
      airDensityKgM3: given.airDensityKgM3,
      purity: given.purityPercent / 100,
      dryingLossFraction: given.dryingLossPercent / 100,
      waterBlankUsCm: given.waterBlankUsCm,
      ...known({
        kclReadingStandardUncertaintyG: standardUncertaintyG(salt),
        waterReadingStandardUncertaintyG: standardUncertaintyG(water),
        waterBlankStandardUncertaintyUsCm: given.waterBlankStandardUncertaintyUsCm,
      }),
    });
    const { molalityMolKg, molarityMolL, conductivityUsCm, saltConductivityUsCm, coverageFactor } = made;
    const preparation: Preparation = {
      method: 'weighed',
      words: inHouseWords,
      molalityMolKg,
      molarityMolL,
      dilutionFactor: null,
      conductivityUsCm,
      saltConductivityUsCm,
      waterBlankUsCm: given.waterBlankUsCm,
      expandedUncertaintyUsCm: made.expandedUncertainty,
      coverageFactor,
      budget: budgetLines(made.budget),
      temperatureTable: temperatureTableOf(made),
      remarks: weighingRemarks(given, molalityMolKg),
      source: null,
      preparedBy: null,
      given,
    };
    return { preparation, balances: namesOf([salt, water]) };
  });
}

/** The water in a lot is known only where its own preparation says so. */
function stockBlankOf(stock: StandardRow): number | null {
  return stock.preparation?.waterBlankUsCm ?? null;
}

async function requireStock(parts: Parts, actor: Actor, standardId: number): Promise<StandardRow> {
  const stock = await readStandard(parts, actor, standardId);
  const today = parts.clock.now().toISOString().slice(0, 10);
  const isUsable = stock.state === 'released' && stock.expiresOn >= today;
  if (!isUsable || stock.medium !== 'kcl-aqueous') throw new AppError('standards.not-dilutable');
  return stock;
}

async function workDilution(parts: Parts, actor: Actor, given: DilutedPreparation): Promise<Worked> {
  const stock = await requireStock(parts, actor, given.standardId);
  const balance = await balanceOf(parts, given.balanceId);
  return refusingByScience(() => {
    const at25 = lotReferenceConductivity({ lot: stock, temperatureC: 25 });
    const readingU = standardUncertaintyG(balance);
    const made = diluteLot({
      stockConductivityUsCm: at25.conductivityUsCm,
      stockStandardUncertaintyUsCm: at25.standardUncertaintyUsCm,
      stockReadingG: given.stockReadingG,
      waterReadingG: given.waterReadingG,
      airDensityKgM3: given.airDensityKgM3,
      waterBlankUsCm: given.waterBlankUsCm,
      isBlankInSameState: given.isBlankInSameState,
      ...known({
        stockBlankUsCm: stockBlankOf(stock),
        stockReadingStandardUncertaintyG: readingU,
        waterReadingStandardUncertaintyG: readingU,
        waterBlankStandardUncertaintyUsCm: given.waterBlankStandardUncertaintyUsCm,
      }),
    });
    const { molalityMolKg, molarityMolL, dilutionFactor, conductivityUsCm, saltConductivityUsCm } = made;
    const preparation: Preparation = {
      method: 'diluted',
      words: inHouseWords,
      molalityMolKg,
      molarityMolL,
      dilutionFactor,
      conductivityUsCm,
      saltConductivityUsCm,
      waterBlankUsCm: given.waterBlankUsCm,
      expandedUncertaintyUsCm: made.expandedUncertainty,
      coverageFactor: made.coverageFactor,
      budget: budgetLines(made.budget),
      temperatureTable: made.temperatureTable,
      remarks: dilutionRemarks(given, conductivityUsCm),
      source: { standardId: stock.id, code: stock.code },
      preparedBy: null,
      given,
    };
    return { preparation, balances: namesOf([balance]) };
  });
}

export async function previewWeighing(
  parts: Parts,
  actor: Actor,
  given: WeighedPreparation,
): Promise<Preparation> {
  authoriseSomewhere(actor, 'prepare');
  return (await workWeighing(parts, given)).preparation;
}

export async function previewDilution(
  parts: Parts,
  actor: Actor,
  given: DilutedPreparation,
): Promise<Preparation> {
  authoriseSomewhere(actor, 'prepare');
  return (await workDilution(parts, actor, given)).preparation;
}

interface NewLot {
  code: string;
  expiresOn: string;
  openedLifeDays: number | null;
  storage: string;
}

const onArrival = {
  state: 'quarantined',
  stateReason: 'Made in house, not released yet: compare it with an independent lot first.',
} as const;

function refuseExpiry(issuedOn: string, expiresOn: string): void {
  if (expiresOn > issuedOn) return;
  throw new AppError('request.invalid', {
    issues: [{ path: 'expiresOn', message: 'A lot made today must expire after today.' }],
  });
}

async function storeLot(
  parts: Parts,
  actor: Actor,
  lot: NewLot,
  { preparation, balances }: Worked,
  salt: string | null,
): Promise<StandardRow> {
  const now = parts.clock.now();
  const issuedOn = now.toISOString().slice(0, 10);
  refuseExpiry(issuedOn, lot.expiresOn);
  const made: Preparation = { ...preparation, preparedBy: actor.name };
  const isTabled = made.method === 'diluted';
  const facts = {
    ...lot,
    producer: (await readSetting('organisation')).name,
    product: productOf(made),
    medium: 'kcl-aqueous' as const,
    ...(isTabled ? ({ basis: 'other', nominal: null } as const) : basisOfMolality(made.molalityMolKg)),
    certifiedConductivityUsCm: made.conductivityUsCm,
    referenceTemperatureC: 25,
    expandedUncertaintyUsCm: made.expandedUncertaintyUsCm,
    coverageFactor: made.coverageFactor,
    coverageProbabilityPercent: 95,
    temperatureTable: isTabled ? made.temperatureTable : null,
    traceability: traceabilityOf({ made, salt, balances, issuedOn }),
    isInHouse: true,
    issuedOn,
  };
  const id = await refusingByConstraint(lotCodeTaken, () =>
    inTransaction(parts.sequelize, async (transaction) => {
      const row = await Standard.create(
        { ...facts, ...onArrival, stateChangedAt: now, preparation: made },
        { transaction },
      );
      await recordAuditEvent(parts, transaction, actor, {
        action: `standards.${made.method === 'weighed' ? 'prepared' : 'diluted'}`,
        objectKind: 'standards',
        objectId: row.id,
        objectVersion: row.version,
        siteId: null,
        newValue: { ...facts, ...onArrival, preparation: made },
      });
      transaction.afterCommit(() =>
        parts.broadcast.changed({ slice: 'standards', id: row.id, kind: 'created' }, null),
      );
      return row.id;
    }),
  );
  return readStandard(parts, actor, id);
}

export async function createPreparedStandard(
  parts: Parts,
  actor: Actor,
  { weighing, salt, ...lot }: CreatePreparedStandard,
): Promise<StandardRow> {
  authoriseSomewhere(actor, 'prepare');
  return storeLot(parts, actor, lot, await workWeighing(parts, weighing), salt);
}

export async function createDilutedStandard(
  parts: Parts,
  actor: Actor,
  { dilution, ...lot }: CreateDilutedStandard,
): Promise<StandardRow> {
  authoriseSomewhere(actor, 'prepare');
  return storeLot(parts, actor, lot, await workDilution(parts, actor, dilution), null);
}
