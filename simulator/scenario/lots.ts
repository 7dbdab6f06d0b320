import { normalAt, seedFor } from '../random.ts';
import type { BottleSeed, LotSeed, SolutionClass } from './types.ts';

const DAY_MS = 86_400_000;

interface SolutionFacts {
  producer: string;
  product: string;
  basis: LotSeed['basis'];
  nominal: LotSeed['nominal'];
  certifiedUsCm: number;
  expandedUncertaintyPercent: number;
  openedLifeDays: number;
  shelfLifeDays: number;
  storage: string;
  volumeMl: number;
  table25: number[] | null;
}

const brinefold = 'Brinefold Reference Solutions';
const almery = 'Almery Standards Works';
const glass = 'Tightly closed, 15 to 25 °C, out of the light';
const sealed = 'Ampoule or full bottle, 15 to 25 °C; use at once after opening';

/** Temperatures of the table printed on a dilute lot's certificate. */
const tableTemperaturesC = [0, 5, 10, 15, 18, 20, 22, 25, 28, 30, 35];

/** Certified values at 25 °C: molal and demal KCl of the IUPAC 2001 and OIML R 56 tables; dilute lots by their certificate. */
const facts: Record<SolutionClass, SolutionFacts> = {
  'molal-0.01': {
    producer: brinefold,
    product: 'Potassium chloride 0.01 mol/kg',
    basis: 'molal',
    nominal: 0.01,
    certifiedUsCm: 1408.2,
    expandedUncertaintyPercent: 0.25,
    openedLifeDays: 60,
    shelfLifeDays: 540,
    storage: glass,
    volumeMl: 500,
    table25: null,
  },
  'molal-0.1': {
    producer: brinefold,
    product: 'Potassium chloride 0.1 mol/kg',
    basis: 'molal',
    nominal: 0.1,
    certifiedUsCm: 12_825,
    expandedUncertaintyPercent: 0.25,
    openedLifeDays: 90,
    shelfLifeDays: 720,
    storage: glass,
    volumeMl: 500,
    table25: null,
  },
  'molal-1': {
    producer: brinefold,
    product: 'Potassium chloride 1 mol/kg',
    basis: 'molal',
    nominal: 1,
    certifiedUsCm: 108_620,
    expandedUncertaintyPercent: 0.25,
    openedLifeDays: 90,
    shelfLifeDays: 720,
    storage: glass,
    volumeMl: 1000,
    table25: null,
  },
  'demal-0.1': {
    producer: almery,
    product: 'Potassium chloride 0.1 D',
    basis: 'demal',
    nominal: 0.1,
    certifiedUsCm: 12_852,
    expandedUncertaintyPercent: 0.3,
    openedLifeDays: 90,
    shelfLifeDays: 720,
    storage: glass,
    volumeMl: 1000,
    table25: null,
  },
  'dilute-84': {
    producer: almery,
    product: 'Dilute potassium chloride, 84 µS/cm',
    basis: 'other',
    nominal: null,
    certifiedUsCm: 84,
    expandedUncertaintyPercent: 0.8,
    openedLifeDays: 1,
    shelfLifeDays: 365,
    storage: sealed,
    volumeMl: 250,
    table25: [45.96, 53.03, 60.39, 68.02, 72.72, 75.9, 79.11, 84, 88.96, 92.3, 100.78],
  },
  'dilute-147': {
    producer: almery,
    product: 'Dilute potassium chloride, 147 µS/cm',
    basis: 'other',
    nominal: null,
    certifiedUsCm: 146.9,
    expandedUncertaintyPercent: 0.6,
    openedLifeDays: 7,
    shelfLifeDays: 365,
    storage: sealed,
    volumeMl: 250,
    table25: [80.41, 92.76, 105.63, 118.97, 127.18, 132.74, 138.37, 146.9, 155.55, 161.41, 176.22],
  },
};

/** One delivery, in days before the end of the history. `code` is the running number of its year of receipt. */
interface Delivery {
  solutionClass: SolutionClass;
  number: number;
  receivedDaysAgo: number;
  usedDaysAgo: [number, number] | null;
  /** Part per cent by which the liquid truly misses its certificate; drawn within U when left out. */
  deviationPercent?: number;
  expiresDaysAgo?: number;
  events?: { daysAgo: number; state: LotSeed['state']; reason: string; by: string }[];
}

