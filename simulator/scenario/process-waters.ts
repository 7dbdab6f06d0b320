import type { Water } from '../waters.ts';

/** Salts much like sodium chloride and sea salt: 1.9 to 2.0 %/K, slightly more than straight. */
const seaSalts = { linearPerK: 0.0193, squarePerK2: 4.4e-5 };
/** Hard and natural waters near 2 %/K. */
const hardWater = { linearPerK: 0.0197, squarePerK2: 5.5e-5 };
/** Sodium hydroxide and mineral acid lose slope when hot (common practice: 1.7 and 1.4 %/K). */
const caustic = { linearPerK: 0.0172, squarePerK2: -1.5e-5 };
const acid = { linearPerK: 0.0141, squarePerK2: -2e-5 };

const sea = { meanC: 11.6, seasonalC: 4.2, dailyC: 0.3, wanderC: 0.7 };
const plant = { meanC: 12.8, seasonalC: 4.0, dailyC: 0.5, wanderC: 0.6 };
const hall = { meanC: 17, seasonalC: 3.5, dailyC: 1.2, wanderC: 1 };
const hot = (meanC: number) => ({ meanC, seasonalC: 0.5, dailyC: 0.6, wanderC: 1.8 });
const pond = { meanC: 12.5, seasonalC: 5.2, dailyC: 1.3, wanderC: 1.2 };

const still = { slowShare: 0.012, fastShare: 0.004 };
const lively = { slowShare: 0.05, fastShare: 0.012 };

/** A cleaning of the dairy's lines: rinse, caustic, rinse, acid, rinse. */
const lineCleaning = {
  hours: 8,
  phases: [
    { name: 'first rinse', minutes: 8, conductivity25UsCm: 620, temperatureC: 32 },
    { name: 'caustic', minutes: 25, conductivity25UsCm: 52_000, temperatureC: 74 },
    { name: 'middle rinse', minutes: 10, conductivity25UsCm: 540, temperatureC: 38 },
    { name: 'acid', minutes: 18, conductivity25UsCm: 34_000, temperatureC: 62 },
    { name: 'final rinse', minutes: 14, conductivity25UsCm: 470, temperatureC: 24 },
  ],
};

const skerryPoint: Water[] = [
  {
    key: 'sea-intake',
    site: 'skerry-point',
    conductivity25UsCm: 50_100,
    seasonalShare: 0.008,
    tidalShare: 0.006,
    ...still,
    temperature: sea,
    salts: seaSalts,
  },
  {
    key: 'sea-screened',
    site: 'skerry-point',
    conductivity25UsCm: 50_050,
    seasonalShare: 0.008,
    tidalShare: 0.005,
    ...still,
    temperature: sea,
    salts: seaSalts,
  },
  {
    key: 'feed-a',
    site: 'skerry-point',
    conductivity25UsCm: 52_300,
    seasonalShare: 0.008,
    tidalShare: 0.003,
    ...still,
    temperature: plant,
    salts: seaSalts,
  },
  {
    key: 'feed-b',
    site: 'skerry-point',
    conductivity25UsCm: 51_400,
    seasonalShare: 0.008,
    tidalShare: 0.003,
    ...still,
    temperature: plant,
    salts: seaSalts,
  },
  {
    key: 'permeate-a',
    site: 'skerry-point',
    conductivity25UsCm: 306,
    seasonalShare: 0.09,
    dailyShare: 0.01,
    ...lively,
    temperature: plant,
    salts: seaSalts,
  },
  {
    key: 'permeate-b',
    site: 'skerry-point',
    conductivity25UsCm: 334,
    seasonalShare: 0.09,
    dailyShare: 0.01,
    ...lively,
    temperature: plant,
    salts: seaSalts,
  },
  {
    key: 'permeate-c',
    site: 'skerry-point',
    conductivity25UsCm: 297,
    seasonalShare: 0.09,
    dailyShare: 0.01,
    ...lively,
    temperature: plant,
    salts: seaSalts,
  },
  {
    key: 'permeate-all',
    site: 'skerry-point',
    conductivity25UsCm: 302,
    seasonalShare: 0.09,
    dailyShare: 0.01,
    ...lively,
    temperature: plant,
    salts: seaSalts,
  },
  {
    key: 'after-lime',
    site: 'skerry-point',
    conductivity25UsCm: 612,
    seasonalShare: 0.03,
    dailyShare: 0.02,
    ...lively,
    temperature: plant,
    salts: hardWater,
  },
  {
    key: 'town-main',
    site: 'skerry-point',
    conductivity25UsCm: 584,
    seasonalShare: 0.03,
    dailyShare: 0.01,
    ...still,
    temperature: plant,
    salts: hardWater,
  },
  {
    key: 'brine',
    site: 'skerry-point',
    conductivity25UsCm: 83_600,
    seasonalShare: 0.01,
    tidalShare: 0.004,
    ...still,
    temperature: { ...plant, meanC: 14 },
    salts: seaSalts,
  },
  {
    key: 'membrane-cleaning',
    site: 'skerry-point',
    conductivity25UsCm: 2_150,
    slowShare: 0.08,
    fastShare: 0.02,
    temperature: { ...hall, meanC: 22 },
    salts: caustic,
  },
];

