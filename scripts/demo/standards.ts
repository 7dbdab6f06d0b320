import { Standard } from '../../server/db/models/index.ts';
import { storeCertificate } from './certificates.ts';
import { dayOf, type Loading } from './loading.ts';

type Lot = Loading['history']['lots'][number];

/** What a producer's certificate says, on one page. */
const certificateLines = (lot: Lot): string[] => [
  lot.producer,
  `Certificate ${lot.certificateNumber}`,
  `${lot.product}, lot ${lot.code}`,
  `Conductivity at ${lot.referenceTemperatureC} C: ${lot.certifiedUsCm} uS/cm`,
  `Expanded uncertainty: ${lot.expandedUncertaintyPercent} %, k = ${lot.coverageFactor}`,
  ...(lot.temperatureTable ?? []).map((row) => `${row.temperatureC} C: ${row.conductivityUsCm} uS/cm`),
  lot.traceability,
  `Issued ${dayOf(lot.issuedAt)}, expires ${dayOf(lot.expiresAt)}. ${lot.storage}`,
  'An invented certificate of an invented producer, for the demonstration.',
];

export async function loadStandards(loading: Loading): Promise<void> {
  for (const lot of loading.history.lots) {
    const newest = lot.stateHistory.at(-1);
    const facts = {
      producer: lot.producer,
      product: lot.product,
      medium: lot.medium,
      basis: lot.basis,
      nominal: lot.nominal,
      certifiedConductivityUsCm: lot.certifiedUsCm,
      referenceTemperatureC: lot.referenceTemperatureC,
      expandedUncertaintyUsCm: Number(
        ((lot.certifiedUsCm * lot.expandedUncertaintyPercent) / 100).toPrecision(3),
      ),
      coverageFactor: lot.coverageFactor,
      temperatureTable: lot.temperatureTable,
      traceability: `${lot.traceability} Certificate ${lot.certificateNumber}.`,
      isInHouse: false,
      issuedOn: dayOf(lot.issuedAt),
      expiresOn: dayOf(lot.expiresAt),
      openedLifeDays: lot.openedLifeDays,
      storage: lot.storage,
      coverageProbabilityPercent: lot.coverageProbability * 100,
    };
    const certificateId = await storeCertificate(loading, {
      fileName: `${lot.code}-certificate.pdf`,
      lines: certificateLines(lot),
      at: lot.receivedAt,
    });
    const row = await Standard.create({
      ...facts,
      code: lot.code,
      certificateId,
      state: lot.state,
      stateReason: newest?.reason ?? null,
      stateChangedAt: new Date(newest?.at ?? lot.receivedAt),
      createdAt: new Date(lot.receivedAt),
      version: Math.max(lot.stateHistory.length - 1, 0),
    });
    loading.standards.set(lot.code, row.id);
    const entry = { objectKind: 'standards', objectId: row.id, siteId: null };
    loading.trail.push({
      ...entry,
      action: 'standards.created',
      newValue: { code: lot.code, ...facts },
      at: lot.receivedAt,
      by: 'tomas',
    });
    for (const [index, step] of lot.stateHistory.entries()) {
      const before = lot.stateHistory[index - 1]?.state ?? null;
      loading.trail.push({
        ...entry,
        action: 'standards.state-changed',
        objectVersion: index,
        oldValue: before && { state: before },
        newValue: { state: step.state },
        reason: step.reason,
        at: step.at,
        by: step.by,
      });
    }
  }
}
