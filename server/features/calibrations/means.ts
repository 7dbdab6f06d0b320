/** Lots, bottle and thermometer a run is started with, each refused when it could not be answered for later. */
import type { StartCalibration } from '../../../shared/contracts/calibrations.ts';
import { Bottle, Instrument, Standard } from '../../db/models/index.ts';
import { AppError } from '../../errors.ts';
import { readableSites, type Actor } from '../../http/actor.ts';
import { refusingByScience } from '../calculations/service.ts';
import { lotReferenceConductivity } from '../../../shared/science/certified-lots.ts';
import { lotOf } from './lot.ts';

export interface Means {
  standard: Standard;
  bottle: Bottle | null;
  second: Standard | null;
  thermometer: Instrument | null;
  referenceUsCm: number;
  secondReferenceUsCm: number | null;
  /** Lots that only an override lets through, in words. */
  unusable: string[];
}

export async function gatherMeans(actor: Actor, input: StartCalibration, today: string): Promise<Means> {
  const standard = await findLot(input.standardId);
  const second = input.secondStandardId === null ? null : await findLot(input.secondStandardId);
  if (second?.id === standard.id)
    throw new AppError('request.invalid', {
      issues: [{ path: 'secondStandardId', message: 'The second point needs a lot of its own.' }],
    });
  const lots = second ? [standard, second] : [standard];
  return {
    standard,
    second,
    bottle: input.bottleId === null ? null : await findBottle(actor, input.bottleId, standard, today),
    thermometer: input.thermometerId === null ? null : await findThermometer(input.thermometerId, today),
    referenceUsCm: valueOf(standard),
    secondReferenceUsCm: second && valueOf(second),
    unusable: lots.flatMap((lot) => whyUnusable(lot, today)),
  };
}

async function findLot(id: number): Promise<Standard> {
  const lot = await Standard.findByPk(id);
  if (!lot) throw new AppError('standards.not-found');
  return lot;
}

const valueOf = (lot: Standard): number =>
  refusingByScience(
    () =>
      lotReferenceConductivity({ lot: lotOf(lot), temperatureC: lot.referenceTemperatureC }).conductivityUsCm,
  );

function whyUnusable(lot: Standard, today: string): string[] {
  if (lot.state !== 'released') return [`Lot ${lot.code} is ${lot.state}.`];
  return lot.expiresOn < today ? [`Lot ${lot.code} expired on ${lot.expiresOn}.`] : [];
}

async function findBottle(actor: Actor, id: number, lot: Standard, today: string): Promise<Bottle> {
  const bottle = await Bottle.findByPk(id);
  const readable = readableSites(actor);
  const isReadable = bottle && (bottle.siteId === null || !readable || readable.includes(bottle.siteId));
  if (!bottle || !isReadable) throw new AppError('bottles.not-found');
  if (bottle.standardId !== lot.id)
    throw new AppError('request.invalid', {
      issues: [{ path: 'bottleId', message: `Bottle ${bottle.code} does not belong to lot ${lot.code}.` }],
    });
  if (bottle.discardedAt !== null || bottle.remainingMl <= 0 || (bottle.useByOn ?? today) < today)
    throw new AppError('bottles.unusable');
  return bottle;
}

async function findThermometer(id: number, today: string): Promise<Instrument> {
  const instrument = await Instrument.findByPk(id);
  if (!instrument) throw new AppError('instruments.not-found');
  if (instrument.kind !== 'thermometer' || instrument.uncertaintyUnit !== 'C')
    throw new AppError('request.invalid', {
      issues: [{ path: 'thermometerId', message: `${instrument.code} is not a thermometer.` }],
    });
  if (instrument.state !== 'in-use' || instrument.dueOn < today)
    throw new AppError('instruments.overdue', {
      detail: `${instrument.code} was due on ${instrument.dueOn}.`,
    });
  return instrument;
}
