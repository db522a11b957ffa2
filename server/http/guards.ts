import type { NextFunction, Request, RequestHandler, Response } from 'express';
import { hostName, isLoopback } from '../config';
import type { Context } from '../context';
import { Refusal } from './errors';

const READS = new Set(['GET', 'HEAD', 'OPTIONS']);

/** Refuses requests for a host that is not ours, so that no foreign name can be pointed at this server (DNS rebinding). */
export function demandKnownHost({ config }: Context): RequestHandler {
  return (request: Request, _response: Response, next: NextFunction) => {
    const host = request.headers.host ?? '';
    if (!isLoopback(host) && !config.publicHosts.includes(hostName(host)))
      throw new Refusal(
        'misdirected',
        'This server does not answer under that name. Open it by the address it printed, or set PUBLIC_HOST.',
      );
    next();
  };
}

/**
 * Refuses writes that another site's page sends with our cookie. Browsers say where a request comes from in Sec-Fetch-Site, older
 * ones in Origin; a request with neither is no browser's and carries no cookie it was not given by hand.
 */
export function demandOwnPage(): RequestHandler {
  return (request: Request, _response: Response, next: NextFunction) => {
    if (!READS.has(request.method) && !isOwnPage(request))
      throw new Refusal('foreign-page', 'This was sent from a page of another address. Open Redpoll itself and repeat the step there.');
    next();
  };
}

function isOwnPage(request: Request): boolean {
  const site = request.headers['sec-fetch-site'];
  if (site !== undefined) return site === 'same-origin' || site === 'none';
  const { origin, host } = request.headers;
  if (origin === undefined) return true;
  return URL.canParse(origin) && new URL(origin).host === host;
}
