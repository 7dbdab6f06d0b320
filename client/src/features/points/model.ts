import type { Point } from '../../../../shared/contracts/points.ts';
import { capitalise, DISPLAY_UNIT_LABELS } from '../../../../shared/format/labels.ts';
import { formatConductivity, formatCount, formatNumber } from '../../../../shared/format/numbers.ts';

/** The models by their bare names, for a choice whose hint says the rest. */
export const COMPENSATION_NAMES: Readonly<Record<Point['compensationModel'], string>> = {
  none: 'none',
  linear: 'linear',
  'natural-water': 'natural water',
  ultrapure: 'ultrapure water',
};

type Limits = Pick<Point, 'lowLimitUsCm' | 'highLimitUsCm' | 'displayUnit'>;

/** The limits of a reading in the point's own unit: `at most 500 µS/cm`, `50 to 500 µS/cm`, or none. */
export function limitWords({ lowLimitUsCm: low, highLimitUsCm: high, displayUnit }: Limits): string | null {
  const unit = DISPLAY_UNIT_LABELS[displayUnit];
  const text = (conductivityUsCm: number) => {
    const value = unit === 'mS/cm' ? conductivityUsCm / 1000 : conductivityUsCm;
    return formatNumber(value);
  };
  if (low !== null && high !== null) return `${text(low)} to ${text(high)} ${unit}`;
  if (high !== null) return `at most ${text(high)} ${unit}`;
  if (low !== null) return `at least ${text(low)} ${unit}`;
  return null;
}

/** How a raw reading is taken to its reference temperature, with the figures that belong to it. */
export function compensationWords(
  point: Pick<Point, 'compensationModel' | 'compensationCoefficientPercentPerK' | 'referenceTemperatureC'>,
): string {
  const reference = formatNumber(point.referenceTemperatureC, { unit: '°C' });
  switch (point.compensationModel) {
    case 'none':
      return 'none: the value stays at its own temperature';
    case 'linear':
      return `linear, ${formatNumber(point.compensationCoefficientPercentPerK, { unit: '%/K' })}, to ${reference}`;
    case 'natural-water':
      return `natural water, to ${reference}`;
    case 'ultrapure':
      return `ultrapure water, to ${reference}`;
  }
}

export interface PointListFilters {
  free?: '1' | undefined;
  retired?: '1' | undefined;
  q?: string | undefined;
}

/** The situation of the list of points in a sentence. */
export function pointsSentence(total: number, filters: PointListFilters, siteName: string | null): string {
  const where = siteName ? `at ${siteName}` : 'at all your sites';
  const what = filters.free ? 'without a probe' : filters.retired ? 'with the retired ones' : null;
  const search = filters.q ? `with “${filters.q}” in name, code, area or probe` : null;
  const opening = total === 0 ? 'No measuring point' : capitalise(formatCount(total, 'measuring point'));
  return [`${opening} ${where}`, what, search].filter(Boolean).join(', ') + '.';
}

/** A limit as the field's hint shows it in the larger unit, once it is large. */
export function largerUnit(conductivityUsCm: number | null): string | undefined {
  if (conductivityUsCm === null || Number.isNaN(conductivityUsCm) || conductivityUsCm < 10_000)
    return undefined;
  return `= ${formatConductivity({ conductivityUsCm, unit: 'mS/cm' }).text}`;
}
