import type { NextFunction, Request, Response } from 'express';
import { DomainError } from '../errors.js';

const safe = new Set(['GET', 'HEAD', 'OPTIONS']);

/**
 * Refuses a state-changing request that another site’s page makes: browsers tell in Sec-Fetch-Site or Origin. Programs send
 * neither, and hold no cookies that a page could use.
 */
export function sameOrigin(request: Request, _response: Response, next: NextFunction): void {
  if (safe.has(request.method)) {
    next();
    return;
  }
  const site = request.get('sec-fetch-site');
  const origin = request.get('origin');
  const foreignSite = site !== undefined && site !== 'same-origin' && site !== 'none';
  let foreignOrigin = false;
  if (origin !== undefined) {
    try {
      foreignOrigin = new URL(origin).host !== request.get('host');
    } catch {
      foreignOrigin = true;
    }
  }
  if (foreignSite || foreignOrigin) throw new DomainError(403, 'foreign-origin', 'This request came from another site');
  const length = request.get('content-length');
  const hasBody = request.get('transfer-encoding') !== undefined || (length !== undefined && length !== '0');
  if (hasBody && !request.is('application/json')) {
    throw new DomainError(415, 'not-json', 'Send the body as application/json');
  }
  next();
}
