import { type RequestHandler } from 'express';
import { NotAllowed } from './errors';

const safe = new Set(['GET', 'HEAD', 'OPTIONS']);

/**
 * Tells our own pages from foreign ones before anything is read. The header cannot be set across sites without a
 * preflight, which we never answer; Origin and Sec-Fetch-Site are checked where a browser sends them.
 */
export function originCheck(publicUrl: string): RequestHandler {
  const ours = new URL(publicUrl).origin;
  return (request, _response, next) => {
    if (safe.has(request.method)) return next();
    const own = `${request.protocol}://${request.get('host')}`;
    const origin = request.get('origin');
    const site = request.get('sec-fetch-site');
    const header = request.get('x-quartzhold') === '1';
    const sameOrigin = origin === undefined || origin === ours || origin === own;
    const sameSite = site === undefined || site === 'same-origin' || site === 'none';
    if (header && sameOrigin && sameSite) return next();
    throw new NotAllowed(
      header
        ? 'This request came from another site and was refused. Open Quartzhold itself and try again.'
        : 'Requests that change something must carry the header "X-Quartzhold: 1".',
      'request.foreign',
    );
  };
}
