/** May this reading be used now? One answer and one reason; the first reason that applies, gravest first. */
import type { Trust } from '../../../shared/contracts/readings.ts';
import type { SettingValue } from '../../../shared/contracts/settings.ts';
import type {
  CheckStage,
  DisplayUnit,
  Outcome,
  ReadingContext,
  ReadingQuality,
  TrustLevel,
  TrustReason,
} from '../../../shared/contracts/vocabulary.ts';
import { formatDay, formatDuration, formatTime, toDateInput } from '../../../shared/format/dates.ts';
import { formatConductivity, formatSigned } from '../../../shared/format/numbers.ts';

export interface TrustInput {
  now: Date;
  point: { intervalDays: number; displayUnit: DisplayUnit };
  /** For the times in the reason. */
  timeZone: string;
  probe: { cellConstantPerCm: number } | null;
  device: {
    isOnline: boolean;
    reportedCellConstantPerCm: number | null;
    readingIntervalS: number | null;
    clockOffsetMs: number | null;
  } | null;
  reading: {
    at: Date;
    context: ReadingContext;
    conductivityUsCm: number | null;
    temperatureC: number | null;
    quality: ReadingQuality;
    flags: readonly string[];
    /** At the point's reference temperature, if it can be stated there. */
    valueUsCm: number | null;
  } | null;
  hold: { reason: string; untilAt: Date } | null;
  lastCheck: { at: Date; stage: CheckStage; errorPercent: number; outcome: Outcome } | null;
  /** Set by the newest calibration in effect; null before the first. */
  calibrationDueOn: string | null;
  fitness: SettingValue<'check-fitness'>;
}

/** Devices state their cell constant with four digits: half a unit of the last is at most 0.05 %. */
const cellConstantTolerance = 0.0005;
/** Until a birth says otherwise. */
const assumedIntervalS = 60;
/** Beyond a minute the times of readings no longer fit what people at the plant did. */
const clockDoubtfulAfterMs = 60_000;

/** The transmitter works with another cell constant than the one on record. */
export const cellConstantDiffers = (reportedPerCm: number, recordedPerCm: number): boolean =>
  Math.abs(reportedPerCm - recordedPerCm) > cellConstantTolerance * recordedPerCm;

export const STAGE_WORDS: Readonly<Record<CheckStage, string>> = {
  automatic: 'check',
  'as-found': 'as found',
  'as-found-cleaned': 'cleaned',
  'as-left': 'as left',
};

const say = (level: TrustLevel, reason: TrustReason, text: string): Trust => ({ level, reason, text });

export function judgeTrust(input: TrustInput): Trust {
  return (
    judgeSignal(input) ??
    judgeHold(input) ??
    judgeCondition(input) ??
    judgeComparison(input) ??
    judgeDoubts(input) ??
    fitByComparison(input)
  );
}

function judgeSignal({ now, point, timeZone, probe, device, reading, fitness }: TrustInput): Trust | null {
  if (!probe) return say('no-signal', 'no-probe', 'no probe is installed here');
  if (!device) return say('no-signal', 'no-device', 'the probe has no device that could report');
  if (!reading) return say('no-signal', 'never-heard', 'its device has never sent a reading');
  // The device's own time, set right by what is known of its clock: a queued message must not look fresh.
  const ageMs = now.getTime() - reading.at.getTime() - (device.clockOffsetMs ?? 0);
  const intervalMs = (device.readingIntervalS ?? assumedIntervalS) * 1000;
  const allowed = device.isOnline ? fitness.silentIntervals : 1;
  if (ageMs <= allowed * intervalMs) return null;
  return say(
    'no-signal',
    'silent',
    `last message ${whenText(reading.at, now, timeZone)}${lastValueText(reading, point)}`,
  );
}

function whenText(at: Date, now: Date, timeZone: string): string {
  const time = formatTime(at, { timeZone });
  const isToday =
    formatDay(at, { timeZone }) === formatDay(now, { timeZone }) && now.getTime() - at.getTime() < 86_400_000;
  return isToday ? time : `${formatDay(at, { timeZone })} ${time}`;
}

function lastValueText(reading: NonNullable<TrustInput['reading']>, point: TrustInput['point']): string {
  const conductivityUsCm = reading.valueUsCm ?? reading.conductivityUsCm;
  if (conductivityUsCm === null) return '';
  return `, ${formatConductivity({ conductivityUsCm, unit: point.displayUnit === 'mS/cm' ? 'mS/cm' : 'µS/cm' }).text}`;
}

function judgeHold({ hold, now, timeZone }: TrustInput): Trust | null {
  if (!hold) return null;
  return say(
    'do-not-use',
    'held',
    `held: ${hold.reason}, back about ${whenText(hold.untilAt, now, timeZone)}`,
  );
}

