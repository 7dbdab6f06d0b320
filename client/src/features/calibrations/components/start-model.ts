import type { Instrument } from '../../../../../shared/contracts/instruments.ts';
import type { ProbeRow } from '../../../../../shared/contracts/probes.ts';
import type { Standard } from '../../../../../shared/contracts/standards.ts';

export interface StartDraft {
  standardId: number | null;
  bottleId: number | null;
  /** As scanned, until the bottles of its lot are known. */
  bottleCode: string | null;
  secondStandardId: number | null;
  thermometerId: number | null;
}

/** Lots the probe can read, usable ones first, fullest validity first. */
export function fittingLots(
  lots: readonly Standard[],
  probe: Pick<ProbeRow, 'rangeLowUsCm' | 'rangeHighUsCm'>,
): Standard[] {
  return lots
    .filter((lot) => {
      const value = lot.certifiedConductivityUsCm;
      return value === null || (value >= probe.rangeLowUsCm && value <= probe.rangeHighUsCm);
    })
    .toSorted((a, b) => Number(b.isUsable) - Number(a.isUsable) || (a.expiresOn < b.expiresOn ? -1 : 1));
}

/** What was used last time, as far as it may still be used; the second lot is another one at another level. */
export function firstChoice(
  fitting: readonly Standard[],
  thermometers: readonly Instrument[],
  lastLotCode: string | null,
): StartDraft {
  const usable = fitting.filter((lot) => lot.isUsable);
  const first = usable.find((lot) => lot.code === lastLotCode) ?? usable[0] ?? null;
  const others = usable.filter((lot) => lot.id !== first?.id);
  const level = (lot: Standard) => `${lot.basis}/${lot.nominal ?? lot.certifiedConductivityUsCm}`;
  const second = others.find((lot) => first && level(lot) !== level(first)) ?? others[0] ?? null;
  return {
    standardId: first?.id ?? null,
    bottleId: null,
    bottleCode: null,
    secondStandardId: second?.id ?? null,
    thermometerId: finest(thermometers)?.id ?? null,
  };
}

function finest(thermometers: readonly Instrument[]): Instrument | null {
  return thermometers.toSorted((a, b) => a.expandedUncertainty - b.expandedUncertainty)[0] ?? null;
}
