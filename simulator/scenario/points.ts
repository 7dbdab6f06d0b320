import type { CompensationModelName, Criticality, HazardTag } from '../../shared/contracts/vocabulary.ts';
import { processWater } from './process-waters.ts';
import type { PointSeed, SolutionClass } from './types.ts';

/** What the measuring points of one duty have in common. Tolerances and first intervals by duty: common practice. */
interface DutyDefaults {
  duty: string;
  tolerancePercent: number;
  decisionRule: PointSeed['decisionRule'];
  intervalDays: number;
  cleaningEveryDays: number | null;
  criticality: Criticality;
  hazardTags: HazardTag[];
  solution: SolutionClass;
  secondSolution: SolutionClass;
  compensation: { model: CompensationModelName; coefficientPerK: number | null; referenceC?: number };
}

const linear = (coefficientPerK: number, referenceC = 25) => ({
  model: 'linear' as const,
  coefficientPerK,
  referenceC,
});
const naturalWater = { model: 'natural-water' as const, coefficientPerK: null, referenceC: 25 };
const ultrapure = { model: 'ultrapure' as const, coefficientPerK: null, referenceC: 25 };

const duties = {
  seawater: {
    duty: 'Recovery and membrane load',
    tolerancePercent: 3,
    decisionRule: 'guarded-u',
    intervalDays: 120,
    cleaningEveryDays: 45,
    criticality: 'medium',
    hazardTags: ['pressurised', 'electrical'],
    solution: 'molal-1',
    secondSolution: 'molal-0.1',
    compensation: linear(0.0195),
  },
  permeate: {
    duty: 'Membrane tightness; diverts on high',
    tolerancePercent: 3,
    decisionRule: 'guarded-u',
    intervalDays: 91,
    cleaningEveryDays: 60,
    criticality: 'high',
    hazardTags: ['pressurised', 'control-loop', 'electrical'],
    solution: 'molal-0.01',
    secondSolution: 'dilute-147',
    compensation: linear(0.0193),
  },
  drinking: {
    duty: 'Drinking water release',
    tolerancePercent: 3,
    decisionRule: 'guarded-u',
    intervalDays: 91,
    cleaningEveryDays: 30,
    criticality: 'critical',
    hazardTags: ['control-loop', 'hygiene'],
    solution: 'molal-0.01',
    secondSolution: 'dilute-147',
    compensation: naturalWater,
  },
  outfall: {
    duty: 'Discharge record',
    tolerancePercent: 5,
    decisionRule: 'simple',
    intervalDays: 180,
    cleaningEveryDays: 60,
    criticality: 'medium',
    hazardTags: ['chemicals', 'confined-space'],
    solution: 'molal-1',
    secondSolution: 'molal-0.1',
    compensation: linear(0.0195),
  },
  cleaning: {
    duty: 'Cleaning strength and phase change',
    tolerancePercent: 5,
    decisionRule: 'simple',
    intervalDays: 180,
    cleaningEveryDays: null,
    criticality: 'medium',
    hazardTags: ['chemicals', 'hypochlorite', 'hot-process', 'control-loop'],
    solution: 'demal-0.1',
    secondSolution: 'molal-1',
    compensation: linear(0.0175),
  },
  rinse: {
    duty: 'Rinse is clean: releases the line',
    tolerancePercent: 3,
    decisionRule: 'guarded-u',
    intervalDays: 120,
    cleaningEveryDays: 60,
    criticality: 'high',
    hazardTags: ['hygiene', 'control-loop', 'hot-process'],
    solution: 'molal-0.01',
    secondSolution: 'dilute-147',
    compensation: naturalWater,
  },
  purity: {
    duty: 'Feed water purity',
    tolerancePercent: 3,
    decisionRule: 'guarded-0.83u',
    intervalDays: 120,
    cleaningEveryDays: null,
    criticality: 'high',
    hazardTags: ['hot-process', 'pressurised', 'electrical'],
    solution: 'dilute-84',
    secondSolution: 'dilute-147',
    compensation: ultrapure,
  },
  condensate: {
    duty: 'Leak of process water into condensate; dumps on high',
    tolerancePercent: 2,
    decisionRule: 'guarded-0.83u',
    intervalDays: 91,
    cleaningEveryDays: null,
    criticality: 'critical',
    hazardTags: ['hot-process', 'pressurised', 'control-loop'],
    solution: 'dilute-84',
    secondSolution: 'dilute-147',
    compensation: ultrapure,
  },
  blowdown: {
    duty: 'Boiler salts; drives the blowdown valve',
    tolerancePercent: 5,
    decisionRule: 'guarded-u',
    intervalDays: 120,
    cleaningEveryDays: 60,
    criticality: 'critical',
    hazardTags: ['hot-process', 'pressurised', 'control-loop'],
    solution: 'molal-0.01',
    secondSolution: 'molal-0.1',
    compensation: linear(0.02),
  },
  pond: {
    duty: 'Salinity of the stock',
    tolerancePercent: 5,
    decisionRule: 'guarded-u',
    intervalDays: 91,
    cleaningEveryDays: 14,
    criticality: 'medium',
    hazardTags: ['biosecurity', 'electrical'],
    solution: 'molal-0.1',
    secondSolution: 'molal-0.01',
    compensation: linear(0.0195),
  },
} satisfies Record<string, DutyDefaults>;

