import type { Instrument, InstrumentUse } from '../../../shared/contracts/instruments.ts';
import type { Actor } from '../../http/actor.ts';
import { maySomewhere } from '../../http/authorise.ts';
import { certificatePolicy } from '../certificates/policy.ts';
import { presentCertificate } from '../certificates/presenter.ts';
import { instrumentPolicy } from './policy.ts';
import type { InstrumentRow, InstrumentUseRow } from './queries.ts';

/** `today` is the civil day in UTC; the due day itself still counts. */
export const isInstrumentUsable = (row: Pick<InstrumentRow, 'state' | 'dueOn'>, today: string): boolean =>
  row.state === 'in-use' && row.dueOn >= today;

export function presentInstrument(row: InstrumentRow, actor: Actor, today: string): Instrument {
  const mayChange = maySomewhere(instrumentPolicy, 'change', actor);
  return {
    ...row,
    certificate: row.certificate && presentCertificate(row.certificate),
    isUsable: isInstrumentUsable(row, today),
    can: {
      change: mayChange,
      uploadCertificate: mayChange && maySomewhere(certificatePolicy, 'upload', actor),
    },
  };
}

export const presentInstrumentUse = ({ startedAt, ...row }: InstrumentUseRow): InstrumentUse => ({
  ...row,
  startedAt: startedAt.toISOString(),
});
