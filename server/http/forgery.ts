import type { NextFunction, Request, Response } from 'express';
import { certificateMediaTypes } from '../../shared/contracts/certificates.ts';
import { AppError } from '../errors.ts';

const safeMethods = new Set(['GET', 'HEAD', 'OPTIONS']);

/** A file is no JSON. These types need a preflight too, so that a cross-site form cannot send them either. */
const uploads: Readonly<Record<string, readonly string[]>> = { '/api/certificates': certificateMediaTypes };

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
  const types = uploads[request.baseUrl + request.path.replace(/\/$/, '')] ?? ['application/json'];
  if (hasBody && !request.is([...types])) throw new AppError('request.unparsable');
  next();
}

function isOwnOrigin(origin: string, request: Request): boolean {
  try {
    return new URL(origin).host === request.get('host');
  } catch {
    return false;
  }
}
