import { rateLimit } from 'express-rate-limit';
import type { RequestHandler } from 'express';
import type { ErrorCode } from '../../shared/contracts/errors.ts';
import { AppError } from '../errors.ts';

/** Counts per address and per process; the lock per person stands in the database. */
export const limitRequests = (
  code: ErrorCode,
  perWindow: number,
  windowMinutes: number,
  counts?: (status: number) => boolean,
): RequestHandler =>
  rateLimit({
    windowMs: windowMinutes * 60_000,
    limit: perWindow,
    standardHeaders: 'draft-7',
    legacyHeaders: false,
    skipSuccessfulRequests: counts !== undefined,
    requestWasSuccessful: (_request, response) => !(counts?.(response.statusCode) ?? false),
    handler: (_request, _response, next) => next(new AppError(code)),
  });
