import type { RequestHandler } from 'express';
import { Problem } from '../db/problem.ts';

const harmless = new Set(['GET', 'HEAD', 'OPTIONS']);

/** Refuses writes that another site makes a browser send. A script without a browser sends neither header. */
export function requireSameOrigin(publicAddress: string): RequestHandler {
  const own = new URL(publicAddress).origin;
  return (request, _response, next) => {
    if (harmless.has(request.method)) return next();
    const site = request.get('sec-fetch-site');
    const origin = request.get('origin');
    const isForeign = site !== undefined && site !== 'same-origin' && site !== 'none';
    // The Host header is what the browser itself asked for, so a second name of this machine is no stranger.
    const isOther = origin !== undefined && origin !== own && origin !== `${request.protocol}://${request.get('host')}`;
    if (isForeign || isOther) throw new Problem('not allowed', 'This came from another site and was not carried out.');
    next();
  };
}
