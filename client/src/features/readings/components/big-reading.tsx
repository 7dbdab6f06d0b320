import type { JudgedReading, Trust } from '../../../../../shared/contracts/readings.ts';
import { formatDuration } from '../../../../../shared/format/dates.ts';
import { CONTEXT_LABELS, DISPLAY_UNIT_LABELS } from '../../../../../shared/format/labels.ts';
import { formatConductivity, formatNumber, NO_VALUE } from '../../../../../shared/format/numbers.ts';
import type { DisplayUnit } from '../../../../../shared/contracts/vocabulary.ts';
import { useChangeMark } from '../../../components/ui/figure.tsx';
import { useNow } from '../../../components/ui/time.tsx';
import { useLatestReading } from '../../../lib/live-readings.ts';
import { readingNow } from '../live-row.ts';

export interface BigReadingProps {
  probeId: number;
  reading: JudgedReading | null;
  trust: Trust;
  isHeld: boolean;
  /** Of the point the probe stands at; null while it stands nowhere. */
  point: { displayUnit: DisplayUnit; referenceTemperatureC: number; compensationModel: string } | null;
}

/** The reading of one probe, large, with what it is made of under it. */
export function BigReading({ probeId, reading: fetched, trust, isHeld, point }: BigReadingProps) {
  const latest = useLatestReading(probeId);
  const now = useNow();
  const reading = readingNow({ reading: fetched }, latest);
  const unit = point ? DISPLAY_UNIT_LABELS[point.displayUnit] : undefined;
  const isGone = trust.level === 'no-signal';
  const conductivityUsCm = point ? reading?.valueUsCm : reading?.conductivityUsCm;
  const value = formatConductivity({
    conductivityUsCm: isGone ? null : conductivityUsCm,
    expandedUncertaintyUsCm: reading?.expandedUncertaintyUsCm ?? null,
    ...(unit ? { unit } : {}),
  });
  const mark = useChangeMark(value.value, true);
  const isUsable = trust.level === 'fit' || trust.level === 'use-with-care';
  const isStruck = trust.level === 'do-not-use' && !isHeld && trust.reason !== 'not-in-process';
  return (
    <>
      <p className="big-reading">
        <b ref={mark} className={isStruck ? 'is-struck' : isUsable ? undefined : 'is-faint'}>
          {value.value}
        </b>
        <span>
          {isUsable && value.uncertainty ? `± ${value.uncertainty} ` : ''}
          {value.unit}
        </span>
      </p>
      <p className="probe-meta">{reading ? basisWords(reading, point, unit, now) : 'never heard'}</p>
    </>
  );
}

function basisWords(
  reading: NonNullable<ReturnType<typeof readingNow>>,
  point: BigReadingProps['point'],
  unit: 'µS/cm' | 'mS/cm' | undefined,
  now: number,
): string {
  const raw = formatConductivity({ conductivityUsCm: reading.conductivityUsCm, ...(unit ? { unit } : {}) });
  const temperature = formatNumber(reading.temperatureC, { decimals: 1, unit: '°C' });
  const age = `${formatDuration((now - Date.parse(reading.at)) / 1000)} ago`;
  const where = reading.context === 'process' ? null : CONTEXT_LABELS[reading.context];
  const at =
    !point || point.compensationModel === 'none'
      ? `as measured at ${temperature}`
      : `at ${formatNumber(point.referenceTemperatureC, { unit: '°C' })} · raw ${raw.value === NO_VALUE ? NO_VALUE : raw.text} at ${temperature}`;
  return [at, where, age].filter(Boolean).join(' · ');
}
