import type { Notice as View } from '../../../shared/contracts/notices.ts';
import type { Notice } from '../../db/models/index.ts';
import type { Actor } from '../../http/actor.ts';
import { may } from '../../http/authorise.ts';
import { noticePolicy } from './policy.ts';

const sentences: Record<View['kind'], string> = {
  'reading-content-differs': 'The same reading arrived twice with different content. The first is kept.',
  'cell-constant-without-record': 'The cell constant in the transmitter changed and no record asked for it.',
  'device-replaced': 'Two connections claim to be this device and push each other out.',
};

export const presentNotice = (row: Notice, actor: Actor): View => ({
  id: row.id,
  kind: row.kind,
  at: row.at.toISOString(),
  deviceName: row.device?.name ?? null,
  probeId: row.probeId,
  probeTag: row.probe?.tag ?? null,
  text: sentences[row.kind],
  closedAt: row.closedAt?.toISOString() ?? null,
  can: { close: row.closedAt === null && may(noticePolicy, 'close', actor, row.probe?.siteId ?? null) },
});
