import type { RequestHandler } from 'express';
import { AppError } from '../errors.ts';

/**
 * Refuses a change that another site's page asks for. Browsers say where a request comes from (Sec-Fetch-Site, and Origin in older
 * ones); the cookie's SameSite is the second bolt. Programs that say neither hold no cookie of somebody else's.
 */
export const refuseOtherSites: RequestHandler = (request, _response, next) => {
  if (['GET', 'HEAD', 'OPTIONS'].includes(request.method)) {
    next();
    return;
  }
  const site = request.get('Sec-Fetch-Site');
  const origin = request.get('Origin');
  const foreign =
    site === undefined
      ? origin !== undefined && hostOf(origin) !== request.get('Host')
      : !['same-origin', 'none'].includes(site);
  next(foreign ? new AppError('not-allowed', 'This request came from another site’s page.') : undefined);
};

function hostOf(origin: string): string | null {
  try {
    return new URL(origin).host;
  } catch {
    // "null": a page without an origin of its own
    return null;
  }
}
