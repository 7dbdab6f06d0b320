/** Pure: everything that is concluded from a run's finished steps. The same input gives the same judgement, always. */
import type { Judgement, Verdict } from '../../../shared/contracts/calibrations.ts';
import type { BudgetRow } from '../../../shared/contracts/checks.ts';
import type { Criteria } from '../../../shared/contracts/procedures.ts';
import type { CaptureStep, RunStep } from '../../../shared/contracts/vocabulary.ts';
import { secondPointAgreement, splitFouling, type ErrorChange } from '../../../shared/science/fouling.ts';
import { adviseOn } from './advice.ts';
import {
  compareState,
  correlationOf,
  meanOf,
  type Circumstances,
  type CountingReading,
  type Solution,
} from './budget.ts';
import type { Decision } from './order.ts';

export interface LastVisit {
  errorPercent: number;
  expandedUncertaintyPercent: number;
  coverageFactor: number;
  daysBefore: number;
  isSameLot: boolean;
  budget: readonly BudgetRow[];
}

export interface JudgeInput extends Circumstances {
  criteria: Criteria;
  nominalCellConstantPerCm: number;
  solution: Solution;
  secondSolution: Solution | null;
  /** Readings that count, excluded ones left out. */
  readings: readonly (CountingReading & { step: CaptureStep })[];
  finished: ReadonlySet<RunStep>;
  decision: Decision | null;
  /** Decided on; null until then, and the one in use when nothing is adjusted. */
  cellConstantAfterPerCm: number | null;
  lastVisit: LastVisit | null;
}

export const nothingJudged: Judgement = {
  asFound: null,
  cleaned: null,
  asLeft: null,
  asLeftEqualsCleaned: false,
  secondPoint: null,
  fouling: null,
  driftSinceAsLeft: null,
  temperatureErrorC: null,
  zeroUsCm: null,
  advice: null,
  secondPointAgrees: null,
};

export function judgeRun(input: JudgeInput): Judgement {
  const { solution, secondSolution } = input;
  const adjustedTo = input.decision === 'adjust' ? input.cellConstantAfterPerCm : null;
  const stateOf = (step: CaptureStep, liquid: Solution, perCm: number | null = null): Verdict | null => {
    const readings = readingsOf(input, step);
    return readings.length > 0 ? compareState(readings, liquid, input, perCm) : null;
  };
  const asFound = stateOf('as-found', solution);
  const cleaned = stateOf('as-found-cleaned', solution);
  const asLeftEqualsCleaned = input.decision === 'leave' && cleaned !== null;
  const asLeft = asLeftEqualsCleaned ? cleaned : stateOf('as-left', solution, adjustedTo);
  const secondPoint = secondSolution && stateOf('second-point', secondSolution, adjustedTo);
  return {
    asFound,
    cleaned,
    asLeft,
    asLeftEqualsCleaned,
    secondPoint,
    ...changesOf(input, asFound, cleaned),
    temperatureErrorC: temperatureError(input),
    zeroUsCm: zeroOf(input),
    advice: cleaned && adviseOn(adviceInputOf(input, cleaned)),
    secondPointAgrees: agreementOf(cleaned, secondPoint),
  };
}

/** Only finished steps speak: nothing may be read off a step while its readings are still being taken. */
const readingsOf = (input: JudgeInput, step: CaptureStep) =>
  input.finished.has(step) ? input.readings.filter((reading) => reading.step === step) : [];

const errorOf = (
  verdict: Pick<Verdict, 'errorPercent' | 'expandedUncertaintyPercent' | 'coverageFactor'>,
) => ({
  error: verdict.errorPercent,
  standardUncertainty: verdict.expandedUncertaintyPercent / verdict.coverageFactor,
});

const coverageFactor = 2;
const asChange = ({ change, standardUncertainty, isSignificant }: ErrorChange) => ({
  changePercent: change,
  expandedUncertaintyPercent: coverageFactor * standardUncertainty,
  isSignificant,
});

function changesOf(
  { lastVisit }: JudgeInput,
  asFound: Verdict | null,
  cleaned: Verdict | null,
): Pick<Judgement, 'fouling' | 'driftSinceAsLeft'> {
  if (!asFound || !cleaned) return { fouling: null, driftSinceAsLeft: null };
  const split = splitFouling({
    uncleaned: errorOf(asFound),
    cleaned: errorOf(cleaned),
    asLeft: errorOf(cleaned),
    correlation: correlationOf(asFound, cleaned, true),
    ...(lastVisit === null
      ? {}
      : {
          lastVisit: {
            asLeft: errorOf(lastVisit),
            days: lastVisit.daysBefore,
            correlation: betweenVisits(lastVisit, cleaned),
          },
        }),
  });
  return { fouling: asChange(split.fouling), driftSinceAsLeft: split.drift && asChange(split.drift) };
}

const betweenVisits = (lastVisit: LastVisit, cleaned: Verdict): number =>
  lastVisit.isSameLot ? correlationOf(lastVisit, cleaned, false) : 0;

const adviceInputOf = (input: JudgeInput, cleaned: Verdict) => ({
  cleaned,
  nominalCellConstantPerCm: input.nominalCellConstantPerCm,
  tolerancePercent: input.tolerancePercent,
  adjustmentShare: input.criteria.adjustmentShareOfTolerance,
  lastAsLeft: input.lastVisit && {
    errorPercent: input.lastVisit.errorPercent,
    expandedUncertaintyPercent: input.lastVisit.expandedUncertaintyPercent,
    correlation: betweenVisits(input.lastVisit, cleaned),
  },
});

function temperatureError(input: JudgeInput): number | null {
  const differences = readingsOf(input, 'temperature-sensor').flatMap(
    ({ temperatureC, referenceTemperatureC }) =>
      referenceTemperatureC === null
        ? []
        : [temperatureC - (referenceTemperatureC + (input.thermometer?.correctionC ?? 0))],
  );
  return differences.length > 0 ? meanOf(differences) : null;
}

function zeroOf(input: JudgeInput): number | null {
  const readings = readingsOf(input, 'zero-in-air');
  return readings.length > 0 ? meanOf(readings.map((reading) => reading.conductivityUsCm)) : null;
}

/** Both solutions must ask for the same cell constant; they share the thermometer and the hour, not the lot. */
function agreementOf(cleaned: Verdict | null, secondPoint: Verdict | null): boolean | null {
  if (!cleaned?.impliedCellConstantPerCm || !secondPoint?.impliedCellConstantPerCm) return null;
  const of = (verdict: Verdict, perCm: number) => ({
    cellConstantPerCm: perCm,
    relativeUncertainty: verdict.expandedUncertaintyPercent / verdict.coverageFactor / 100,
  });
  return secondPointAgreement({
    first: of(cleaned, cleaned.impliedCellConstantPerCm),
    second: of(secondPoint, secondPoint.impliedCellConstantPerCm),
  }).agrees;
}
