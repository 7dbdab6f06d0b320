import { kclStandardLabel, type KclNominal } from '../../../shared/science/kcl-standards.ts';
import { formatNumber } from '../../../shared/format/numbers.ts';
import type { Standard } from '../../../shared/contracts/standards.ts';
import type { Actor } from '../../http/actor.ts';
import { maySomewhere } from '../../http/authorise.ts';
import { standardPolicy } from './policy.ts';
import type { StandardRow } from './queries.ts';

/** Basis and value together: "0.01" alone means three solutions that differ by 0.3 %. */
export function labelOfLot(
  row: Pick<
    StandardRow,
    'basis' | 'nominal' | 'product' | 'certifiedConductivityUsCm' | 'referenceTemperatureC'
  >,
): string {
  const certified = row.certifiedConductivityUsCm;
  const value =
    certified === null
      ? null
      : `${formatNumber(certified, { unit: 'µS/cm' })} at ${formatNumber(row.referenceTemperatureC, { unit: '°C' })}`;
  if (row.basis === 'other' || row.nominal === null)
    return value === null ? row.product : `${row.product}, ${value}`;
  const kcl = kclStandardLabel({ basis: row.basis, nominal: row.nominal as KclNominal });
  return value === null ? kcl : `${kcl.split(',')[0]}, certified ${value}`;
}

/** `today` is the civil day in UTC: a lot may be used up to and including its last day. */
export function presentStandard(row: StandardRow, actor: Actor, today: string): Standard {
  const isExpired = row.expiresOn < today;
  const isRecalled = row.state === 'recalled';
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
    temperatureTable: row.temperatureTable,
    traceability: row.traceability,
    isInHouse: row.isInHouse,
    issuedOn: row.issuedOn,
    expiresOn: row.expiresOn,
    state: row.state,
    stateReason: row.stateReason,
    stateChangedAt: row.stateChangedAt.toISOString(),
    isExpired,
    isUsable: row.state === 'released' && !isExpired,
    checkCount: row.checkCount,
    version: row.version,
    can: {
      release: row.state === 'quarantined' && maySomewhere(standardPolicy, 'release', actor),
      quarantine: row.state === 'released' && maySomewhere(standardPolicy, 'quarantine', actor),
      recall: !isRecalled && maySomewhere(standardPolicy, 'recall', actor),
    },
  };
}
