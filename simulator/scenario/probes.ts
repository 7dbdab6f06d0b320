import type { ProbeKind, TemperatureSensor } from '../../shared/contracts/vocabulary.ts';
import { normalAt, seedFor, uniformAt } from '../random.ts';
import type { ProbeSeed } from './types.ts';

/** A build the group buys: what all its probes share. */
interface ProbeModel {
  kind: ProbeKind;
  model: string;
  nominalCellConstantPerCm: number;
  rangeHighUsCm: number;
  rangeLowUsCm?: number;
  resolutionUsCm: number;
  temperatureSensor: TemperatureSensor;
  firmware: string;
  foulingPercentPerMonth: number;
  foulingCeilingPercent: number;
}

const models = {
  pure: {
    kind: 'two-electrode',
    model: 'Two steel sheaths, 0.1',
    nominalCellConstantPerCm: 0.1,
    rangeHighUsCm: 2_000,
    resolutionUsCm: 0.01,
    temperatureSensor: 'pt1000',
    firmware: '3.1.4',
    foulingPercentPerMonth: 0.04,
    foulingCeilingPercent: 0.5,
  },
  permeate: {
    kind: 'two-electrode',
    model: 'Two titanium sheaths, 0.1',
    nominalCellConstantPerCm: 0.1,
    rangeHighUsCm: 3_000,
    resolutionUsCm: 0.1,
    temperatureSensor: 'pt1000',
    firmware: '3.1.4',
    foulingPercentPerMonth: 0.18,
    foulingCeilingPercent: 1.1,
  },
  drinking: {
    kind: 'two-electrode',
    model: 'Two graphite faces, 0.5',
    nominalCellConstantPerCm: 0.5,
    rangeHighUsCm: 10_000,
    resolutionUsCm: 0.1,
    temperatureSensor: 'pt1000',
    firmware: '3.1.4',
    foulingPercentPerMonth: 0.35,
    foulingCeilingPercent: 1,
  },
  four: {
    kind: 'four-electrode',
    model: 'Four rings, 0.5',
    nominalCellConstantPerCm: 0.5,
    rangeHighUsCm: 200_000,
    resolutionUsCm: 1,
    temperatureSensor: 'pt1000',
    firmware: '4.0.2',
    foulingPercentPerMonth: 0.35,
    foulingCeilingPercent: 1.1,
  },
  pond: {
    kind: 'four-electrode',
    model: 'Four rings, guarded, 0.5',
    nominalCellConstantPerCm: 0.5,
    rangeHighUsCm: 50_000,
    resolutionUsCm: 1,
    temperatureSensor: 'ntc',
    firmware: '4.0.2',
    foulingPercentPerMonth: 2.2,
    foulingCeilingPercent: 2.8,
  },
  ring: {
    kind: 'inductive',
    model: 'Closed ring, 2.1',
    nominalCellConstantPerCm: 2.1,
    rangeHighUsCm: 200_000,
    resolutionUsCm: 10,
    temperatureSensor: 'pt100',
    firmware: '2.7.0',
    foulingPercentPerMonth: 0.12,
    foulingCeilingPercent: 1,
  },
  cleaningRing: {
    kind: 'inductive',
    model: 'Hygienic ring, 6.2',
    nominalCellConstantPerCm: 6.2,
    rangeHighUsCm: 200_000,
    resolutionUsCm: 1,
    temperatureSensor: 'pt1000',
    firmware: '2.7.0',
    foulingPercentPerMonth: 0.15,
    foulingCeilingPercent: 1.2,
  },
} satisfies Record<string, ProbeModel>;

type ProbeRow = Partial<
  Pick<ProbeSeed, 'driftPercentPerMonth' | 'foulingPercentPerMonth' | 'damage' | 'assignments' | 'status'>
>;

/** Two years and the commissioning before it. */
const INSTALLED_DAYS_AGO = 760;

function probe(
  serial: string,
  modelName: keyof typeof models,
  point: string | null,
  more: ProbeRow = {},
): ProbeSeed {
  const { model, kind, rangeLowUsCm, ...rest }: ProbeModel = models[modelName];
  const own = seedFor(0x5a17, serial);
  const spread = 1 + 0.018 * (2 * uniformAt(own, 1) - 1);
  return {
    key: serial.toLowerCase(),
    tag: point ?? `store-${serial.toLowerCase()}`,
    serial,
    device: `probe-${serial.toLowerCase()}`,
    kind,
    model,
    status: point ? 'in-service' : 'spare',
    newCellConstantPerCm: Number((rest.nominalCellConstantPerCm * spread).toPrecision(5)),
    rangeLowUsCm: rangeLowUsCm ?? 0,
    assignments: point
      ? [{ point, fromDaysAgo: INSTALLED_DAYS_AGO, untilDaysAgo: null, why: 'Commissioned' }]
      : [],
    // Wear lengthens the path between electrodes more often than it shortens it: most probes come to read low.
    driftPercentPerMonth: Math.round(100 * (0.1 + 0.11 * normalAt(own, 2))) / 100,
    walkPercentPerRootMonth: 0.09,
    temperatureOffsetC: Math.round(1000 * 0.06 * normalAt(own, 3)) / 1000,
    damage: null,
    ...rest,
    ...more,
  };
}

