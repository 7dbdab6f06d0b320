import type { Bottle } from '../../../../../shared/contracts/bottles.ts';
import type { Instrument } from '../../../../../shared/contracts/instruments.ts';
import type { Probe } from '../../../../../shared/contracts/probes.ts';
import type { Standard } from '../../../../../shared/contracts/standards.ts';

export interface StartDraft {
  standardId: number | null;
  bottleId: number | null;
  secondStandardId: number | null;
  thermometerId: number | null;
}

type Range = Pick<Probe, 'rangeLowUsCm' | 'rangeHighUsCm'>;

/** Lots the probe can read, usable ones first, the longest valid first. */
export function fittingLots(lots: readonly Standard[], probe: Range): Standard[] {
  return lots
    .filter((lot) => {
      const value = lot.certifiedConductivityUsCm;
      return value === null || (value >= probe.rangeLowUsCm && value <= probe.rangeHighUsCm);
    })
    .toSorted((a, b) => Number(b.isUsable) - Number(a.isUsable) || (a.expiresOn > b.expiresOn ? -1 : 1));
}

export interface Circumstances {
  fitting: readonly Standard[];
  bottles: readonly Bottle[];
  thermometers: readonly Instrument[];
  lastLotCode: string | null;
  /** What the probe reads at work, raw; null when that is not known. */
  workingUsCm: number | null;
}

/**
 * What was used last time, as far as it may still be used; else the lot with a bottle at hand that is nearest to what
 * the probe reads at work. The second lot is another one, at another level where there is one.
 */
export function firstChoice(given: Circumstances): StartDraft {
  const { fitting, bottles, thermometers, lastLotCode, workingUsCm } = given;
  const byNearness = fitting
    .filter((lot) => lot.isUsable)
    .toSorted((a, b) => distance(a, workingUsCm) - distance(b, workingUsCm));
  const first =
    byNearness.find((lot) => lot.code === lastLotCode) ??
    byNearness.find((lot) => bottles.some((bottle) => bottle.standardId === lot.id)) ??
    byNearness[0] ??
    null;
  const others = byNearness.filter((lot) => lot.id !== first?.id);
  const second = others.find((lot) => first && levelOf(lot) !== levelOf(first)) ?? others[0] ?? null;
  return {
    standardId: first?.id ?? null,
    bottleId: bottles.find((bottle) => bottle.standardId === first?.id)?.id ?? null,
    secondStandardId: second?.id ?? null,
    thermometerId: finest(thermometers)?.id ?? null,
  };
}

const levelOf = (lot: Standard): number | null => lot.certifiedConductivityUsCm ?? lot.nominal;

/** Decades between a lot and the working value. */
function distance(lot: Standard, workingUsCm: number | null): number {
  const value = lot.certifiedConductivityUsCm;
  if (value === null || value <= 0 || workingUsCm === null || workingUsCm <= 0) return Infinity;
  return Math.abs(Math.log10(value / workingUsCm));
}

function finest(thermometers: readonly Instrument[]): Instrument | null {
  return thermometers.toSorted((a, b) => a.expandedUncertainty - b.expandedUncertainty)[0] ?? null;
}
