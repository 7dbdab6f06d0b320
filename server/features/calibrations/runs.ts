/** A run with everything that belongs to it, loaded whole; and the lock every change of it takes first. */
import { Op, type Transaction } from 'sequelize';
import {
  Area,
  Calibration,
  CalibrationStep,
  Capture,
  DeviceCommand,
  Signature,
} from '../../db/models/index.ts';
import { inTransaction, type OpenTransaction } from '../../db/transaction.ts';
import { AppError } from '../../errors.ts';
import type { Actor } from '../../http/actor.ts';
import { authorise } from '../../http/authorise.ts';
import type { Parts } from '../../parts.ts';
import type { RunStep } from '../../../shared/contracts/vocabulary.ts';
import { currentStepOf, stepsOfRun, type Decision } from './order.ts';
import { calibrationPolicy } from './policy.ts';

export const codes = { notFound: 'calibrations.not-found', forbidden: 'calibrations.forbidden' } as const;

type Loaded<K extends keyof Calibration> = Calibration & { [P in K]-?: NonNullable<Calibration[P]> };

export interface Run {
  row: Loaded<'probe' | 'point' | 'site' | 'procedure' | 'standard' | 'performer'>;
  areaName: string;
  /** Of the run itself; an amendment has those of the record it amends. */
  steps: CalibrationStep[];
  captures: Capture[];
  signatures: Signature[];
  command: DeviceCommand | null;
  amends: { id: number; number: string; recordHash: string; isInEffect: boolean } | null;
  amendedBy: { id: number; number: string } | null;
}

const whole = [
  'probe',
  'point',
  'site',
  'procedure',
  'standard',
  'bottle',
  'secondStandard',
  'thermometer',
  'performer',
].map((association) => ({ association }));

export async function loadRun(id: number, transaction: Transaction | null = null): Promise<Run | null> {
  const row = (await Calibration.findByPk(id, { include: whole, transaction })) as Run['row'] | null;
  if (!row) return null;
  const amended = await originalsOf(row, transaction);
  const evidenceId = amended.at(-1)?.id ?? row.id;
  const chainIds = [row.id, ...amended.map((original) => original.id)];
  const where = { calibrationId: evidenceId };
  const area = await Area.findByPk(row.point.areaId, { transaction });
  const steps = await CalibrationStep.findAll({ where, include: ['user'], order: ['id'], transaction });
  const captures = await Capture.findAll({
    where,
    include: [{ association: 'exclusion', include: [{ association: 'user' }] }],
    order: ['id'],
    transaction,
  });
  const [original] = amended;
  return {
    row,
    areaName: area?.name ?? '',
    steps,
    captures,
    ...(row.signedAt === null ? unsigned : await loadAftermath(row.id, chainIds, transaction)),
    amends: original
      ? {
          id: original.id,
          number: original.number!,
          recordHash: original.recordHash!,
          isInEffect: amended.some(({ effectiveAt }) => effectiveAt !== null),
        }
      : null,
  };
}

type Aftermath = Pick<Run, 'signatures' | 'command' | 'amendedBy'>;
const unsigned: Aftermath = { signatures: [], command: null, amendedBy: null };

async function loadAftermath(
  id: number,
  chainIds: readonly number[],
  transaction: Transaction | null,
): Promise<Aftermath> {
  const where = { calibrationId: id };
  const signatures = await Signature.findAll({ where, order: ['id'], transaction });
  const command = await DeviceCommand.findOne({
    where: { calibrationId: { [Op.in]: [...chainIds] } },
    order: [['id', 'DESC']],
    transaction,
  });
  const later = await Calibration.findOne({ where: { amendsId: id }, transaction });
  return { signatures, command, amendedBy: later && { id: later.id, number: later.number! } };
}

