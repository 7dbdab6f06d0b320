import type { NextFunction, Request, Response } from 'express';
import { errorCodes, errorKinds, type ErrorCode } from '../../shared/contracts/errors.ts';
import type { Problem } from '../../shared/contracts/common.ts';
import { AppError } from '../errors.ts';
import type { Parts } from '../parts.ts';

/** Which of our codes an error from a library means. */
function codeOf(error: unknown): ErrorCode {
  const { type, name } = error as { type?: string; name?: string };
  if (type === 'entity.parse.failed' || type === 'encoding.unsupported' || type === 'charset.unsupported')
    return 'request.unparsable';
  if (type === 'entity.too.large') return 'request.too-large';
  if (error instanceof URIError) return 'request.not-found';
  if (name?.startsWith('SequelizeConnection') || name === 'SequelizeHostNotReachableError')
    return 'request.unavailable';
  return 'request.internal';
}

export function toProblem(error: unknown, requestId: string): Problem {
  const code = error instanceof AppError ? error.code : codeOf(error);
  const [kind, sentence] = errorCodes[code];
  const more = error instanceof AppError ? { detail: error.detail, issues: error.issues } : {};
  return { type: 'about:blank', title: sentence, status: errorKinds[kind], code, requestId, ...more };
}

/** The last middleware: RFC 9457 problem details for everything that was thrown. */
export function errorHandler(parts: Parts) {
  return (error: unknown, request: Request, response: Response, next: NextFunction): void => {
    if (response.headersSent) return next(error);
    const requestId = String(request.id);
    const answer = toProblem(error, requestId);
    if (answer.status >= errorKinds.internal) parts.log.error({ err: error, requestId }, answer.code);
    response.status(answer.status).type('application/problem+json').send(JSON.stringify(answer));
  };
}