type PointRow = Partial<Omit<PointSeed, 'compensation'>> & { compensation?: DutyDefaults['compensation'] };

function point(
  duty: keyof typeof duties,
  code: string,
  area: string,
  name: string,
  medium: string,
  water: string,
  more: PointRow = {},
): PointSeed {
  const common: DutyDefaults = duties[duty];
  const compensation = more.compensation ?? common.compensation;
  const days = more.interval?.days ?? common.intervalDays;
  return {
    code,
    site: processWater(water).site,
    area,
    name,
    duty: common.duty,
    medium,
    water,
    displayUnit: processWater(water).conductivity25UsCm >= 2000 ? 'mS/cm' : 'uS/cm',
    limitLowUsCm: null,
    limitHighUsCm: null,
    tolerancePercent: common.tolerancePercent,
    decisionRule: common.decisionRule,
    interval: {
      method: 'control-chart',
      days,
      minDays: Math.round(days / 3),
      maxDays: days * 2,
      targetProbability: 0.9,
    },
    cleaningEveryDays: common.cleaningEveryDays,
    criticality: common.criticality,
    hazardTags: common.hazardTags,
    solution: common.solution,
    secondSolution: common.secondSolution,
    checkEveryHours: null,
    ...more,
    compensation: { ...compensation, referenceC: compensation.referenceC ?? 25 },
  };
}

const skerryPoint: PointSeed[] = [
  point('seawater', 'sk-01', 'seawater-feed', 'Intake, open sea', 'Sea water', 'sea-intake'),
  point('seawater', 'sk-02', 'seawater-feed', 'After screens', 'Sea water', 'sea-screened'),
  point('seawater', 'sk-04', 'seawater-feed', 'Feed, train A', 'Sea water', 'feed-a', {
    checkEveryHours: 24,
    limitHighUsCm: 56_000,
    interval: { method: 'control-chart', days: 91, minDays: 30, maxDays: 182, targetProbability: 0.9 },
  }),
  point('seawater', 'sk-05', 'seawater-feed', 'Feed, train B', 'Sea water', 'feed-b', {
    checkEveryHours: 24,
    limitHighUsCm: 56_000,
  }),
  point('permeate', 'sk-11', 'permeate', 'Permeate, train A', 'Permeate', 'permeate-a', {
    checkEveryHours: 8,
    limitHighUsCm: 450,
  }),
  point('permeate', 'sk-12', 'permeate', 'Permeate, train B', 'Permeate', 'permeate-b', {
    checkEveryHours: 8,
    limitHighUsCm: 450,
  }),
  point('permeate', 'sk-13', 'permeate', 'Permeate, train C', 'Permeate', 'permeate-c', {
    checkEveryHours: 8,
    limitHighUsCm: 450,
  }),
  point('permeate', 'sk-14', 'permeate', 'Permeate, combined', 'Permeate', 'permeate-all', {
    tolerancePercent: 5,
    limitHighUsCm: 420,
  }),
  point('drinking', 'sk-21', 'remineralised', 'After lime', 'Remineralised water', 'after-lime', {
    tolerancePercent: 2,
    checkEveryHours: 12,
    limitLowUsCm: 480,
    limitHighUsCm: 720,
    hazardTags: ['chemicals', 'control-loop', 'hygiene'],
  }),
  point('drinking', 'sk-22', 'remineralised', 'To town main', 'Drinking water', 'town-main', {
    checkEveryHours: 12,
    limitLowUsCm: 450,
    limitHighUsCm: 700,
  }),
  point('outfall', 'sk-31', 'outfall-cleaning', 'Brine to outfall', 'Brine', 'brine', {
    limitHighUsCm: 95_000,
  }),
  point(
    'cleaning',
    'sk-32',
    'outfall-cleaning',
    'Cleaning return',
    'Membrane cleaning solution',
    'membrane-cleaning',
    {
      hazardTags: ['chemicals', 'hypochlorite', 'pressurised'],
      secondSolution: 'molal-0.01',
      criticality: 'low',
    },
  ),
];

