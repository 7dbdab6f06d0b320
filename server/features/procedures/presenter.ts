import type { Procedure as ProcedureView } from '../../../shared/contracts/procedures.ts';
import type { Procedure } from '../../db/models/index.ts';
import type { Actor } from '../../http/actor.ts';
import { may } from '../../http/authorise.ts';
import { procedurePolicy } from './policy.ts';

export const presentProcedure = (row: Procedure, actor: Actor): ProcedureView => ({
  id: row.id,
  code: row.code,
  name: row.name,
  version: row.version,
  probeKinds: row.probeKinds,
  steps: row.steps,
  criteria: row.criteria,
  effectiveFrom: row.effectiveFrom.toISOString(),
  replacedAt: row.replacedAt?.toISOString() ?? null,
  changeReason: row.changeReason,
  can: { change: row.replacedAt === null && may(procedurePolicy, 'issue', actor, null) },
});