const elsewhere: Partial<Record<ReadingContext, string>> = {
  check: 'in a reference solution for a check',
  calibration: 'in a reference solution for calibration',
  maintenance: 'in maintenance',
};

function judgeCondition({ reading, probe, device }: TrustInput): Trust | null {
  if (!reading || !probe || !device) return null;
  const has = (flag: string): boolean => reading.flags.includes(flag);
  const avoid = (reason: TrustReason, text: string): Trust => say('do-not-use', reason, text);
  if (has('t_open')) return avoid('temperature-failed', 'temperature sensor open');
  if (has('t_short')) return avoid('temperature-failed', 'temperature sensor shorted');
  if (has('over')) return avoid('quality-bad', 'above the range of the probe');
  if (has('under')) return avoid('quality-bad', 'below the range of the probe');
  if (reading.quality === 'bad') return avoid('quality-bad', 'the device itself calls this reading bad');
  if (reading.conductivityUsCm === null) return avoid('quality-bad', 'the device sent no conductivity');
  if (reading.temperatureC === null) return avoid('temperature-failed', 'the device sent no temperature');
  if (has('dry')) return avoid('not-in-process', 'the cell is dry');
  if (has('simulated')) return avoid('not-in-process', 'the device sends a simulated value');
  if (has('hold')) return avoid('not-in-process', 'the device holds an old value');
  const where = elsewhere[reading.context];
  if (where) return avoid('not-in-process', where);
  const reported = device.reportedCellConstantPerCm;
  if (reported !== null && cellConstantDiffers(reported, probe.cellConstantPerCm)) {
    return avoid('cell-constant-changed', 'cell constant changed, no record');
  }
  return null;
}

const errorText = (check: NonNullable<TrustInput['lastCheck']>): string =>
  `${STAGE_WORDS[check.stage]} ${formatSigned(check.errorPercent, 1, '%')}`;

function judgeComparison(input: TrustInput): Trust | null {
  const { lastCheck } = input;
  if (!lastCheck) return say('use-with-care', 'never-compared', 'never compared with a reference solution');
  const error = errorText(lastCheck);
  switch (lastCheck.outcome) {
    case 'outside-clear':
      return say('do-not-use', 'outside-clear', `${error}, outside its tolerance`);
    // More likely outside than not: whoever relies on the reading must not have to argue about it.
    case 'outside-unsure':
      return say('do-not-use', 'outside-unsure', `${error}, outside, too close to be sure`);
    case 'within-unsure':
      return say('use-with-care', 'within-unsure', `${error}, too close to be sure`);
    case 'within-clear':
      return judgeDue(input, lastCheck);
  }
}

/** A calibration states its own due date. Before the first one the point's interval counts from the last comparison. */
function judgeDue(
  { calibrationDueOn, point, fitness, now, timeZone }: TrustInput,
  lastCheck: NonNullable<TrustInput['lastCheck']>,
): Trust | null {
  const overdue = (text: string): Trust => say('use-with-care', 'check-overdue', text);
  if (calibrationDueOn !== null)
    return toDateInput(now, { timeZone }) > calibrationDueOn
      ? overdue(`fitness not confirmed, due ${formatDay(calibrationDueOn)}`)
      : null;
  const dueAt = new Date(lastCheck.at.getTime() + point.intervalDays * fitness.overdueFactor * 86_400_000);
  if (now <= dueAt) return null;
  const on = formatDay(lastCheck.at, { timeZone });
  return overdue(`${errorText(lastCheck)} on ${on}, due since ${formatDay(dueAt, { timeZone })}`);
}

function judgeDoubts({ reading, device }: TrustInput): Trust | null {
  if (reading && reading.valueUsCm === null) {
    const text = 'no value at its reference temperature: the point’s model does not hold here';
    return say('use-with-care', 'value-unknown', text);
  }
  if (reading?.quality === 'doubtful') {
    return say('use-with-care', 'quality-doubtful', 'the device itself calls this reading doubtful');
  }
  if (reading?.flags.includes('warmup'))
    return say('use-with-care', 'quality-doubtful', 'the device is warming up');
  const offsetMs = device?.clockOffsetMs ?? 0;
  if (Math.abs(offsetMs) > clockDoubtfulAfterMs) {
    const off = formatDuration(Math.abs(offsetMs) / 1000);
    return say('use-with-care', 'clock-doubtful', `its clock is ${off} ${offsetMs > 0 ? 'behind' : 'ahead'}`);
  }
  return null;
}

function fitByComparison({ lastCheck, timeZone }: TrustInput): Trust {
  if (!lastCheck) return say('use-with-care', 'never-compared', 'never compared with a reference solution');
  return say('fit', 'as-compared', `${errorText(lastCheck)} on ${formatDay(lastCheck.at, { timeZone })}`);
}