const deliveries: Delivery[] = [
  { solutionClass: 'molal-0.01', number: 11, receivedDaysAgo: 775, usedDaysAgo: [770, 560] },
  { solutionClass: 'molal-0.01', number: 52, receivedDaysAgo: 580, usedDaysAgo: [560, 352] },
  {
    solutionClass: 'molal-0.01',
    number: 77,
    receivedDaysAgo: 370,
    usedDaysAgo: [352, 236],
    deviationPercent: -0.9,
    events: [
      {
        daysAgo: 58,
        state: 'recalled',
        reason: 'Producer’s notice: filled below concentration, certificate withdrawn',
        by: 'tomas',
      },
    ],
  },
  { solutionClass: 'molal-0.01', number: 18, receivedDaysAgo: 251, usedDaysAgo: [236, 102] },
  { solutionClass: 'molal-0.01', number: 31, receivedDaysAgo: 118, usedDaysAgo: [102, 0] },
  {
    solutionClass: 'molal-0.01',
    number: 40,
    receivedDaysAgo: 12,
    usedDaysAgo: null,
    events: [
      {
        daysAgo: 11,
        state: 'quarantined',
        reason: 'Arrived with a loose cap; awaiting the producer’s answer',
        by: 'tomas',
      },
    ],
  },
  { solutionClass: 'molal-0.1', number: 12, receivedDaysAgo: 775, usedDaysAgo: [770, 402] },
  { solutionClass: 'molal-0.1', number: 61, receivedDaysAgo: 430, usedDaysAgo: [402, 88] },
  { solutionClass: 'molal-0.1', number: 33, receivedDaysAgo: 96, usedDaysAgo: [88, 0] },
  { solutionClass: 'molal-1', number: 13, receivedDaysAgo: 775, usedDaysAgo: [770, 410] },
  { solutionClass: 'molal-1', number: 60, receivedDaysAgo: 434, usedDaysAgo: [410, 0] },
  { solutionClass: 'demal-0.1', number: 14, receivedDaysAgo: 774, usedDaysAgo: [770, 388] },
  { solutionClass: 'demal-0.1', number: 66, receivedDaysAgo: 401, usedDaysAgo: [388, 0] },
  { solutionClass: 'dilute-84', number: 15, receivedDaysAgo: 772, usedDaysAgo: [770, 455] },
  { solutionClass: 'dilute-84', number: 58, receivedDaysAgo: 462, usedDaysAgo: [455, 140] },
  { solutionClass: 'dilute-84', number: 29, receivedDaysAgo: 147, usedDaysAgo: [140, 0] },
  { solutionClass: 'dilute-147', number: 16, receivedDaysAgo: 772, usedDaysAgo: [770, 448] },
  { solutionClass: 'dilute-147', number: 59, receivedDaysAgo: 462, usedDaysAgo: [448, 131] },
  { solutionClass: 'dilute-147', number: 30, receivedDaysAgo: 147, usedDaysAgo: [131, 0] },
  { solutionClass: 'dilute-147', number: 9, receivedDaysAgo: 330, usedDaysAgo: null, expiresDaysAgo: 17 },
];

function lotCode(receivedAt: number, number: number): string {
  const year = String(new Date(receivedAt).getUTCFullYear()).slice(2);
  return `KC-${year}-${String(number).padStart(3, '0')}`;
}

