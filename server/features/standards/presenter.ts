import { kclStandardLabel, type KclNominal } from '../../../shared/science/kcl-standards.ts';
import { formatNumber } from '../../../shared/format/numbers.ts';
import type { Standard } from '../../../shared/contracts/standards.ts';
import { certificatePolicy } from '../certificates/policy.ts';
import { presentCertificate } from '../certificates/presenter.ts';
import { bottlePolicy } from '../bottles/policy.ts';
import type { Actor } from '../../http/actor.ts';
import { maySomewhere } from '../../http/authorise.ts';
import { standardPolicy } from './policy.ts';
import type { StandardRow } from './queries.ts';

export type LotFacts = Pick<
  StandardRow,
  'basis' | 'nominal' | 'product' | 'certifiedConductivityUsCm' | 'referenceTemperatureC' | 'isInHouse'
>;

/**
 * Basis and value together: "0.01" alone means three solutions that differ by 0.3 %. A value found in house is never
 * called certified.
 */
export function labelOfLot(row: LotFacts): string {
  const certified = row.certifiedConductivityUsCm;
  const value =
    certified === null
      ? null
      : `${formatNumber(certified, { unit: 'µS/cm' })} at ${formatNumber(row.referenceTemperatureC, { unit: '°C' })}`;
  if (row.basis === 'other' || row.nominal === null)
    return value === null ? row.product : `${row.product}, ${value}`;
  const kcl = kclStandardLabel({ basis: row.basis, nominal: row.nominal as KclNominal });
  return value === null
    ? kcl
    : `${kcl.split(',')[0]}, ${row.isInHouse ? 'in-house value' : 'certified'} ${value}`;
}

/** `today` is the civil day in UTC: a lot may be used up to and including its last day. */
export function presentStandard(row: StandardRow, actor: Actor, today: string): Standard {
  const isExpired = row.expiresOn < today;
  const isRecalled = row.state === 'recalled';
  const isUsable = row.state === 'released' && !isExpired;
  const mayAttach =
    maySomewhere(standardPolicy, 'attachCertificate', actor) &&
    maySomewhere(certificatePolicy, 'upload', actor);
  return {
    id: row.id,
    code: row.code,
    label: labelOfLot(row),
    producer: row.producer,
    product: row.product,
    medium: row.medium,
    basis: row.basis,
    nominal: row.nominal,
    certifiedConductivityUsCm: row.certifiedConductivityUsCm,
    referenceTemperatureC: row.referenceTemperatureC,
    expandedUncertaintyUsCm: row.expandedUncertaintyUsCm,
    coverageFactor: row.coverageFactor,
    coverageProbabilityPercent: row.coverageProbabilityPercent,
    temperatureTable: row.temperatureTable,
    traceability: row.traceability,
    isInHouse: row.isInHouse,
    issuedOn: row.issuedOn,
    expiresOn: row.expiresOn,
    openedLifeDays: row.openedLifeDays,
    storage: row.storage,
    state: row.state,
    stateReason: row.stateReason,
    stateChangedAt: row.stateChangedAt.toISOString(),
    isExpired,
    isUsable,
    checkCount: row.checkCount,
    certificate: row.certificate && presentCertificate(row.certificate),
    preparation: row.preparation,
    version: row.version,
    can: {
      release: row.state === 'quarantined' && maySomewhere(standardPolicy, 'release', actor),
      quarantine: row.state === 'released' && maySomewhere(standardPolicy, 'quarantine', actor),
      recall: !isRecalled && maySomewhere(standardPolicy, 'recall', actor),
      attachCertificate: mayAttach,
      receiveBottles: !isRecalled && !isExpired && maySomewhere(bottlePolicy, 'receive', actor),
      dilute: isUsable && row.medium === 'kcl-aqueous' && maySomewhere(standardPolicy, 'prepare', actor),
    },
  };
}