const movedProbe = probe('2E-1169', 'permeate', 'sk-14', {
  driftPercentPerMonth: 0.22,
  assignments: [
    { point: 'lw-15', fromDaysAgo: INSTALLED_DAYS_AGO, untilDaysAgo: 298, why: 'Commissioned' },
    {
      point: 'sk-14',
      fromDaysAgo: 296,
      untilDaysAgo: null,
      why: 'Moved to replace 2E-1102, whose insulator was cracked',
    },
  ],
});

const skerryPoint: ProbeSeed[] = [
  probe('IN-0401', 'ring', 'sk-01', { driftPercentPerMonth: -0.08 }),
  probe('IN-0402', 'ring', 'sk-02'),
  probe('4E-2217', 'four', 'sk-04', { driftPercentPerMonth: 0.28 }),
  probe('4E-2218', 'four', 'sk-05'),
  probe('2E-1171', 'permeate', 'sk-11', { driftPercentPerMonth: 0.12 }),
  probe('2E-1172', 'permeate', 'sk-12'),
  probe('2E-1174', 'permeate', 'sk-13', { driftPercentPerMonth: -0.15 }),
  movedProbe,
  probe('2E-1102', 'permeate', 'sk-14', {
    status: 'retired',
    assignments: [
      { point: 'sk-14', fromDaysAgo: INSTALLED_DAYS_AGO, untilDaysAgo: 297, why: 'Commissioned' },
    ],
  }),
  probe('2E-1183', 'drinking', 'sk-21', { driftPercentPerMonth: 0.11, foulingPercentPerMonth: 0.3 }),
  probe('4E-2231', 'four', 'sk-22', { driftPercentPerMonth: -0.34, foulingPercentPerMonth: 0.1 }),
  probe('IN-0411', 'ring', 'sk-31', { driftPercentPerMonth: -0.18 }),
  probe('IN-0412', 'ring', 'sk-32', { driftPercentPerMonth: 0.3 }),
];

const lowerWeir: ProbeSeed[] = [
  probe('IN-0520', 'cleaningRing', 'lw-01'),
  probe('IN-0521', 'cleaningRing', 'lw-02', { driftPercentPerMonth: 0.25 }),
  probe('IN-0522', 'cleaningRing', 'lw-03'),
  probe('2E-1191', 'drinking', 'lw-04'),
  probe('IN-0525', 'cleaningRing', 'lw-11'),
  probe('IN-0526', 'cleaningRing', 'lw-12', {
    damage: { daysAgo: 431, foundDaysAgo: 413, percent: 8.6, what: 'Body chipped by a dropped clamp' },
  }),
  probe('2E-1192', 'drinking', 'lw-13'),
  probe('2E-1193', 'drinking', 'lw-14', { driftPercentPerMonth: -0.24 }),
  probe('2E-1197', 'drinking', 'lw-15', {
    assignments: [{ point: 'lw-15', fromDaysAgo: 297, untilDaysAgo: null, why: 'Replaces 2E-1169' }],
  }),
  probe('2E-1194', 'drinking', 'lw-21'),
  probe('IN-0530', 'ring', 'lw-22'),
];

const quarrybank: ProbeSeed[] = [
  probe('2E-1301', 'pure', 'qb-01'),
  probe('2E-1302', 'pure', 'qb-02'),
  probe('2E-1303', 'pure', 'qb-03'),
  probe('2E-1304', 'pure', 'qb-11', { driftPercentPerMonth: -0.07 }),
  probe('2E-1305', 'pure', 'qb-12'),
  probe('4E-2305', 'four', 'qb-21', {
    damage: { daysAgo: 24, foundDaysAgo: 6, percent: 9.2, what: 'Ring electrode loosened by water hammer' },
  }),
  probe('4E-2306', 'four', 'qb-22'),
];

const hollowFen: ProbeSeed[] = [
  probe('4E-2401', 'pond', 'hf-01'),
  probe('4E-2402', 'pond', 'hf-02'),
  probe('2E-1407', 'drinking', 'hf-03'),
  probe('4E-2411', 'pond', 'hf-11'),
  probe('4E-2412', 'pond', 'hf-12'),
  probe('4E-2413', 'pond', 'hf-13', { driftPercentPerMonth: 0.3 }),
  probe('4E-2414', 'pond', 'hf-14', { driftPercentPerMonth: 0.42 }),
  probe('4E-2415', 'pond', 'hf-15'),
  probe('4E-2416', 'pond', 'hf-16', { driftPercentPerMonth: -0.2 }),
  probe('4E-2421', 'pond', 'hf-21', { foulingPercentPerMonth: 0.9 }),
  probe('4E-2431', 'pond', 'hf-31'),
];

const store: ProbeSeed[] = [probe('2E-1198', 'permeate', null), probe('4E-2440', 'four', null)];

export const probes: ProbeSeed[] = [...skerryPoint, ...lowerWeir, ...quarrybank, ...hollowFen, ...store];
