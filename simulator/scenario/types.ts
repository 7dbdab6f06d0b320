/** Shapes of the Corrie Sound Utilities scenario: plain data, no behaviour. */
import type {
  CheckStage,
  CompensationModelName,
  Criticality,
  DecisionRule,
  DisplayUnit,
  HazardTag,
  IntervalMethod,
  ProbeKind,
  ProbeStatus,
  Role,
  StandardBasis,
  StandardMedium,
  StandardState,
  TemperatureSensor,
} from '../../shared/contracts/vocabulary.ts';

export interface SiteSeed {
  key: string;
  code: string;
  name: string;
  purpose: string;
  timeZone: string;
  access: string;
  areas: { key: string; name: string }[];
}

/** Kinds of reference solution the group buys; each is supplied by one lot after the other. */
export type SolutionClass = 'molal-0.01' | 'molal-0.1' | 'molal-1' | 'demal-0.1' | 'dilute-84' | 'dilute-147';

export interface PointSeed {
  /** Unique over the group; printed on the tag at the pipe. */
  code: string;
  site: string;
  area: string;
  name: string;
  duty: string;
  medium: string;
  water: string;
  displayUnit: DisplayUnit;
  limitLowUsCm: number | null;
  limitHighUsCm: number | null;
  tolerancePercent: number;
  decisionRule: DecisionRule;
  compensation: { model: CompensationModelName; coefficientPerK: number | null; referenceC: number };
  interval: {
    method: IntervalMethod;
    days: number;
    minDays: number;
    maxDays: number;
    targetProbability: number;
  };
  cleaningEveryDays: number | null;
  criticality: Criticality;
  hazardTags: HazardTag[];
  /** Solution for calibration here and the independent second one. */
  solution: SolutionClass;
  secondSolution: SolutionClass;
  /** Automatic check in a KCl flow cell: hours between checks, or none. */
  checkEveryHours: number | null;
}

export interface ProbeSeed {
  key: string;
  tag: string;
  serial: string;
  device: string;
  kind: ProbeKind;
  model: string;
  status: ProbeStatus;
  nominalCellConstantPerCm: number;
  newCellConstantPerCm: number;
  rangeLowUsCm: number;
  rangeHighUsCm: number;
  resolutionUsCm: number;
  temperatureSensor: TemperatureSensor;
  firmware: string;
  /** Where it stands, in time order, as days before the end of the history; `untilDaysAgo` null = still there. */
  assignments: { point: string; fromDaysAgo: number; untilDaysAgo: number | null; why: string }[];
  /** Drift of ln K in percent a month, its walk, and deposit in percent a month with its ceiling in percent. */
  driftPercentPerMonth: number;
  walkPercentPerRootMonth: number;
  foulingPercentPerMonth: number;
  foulingCeilingPercent: number;
  temperatureOffsetC: number;
  /** A knock: the true cell constant jumps once, and a calibration on suspicion finds it. */
  damage: { daysAgo: number; foundDaysAgo: number; percent: number; what: string } | null;
}

export interface BottleSeed {
  code: string;
  openedAt: number | null;
  openedBy: string | null;
  volumeMl: number;
  remainingMl: number;
  discardedAt: number | null;
}

export interface LotSeed {
  key: string;
  code: string;
  solutionClass: SolutionClass;
  producer: string;
  product: string;
  certificateNumber: string;
  medium: StandardMedium;
  basis: StandardBasis;
  nominal: 0.01 | 0.1 | 1 | null;
  certifiedUsCm: number;
  referenceTemperatureC: number;
  expandedUncertaintyPercent: number;
  coverageFactor: number;
  coverageProbability: number;
  temperatureTable: { temperatureC: number; conductivityUsCm: number }[] | null;
  traceability: string;
  issuedAt: number;
  receivedAt: number;
  /** First used and used up; null while unused or still in use. */
  usedFrom: number | null;
  usedUntil: number | null;
  expiresAt: number;
  openedLifeDays: number;
  storage: string;
  state: StandardState;
  stateHistory: { at: number; state: StandardState; reason: string; by: string }[];
  bottles: BottleSeed[];
  /** How far the liquid truly is from its certificate. Known to the simulator only; never loaded. */
  deviation: number;
}

export interface PersonSeed {
  key: string;
  name: string;
  email: string;
  /** `site` null = all sites; an auditor's grant ends. */
  grants: { role: Role; site: string | null; endsInDays: number | null }[];
  isDemoSignIn: boolean;
}

/** A reading taken on purpose, outside the regular grid. */
export interface PurposeReading {
  at: number;
  n: number;
  context: 'check' | 'calibration';
  solution: string;
  conductanceUs: number;
  conductivityUsCm: number;
  temperatureC: number;
}

export type CalibrationStage = Exclude<CheckStage, 'automatic'>;
