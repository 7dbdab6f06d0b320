import { z } from 'zod';
import { idPath, listOf } from '../../../shared/contracts/common.ts';
import { issueProcedure, procedure, proceduresQuery } from '../../../shared/contracts/procedures.ts';
import { route, type AnyRoute } from '../../http/route.ts';
import { presentProcedure } from './presenter.ts';
import * as procedures from './service.ts';

export const procedureRoutes: AnyRoute[] = [
  route({
    verb: 'get',
    path: '/api/procedures',
    access: 'session',
    does: 'Lists the procedures in force, or every version.',
    query: proceduresQuery,
    answer: listOf(procedure),
    run: async ({ actor, query }) => {
      const { items, ...rest } = await procedures.listProcedures(actor, query);
      return { items: items.map((row) => presentProcedure(row, actor)), ...rest };
    },
  }),
  route({
    verb: 'get',
    path: '/api/procedures/:id',
    access: 'session',
    does: 'Shows one version of a procedure.',
    params: idPath,
    answer: procedure,
    run: async ({ actor, params }) =>
      presentProcedure(await procedures.readProcedure(actor, params.id), actor),
  }),
  route({
    verb: 'post',
    path: '/api/procedures/:code/versions',
    access: 'session',
    does: 'Issues the next version of a procedure; runs keep the version they began with.',
    params: z.object({ code: z.string().min(1).max(60) }),
    body: issueProcedure,
    answer: procedure,
    status: 201,
    run: async ({ parts, actor, params, body }) =>
      presentProcedure(await procedures.issueProcedure(parts, actor, params.code, body), actor),
  }),
];
