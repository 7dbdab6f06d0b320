import type { Express, NextFunction, Request, Response } from 'express';
import { AppError } from '../errors.ts';
import type { Parts } from '../parts.ts';
import { actorOf } from './authenticate.ts';
import { readBytes, sendBytes } from './bytes.ts';
import type { AnyRoute, ByteAnswer } from './route.ts';
import { parsePart } from './validate.ts';

/** Mounts a slice's table. Thrown errors go on to the one error handler. */
export function mountRoutes(app: Express, parts: Parts, routes: readonly AnyRoute[]): void {
  for (const spec of routes) {
    app[spec.verb](spec.path, async (request: Request, response: Response, _next: NextFunction) => {
      const actor = await actorOf(parts, request);
      if (spec.access === 'session' && actor === null) throw new AppError('sessions.required');
      if (spec.bytes) await readBytes(request, response, spec.bytes);
      const call = {
        parts,
        actor,
        params: parsePart(spec.params, request.params, 'path'),
        query: parsePart(spec.query, request.query, 'query'),
        body: parsePart(spec.body, request.body, 'body'),
        request,
        response,
      };
      const answer: unknown = await spec.run(call as never);
      if (spec.sends) return sendBytes(response, answer as ByteAnswer);
      if (!spec.answer) return void response.status(204).end();
      if (parts.config.checkAnswers) spec.answer.parse(answer);
      if (spec.status) response.status(spec.status);
      response.json(answer);
    });
  }
}
