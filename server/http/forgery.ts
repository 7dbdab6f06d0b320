import type { NextFunction, Request, Response } from 'express';
import { AppError } from '../errors.ts';

const safeMethods = new Set(['GET', 'HEAD', 'OPTIONS']);

/**
 * Request-forgery protection for cookie sessions: a browser always says where a write comes from
 * (Sec-Fetch-Site, Origin), and a cross-site form cannot send application/json without a preflight
 * that we never grant (OWASP CSRF Prevention Cheat Sheet, "Fetch Metadata" and "Custom request headers").
 * Together with the SameSite cookie; a script without a browser sends neither header and passes.
 */
export function refuseForgery(request: Request, _response: Response, next: NextFunction): void {
  if (safeMethods.has(request.method)) return next();
  const site = request.get('sec-fetch-site');
  if (site && site !== 'same-origin' && site !== 'none') throw new AppError('request.forgery-suspected');
  const origin = request.get('origin');
  if (origin && !isOwnOrigin(origin, request)) throw new AppError('request.forgery-suspected');
  const hasBody =
    Number(request.get('content-length') ?? 0) > 0 || request.get('transfer-encoding') !== undefined;
  if (hasBody && !request.is('application/json')) throw new AppError('request.unparsable');
  next();
}

function isOwnOrigin(origin: string, request: Request): boolean {
  try {
    return new URL(origin).host === request.get('host');
  } catch {
    return false;
  }
}