/** Bottles opened one after the other while a lot was in use; the newest stays open, one more stands unopened. */
function bottlesOf(
  code: string,
  volumeMl: number,
  lifeDays: number,
  used: [number, number] | null,
  endAt: number,
): BottleSeed[] {
  const bottle = (index: number) => `${code}/${String(index).padStart(2, '0')}`;
  const unopened = (index: number): BottleSeed => ({
    code: bottle(index),
    openedAt: null,
    openedBy: null,
    volumeMl,
    remainingMl: volumeMl,
    discardedAt: null,
  });
  if (!used) return [unopened(1), unopened(2)];
  const [fromDaysAgo, untilDaysAgo] = used;
  // A bottle a month for stable solutions; the short-lived ones are opened for the job and poured away.
  const everyDays = Math.max(30, Math.min(lifeDays, 60));
  const count = Math.max(1, Math.ceil((fromDaysAgo - untilDaysAgo) / everyDays));
  const bottles = Array.from({ length: count }, (_, index): BottleSeed => {
    const openedAt = endAt - (fromDaysAgo - index * everyDays) * DAY_MS + 9 * 3_600_000;
    const inUse = untilDaysAgo === 0 && index === count - 1;
    return {
      code: bottle(index + 1),
      openedAt,
      openedBy: index % 3 === 2 ? 'pell' : 'ines',
      volumeMl,
      remainingMl: inUse ? Math.round(volumeMl * 0.52) : 0,
      discardedAt: inUse ? null : Math.min(openedAt + Math.min(everyDays, lifeDays) * DAY_MS, endAt),
    };
  });
  return untilDaysAgo === 0 ? [...bottles, unopened(count + 1)] : bottles;
}

function lotOf(delivery: Delivery, endAt: number): LotSeed {
  const { table25, volumeMl, shelfLifeDays, ...common } = facts[delivery.solutionClass];
  const receivedAt = endAt - delivery.receivedDaysAgo * DAY_MS;
  const issuedAt = receivedAt - 21 * DAY_MS;
  const code = lotCode(receivedAt, delivery.number);
  const events = (delivery.events ?? []).map(({ daysAgo, ...event }) => ({
    ...event,
    at: endAt - daysAgo * DAY_MS,
  }));
  const state = events.at(-1)?.state ?? 'released';
  const released = {
    at: receivedAt + DAY_MS,
    state: 'released' as const,
    reason: 'Certificate checked against the delivery',
    by: 'tomas',
  };
  const isStillUsed = delivery.usedDaysAgo?.[1] === 0;
  const drawn = (common.expandedUncertaintyPercent / 2) * normalAt(seedFor(0x107, code), 1);
  return {
    ...common,
    key: code.toLowerCase(),
    code,
    solutionClass: delivery.solutionClass,
    certificateNumber: `${String(7000 + delivery.number * 13 + delivery.receivedDaysAgo)}-${common.producer === brinefold ? 'B' : 'A'}`,
    medium: 'kcl-aqueous',
    referenceTemperatureC: 25,
    coverageFactor: 2,
    coverageProbability: 0.95,
    temperatureTable: table25
      ? tableTemperaturesC.map((temperatureC, index) => ({ temperatureC, conductivityUsCm: table25[index]! }))
      : null,
    traceability: `${common.producer}, values measured against primary potassium chloride solutions realising the SI through amount of substance and resistance.`,
    issuedAt,
    receivedAt,
    usedFrom: delivery.usedDaysAgo ? endAt - delivery.usedDaysAgo[0] * DAY_MS : null,
    usedUntil: delivery.usedDaysAgo && !isStillUsed ? endAt - delivery.usedDaysAgo[1] * DAY_MS : null,
    expiresAt:
      delivery.expiresDaysAgo === undefined
        ? issuedAt + shelfLifeDays * DAY_MS
        : endAt - delivery.expiresDaysAgo * DAY_MS,
    state,
    stateHistory: state === 'quarantined' ? events : [released, ...events],
    bottles: bottlesOf(code, volumeMl, common.openedLifeDays, delivery.usedDaysAgo, endAt),
    deviation: (delivery.deviationPercent ?? drawn) / 100,
  };
}

/** All lots the group has had in two years, with dates laid out backwards from the end of the history. */
export function lotsUntil(endAt: number): LotSeed[] {
  return deliveries.map((delivery) => lotOf(delivery, endAt));
}

/** The lot of a class that was in use at a moment. */
export function lotInUse(lots: LotSeed[], solutionClass: SolutionClass, at: number): LotSeed {
  const lot = lots.find(
    (one) =>
      one.solutionClass === solutionClass &&
      one.usedFrom !== null &&
      one.usedFrom <= at &&
      (one.usedUntil === null || at < one.usedUntil),
  );
  if (!lot) throw new Error(`No ${solutionClass} lot was in use at ${new Date(at).toISOString()}.`);
  return lot;
}
