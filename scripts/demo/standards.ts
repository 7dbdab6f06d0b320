import { Standard } from '../../server/db/models/index.ts';
import { dayOf, type Loading } from './loading.ts';

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
    };
    const row = await Standard.create({
      ...facts,
      code: lot.code,
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
