/** An unusable lot is used only when somebody else, who may, answers for it with a password and a reason. */
import type { StartCalibration } from '../../../shared/contracts/calibrations.ts';
import { Probe, type Calibration } from '../../db/models/index.ts';
import { AppError } from '../../errors.ts';
import type { Actor } from '../../http/actor.ts';
import { may } from '../../http/authorise.ts';
import type { Parts } from '../../parts.ts';
import { confirmPerson, findActor } from '../sessions/service.ts';
import type { Means } from './means.ts';
import { calibrationPolicy } from './policy.ts';

export async function answerForUnusableLot(
  parts: Parts,
  actor: Actor,
  { unusable }: Means,
  { override, probeId }: StartCalibration,
): Promise<Calibration['override']> {
  if (unusable.length === 0) return null;
  const refuse = (more: string): AppError =>
    new AppError('calibrations.lot-unusable', { detail: [...unusable, more].join(' ').trim() });
  if (!override) throw refuse('');
  if (override.byUserId === actor.userId) throw refuse('Whoever performs the run cannot answer for it.');
  const other = await findActor(parts, override.byUserId, actor.source);
  const siteId = (await Probe.findByPk(probeId))?.siteId ?? null;
  if (!other || !may(calibrationPolicy, 'override', other, siteId))
    throw refuse('A manager of the site must answer for it.');
  if (!(await confirmPerson(parts, other.userId, override.password, actor.source)))
    throw new AppError('calibrations.password-wrong');
  return { byUserId: other.userId, by: other.name, reason: override.reason };
}