const lowerWeir: PointSeed[] = [
  point(
    'cleaning',
    'lw-01',
    'cleaning-station',
    'Caustic supply',
    'Caustic cleaning solution',
    'caustic-supply',
    { limitLowUsCm: 45_000, compensation: linear(0.0165) },
  ),
  point('cleaning', 'lw-02', 'cleaning-station', 'Acid supply', 'Acid cleaning solution', 'acid-supply', {
    limitLowUsCm: 28_000,
    compensation: linear(0.0135),
    hazardTags: ['chemicals', 'hypochlorite', 'hot-process'],
  }),
  point('cleaning', 'lw-03', 'cleaning-station', 'Caustic return', 'Cleaning return', 'return-tank', {
    criticality: 'high',
  }),
  point('rinse', 'lw-04', 'cleaning-station', 'Recovered rinse', 'Recovered rinse water', 'recovered-rinse', {
    tolerancePercent: 5,
    criticality: 'low',
    limitHighUsCm: 1_400,
  }),
  point('cleaning', 'lw-11', 'lines', 'Return, line 1', 'Cleaning return', 'return-1'),
  point('cleaning', 'lw-12', 'lines', 'Return, line 2', 'Cleaning return', 'return-2'),
  point('rinse', 'lw-13', 'lines', 'Rinse, line 1', 'Rinse water', 'rinse-1', {
    checkEveryHours: 24,
    limitHighUsCm: 600,
  }),
  point('rinse', 'lw-14', 'lines', 'Rinse, line 2', 'Rinse water', 'rinse-2', {
    checkEveryHours: 24,
    limitHighUsCm: 600,
  }),
  point('rinse', 'lw-15', 'lines', 'Bottle rinse', 'Rinse water', 'rinse-bottle', {
    limitHighUsCm: 560,
    criticality: 'critical',
  }),
  point('rinse', 'lw-21', 'services', 'Mains water', 'Mains water', 'dairy-mains', {
    tolerancePercent: 5,
    criticality: 'low',
    interval: { method: 'staircase', days: 180, minDays: 60, maxDays: 365, targetProbability: 0.9 },
    hazardTags: ['hygiene'],
  }),
  point('outfall', 'lw-22', 'services', 'Chiller brine', 'Sodium chloride brine', 'brine-chiller', {
    duty: 'Brine strength against freezing',
    compensation: linear(0.02, 20),
    hazardTags: ['chemicals', 'pressurised'],
    limitLowUsCm: 95_000,
  }),
];

const quarrybank: PointSeed[] = [
  point('purity', 'qb-01', 'feed-water', 'Make-up water', 'Demineralised water', 'make-up', {
    limitHighUsCm: 20,
    hazardTags: ['electrical'],
  }),
  point('purity', 'qb-02', 'feed-water', 'Feed, boiler 1', 'Feed water', 'boiler-feed-1', {
    // Dosed feed water carries too much salt for the ultrapure model (10 µS/cm).
    compensation: linear(0.02),
    limitHighUsCm: 30,
  }),
  point('purity', 'qb-03', 'feed-water', 'Feed, boiler 2', 'Feed water', 'boiler-feed-2', {
    // Dosed feed water carries too much salt for the ultrapure model (10 µS/cm).
    compensation: linear(0.02),
    limitHighUsCm: 30,
  }),
  point('condensate', 'qb-11', 'condensate', 'Condensate return', 'Condensate', 'condensate-a', {
    checkEveryHours: 24,
    limitHighUsCm: 12,
  }),
  point('condensate', 'qb-12', 'condensate', 'Condensate, heat exchanger', 'Condensate', 'condensate-b', {
    checkEveryHours: 24,
    limitHighUsCm: 12,
    tolerancePercent: 3,
  }),
  point('blowdown', 'qb-21', 'boilers', 'Blowdown, boiler 1', 'Boiler water', 'blowdown-1', {
    limitHighUsCm: 4_000,
  }),
  point('blowdown', 'qb-22', 'boilers', 'Blowdown, boiler 2', 'Boiler water', 'blowdown-2', {
    limitHighUsCm: 4_000,
  }),
];

const hollowFen: PointSeed[] = [
  point('pond', 'hf-01', 'inlet', 'Inlet, creek', 'Estuary water', 'creek-inlet', {
    duty: 'Opens the sluice by salinity',
    hazardTags: ['biosecurity', 'confined-space', 'control-loop'],
    criticality: 'high',
  }),
  point('pond', 'hf-02', 'inlet', 'Inlet, settled', 'Estuary water', 'settled-inlet'),
  point('rinse', 'hf-03', 'inlet', 'Well', 'Fresh groundwater', 'fresh-well', {
    duty: 'Fresh water for mixing',
    tolerancePercent: 5,
    criticality: 'low',
    hazardTags: ['confined-space', 'biosecurity'],
    decisionRule: 'simple',
  }),
  ...[1, 2, 3, 4, 5, 6].map((number) =>
    point('pond', `hf-1${number}`, 'ponds', `Pond ${number}`, 'Brackish water', `pond-${number}`, {
      limitLowUsCm: 8_000,
      limitHighUsCm: 18_000,
      checkEveryHours: number === 1 ? 24 : null,
    }),
  ),
  point('pond', 'hf-21', 'hall', 'Fry tanks', 'Brackish water', 'fry-hall', {
    tolerancePercent: 3,
    criticality: 'critical',
    limitLowUsCm: 10_000,
    limitHighUsCm: 12_500,
    checkEveryHours: 24,
    cleaningEveryDays: 10,
  }),
  point('outfall', 'hf-31', 'hall', 'Outfall to fen', 'Brackish water', 'fen-outfall', {
    hazardTags: ['biosecurity', 'confined-space'],
    solution: 'molal-0.1',
    secondSolution: 'molal-0.01',
  }),
];

export const points: PointSeed[] = [...skerryPoint, ...lowerWeir, ...quarrybank, ...hollowFen];
