/** Pure: a stored lot as the science takes it. The columns' constraints hold exactly what its types name. */
import type { CertifiedLot } from '../../../shared/science/certified-lots.ts';
import type { Standard } from '../../db/models/index.ts';

export const lotOf = (row: Standard): CertifiedLot => ({
  medium: row.medium,
  basis: row.basis,
  nominal: row.nominal as CertifiedLot['nominal'],
  certifiedConductivityUsCm: row.certifiedConductivityUsCm,
  referenceTemperatureC: row.referenceTemperatureC,
  expandedUncertaintyUsCm: row.expandedUncertaintyUsCm,
  coverageFactor: row.coverageFactor,
  temperatureTable: row.temperatureTable as CertifiedLot['temperatureTable'],
});