const lowerWeir: Water[] = [
  {
    key: 'caustic-supply',
    site: 'lower-weir',
    conductivity25UsCm: 54_000,
    slowShare: 0.04,
    fastShare: 0.004,
    temperature: hot(74),
    salts: caustic,
  },
  {
    key: 'acid-supply',
    site: 'lower-weir',
    conductivity25UsCm: 35_500,
    slowShare: 0.04,
    fastShare: 0.004,
    temperature: hot(62),
    salts: acid,
  },
  {
    key: 'return-1',
    site: 'lower-weir',
    conductivity25UsCm: 620,
    ...lively,
    temperature: hall,
    salts: caustic,
    cycle: lineCleaning,
  },
  {
    key: 'return-2',
    site: 'lower-weir',
    conductivity25UsCm: 640,
    ...lively,
    temperature: hall,
    salts: caustic,
    cycle: lineCleaning,
  },
  {
    key: 'return-tank',
    site: 'lower-weir',
    conductivity25UsCm: 630,
    ...lively,
    temperature: hall,
    salts: caustic,
    cycle: { ...lineCleaning, hours: 12 },
  },
  {
    key: 'rinse-1',
    site: 'lower-weir',
    conductivity25UsCm: 462,
    ...lively,
    temperature: { ...hall, meanC: 20 },
    salts: hardWater,
  },
  {
    key: 'rinse-2',
    site: 'lower-weir',
    conductivity25UsCm: 455,
    ...lively,
    temperature: { ...hall, meanC: 20 },
    salts: hardWater,
  },
  {
    key: 'rinse-bottle',
    site: 'lower-weir',
    conductivity25UsCm: 448,
    ...still,
    temperature: { ...hall, meanC: 19 },
    salts: hardWater,
  },
  {
    key: 'recovered-rinse',
    site: 'lower-weir',
    conductivity25UsCm: 810,
    dailyShare: 0.06,
    ...lively,
    temperature: { ...hall, meanC: 28 },
    salts: hardWater,
  },
  {
    key: 'dairy-mains',
    site: 'lower-weir',
    conductivity25UsCm: 436,
    seasonalShare: 0.04,
    ...still,
    temperature: { ...pond, meanC: 11.5 },
    salts: hardWater,
  },
  {
    key: 'brine-chiller',
    site: 'lower-weir',
    conductivity25UsCm: 118_000,
    ...still,
    temperature: { meanC: 3.4, seasonalC: 0.3, dailyC: 0.2, wanderC: 0.4 },
    salts: seaSalts,
  },
];