/** The records an amendment goes back to, the one it amends first. */
async function originalsOf(row: Calibration, transaction: Transaction | null): Promise<Calibration[]> {
  const originals: Calibration[] = [];
  let next = row.amendsId;
  while (next !== null) {
    const original: Calibration | null = await Calibration.findByPk(next, { transaction });
    if (!original) break;
    originals.push(original);
    next = original.amendsId;
  }
  return originals;
}

export const stepDone = (run: Run, step: RunStep): CalibrationStep | undefined =>
  run.steps.find((done) => done.step === step);

export function decisionOf(run: Run): Decision | null {
  return (stepDone(run, 'decide')?.data['decision'] as Decision | undefined) ?? null;
}

export const finishedOf = (run: Run): Set<RunStep> => new Set(run.steps.map(({ step }) => step));

export const currentStep = (run: Run): RunStep | null =>
  run.row.status === 'running'
    ? currentStepOf(stepsOfRun(run.row.procedure.steps, decisionOf(run)), finishedOf(run))
    : null;

/** Locks first, then reads: what is decided on is what is committed. */
export async function lockRun(
  transaction: OpenTransaction,
  actor: Actor,
  action: keyof typeof calibrationPolicy,
  id: number,
): Promise<Run> {
  const locked = await Calibration.findByPk(id, { transaction, lock: transaction.LOCK.UPDATE });
  if (!locked) throw new AppError('calibrations.not-found');
  authorise(calibrationPolicy, action, actor, locked.siteId, codes);
  return (await loadRun(id, transaction))!;
}

/** Only the person who performs it goes on with a run, and only while it runs. */
export function requirePerforming(run: Run, actor: Actor): void {
  if (run.row.status !== 'running') throw new AppError('calibrations.not-running');
  if (run.row.performerId !== actor.userId)
    throw new AppError('calibrations.not-performer', { detail: `${run.row.performer.name} performs it.` });
}

export async function readRun(actor: Actor, id: number): Promise<Run> {
  const run = await loadRun(id);
  if (!run) throw new AppError('calibrations.not-found');
  authorise(calibrationPolicy, 'read', actor, run.row.siteId, codes);
  return run;
}

export type Told = 'probes' | 'points' | 'readings' | 'checks' | 'bottles' | 'prompts';

/** Tells the site's people after commit what to read again. */
export function announce(
  parts: Parts,
  transaction: OpenTransaction,
  run: { id: number; siteId: number; probeId: number; pointId: number },
  kind: 'created' | 'changed',
  others: readonly Told[] = [],
): void {
  transaction.afterCommit(() => {
    parts.broadcast.changed({ slice: 'calibrations', id: run.id, kind }, run.siteId);
    for (const slice of others) {
      const id = slice === 'points' ? run.pointId : run.probeId;
      parts.broadcast.changed({ slice, id, kind: 'changed' }, run.siteId);
    }
  });
}

/** One change of a run: locked, done, and read again for the answer. */
export async function changeRun(
  parts: Parts,
  actor: Actor,
  action: keyof typeof calibrationPolicy,
  id: number,
  work: (transaction: OpenTransaction, run: Run) => Promise<void>,
): Promise<Run> {
  await inTransaction(parts.sequelize, async (transaction) => {
    await work(transaction, await lockRun(transaction, actor, action, id));
  });
  return readRun(actor, id);
}

/** A phone's clock may be a little ahead of ours, and a run was started before its steps. */
const clockSlackMs = 10 * 60_000;

export function momentOf(parts: Parts, capturedAt: string, notBefore: Date | null = null): Date {
  const at = new Date(capturedAt);
  const now = parts.clock.now().getTime();
  const earliest = notBefore === null ? -Infinity : notBefore.getTime() - clockSlackMs;
  if (at.getTime() <= now + clockSlackMs && at.getTime() >= earliest) return at;
  throw new AppError('request.invalid', {
    issues: [
      {
        path: 'capturedAt',
        message: 'The time lies in the future or before the run began. Check the clock of the phone.',
      },
    ],
  });
}