const quarrybank: Water[] = [
  {
    key: 'boiler-feed-1',
    site: 'quarrybank',
    conductivity25UsCm: 14.6,
    ...lively,
    temperature: { ...hall, meanC: 30 },
    salts: seaSalts,
    nearlyPure: true,
  },
  {
    key: 'boiler-feed-2',
    site: 'quarrybank',
    conductivity25UsCm: 15.2,
    ...lively,
    temperature: { ...hall, meanC: 30 },
    salts: seaSalts,
    nearlyPure: true,
  },
  {
    key: 'make-up',
    site: 'quarrybank',
    conductivity25UsCm: 6.8,
    dailyShare: 0.03,
    ...lively,
    temperature: { ...plant, meanC: 14 },
    salts: seaSalts,
    nearlyPure: true,
  },
  {
    key: 'condensate-a',
    site: 'quarrybank',
    conductivity25UsCm: 4.3,
    ...lively,
    temperature: { ...hall, meanC: 31 },
    salts: seaSalts,
    nearlyPure: true,
  },
  {
    key: 'condensate-b',
    site: 'quarrybank',
    conductivity25UsCm: 5.1,
    ...lively,
    temperature: { ...hall, meanC: 31 },
    salts: seaSalts,
    nearlyPure: true,
  },
  {
    key: 'blowdown-1',
    site: 'quarrybank',
    conductivity25UsCm: 2_950,
    slowShare: 0.03,
    fastShare: 0.006,
    sawtooth: { hours: 7, lowShare: 0.78, highShare: 1.2 },
    temperature: { ...hall, meanC: 33 },
    salts: hardWater,
  },
  {
    key: 'blowdown-2',
    site: 'quarrybank',
    conductivity25UsCm: 3_050,
    slowShare: 0.03,
    fastShare: 0.006,
    sawtooth: { hours: 9, lowShare: 0.76, highShare: 1.22 },
    temperature: { ...hall, meanC: 33 },
    salts: hardWater,
  },
];

const hollowFen: Water[] = [
  {
    key: 'creek-inlet',
    site: 'hollow-fen',
    conductivity25UsCm: 17_500,
    seasonalShare: 0.1,
    tidalShare: 0.35,
    slowShare: 0.1,
    fastShare: 0.01,
    temperature: pond,
    salts: seaSalts,
  },
  {
    key: 'settled-inlet',
    site: 'hollow-fen',
    conductivity25UsCm: 15_800,
    seasonalShare: 0.08,
    tidalShare: 0.1,
    slowShare: 0.06,
    fastShare: 0.004,
    temperature: pond,
    salts: seaSalts,
  },
  ...[14_600, 14_100, 13_700, 12_900, 9_800, 9_400].map((conductivity25UsCm, index) => ({
    key: `pond-${index + 1}`,
    site: 'hollow-fen',
    conductivity25UsCm,
    seasonalShare: 0.05,
    dailyShare: 0.004,
    slowShare: 0.04,
    fastShare: 0.003,
    temperature: pond,
    salts: seaSalts,
  })),
  {
    key: 'fresh-well',
    site: 'hollow-fen',
    conductivity25UsCm: 690,
    seasonalShare: 0.03,
    ...still,
    temperature: { meanC: 10.8, seasonalC: 1, dailyC: 0.1, wanderC: 0.2 },
    salts: hardWater,
  },
  {
    key: 'fry-hall',
    site: 'hollow-fen',
    conductivity25UsCm: 11_200,
    ...still,
    temperature: { meanC: 16.5, seasonalC: 1, dailyC: 0.4, wanderC: 0.4 },
    salts: seaSalts,
  },
  {
    key: 'fen-outfall',
    site: 'hollow-fen',
    conductivity25UsCm: 13_200,
    seasonalShare: 0.05,
    tidalShare: 0.08,
    ...lively,
    temperature: pond,
    salts: seaSalts,
  },
];

export const processWaters: Water[] = [...skerryPoint, ...lowerWeir, ...quarrybank, ...hollowFen];

const waterByKey = new Map(processWaters.map((water) => [water.key, water]));

export function processWater(key: string): Water {
  const water = waterByKey.get(key);
  if (!water)
    throw new Error(`No process water "${key}". Known waters: ${[...waterByKey.keys()].join(', ')}.`);
  return water;
}
