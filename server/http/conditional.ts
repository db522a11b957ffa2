import type { Request } from 'express';

const opaque = (tag: string) => tag.trim().replace(/^W\//, '');

/**
 * Whether who asks has the newest already (RFC 9110, 13.1.2–13.1.3): If-None-Match by weak comparison, and If-Modified-Since only
 * where that is absent. A request's own `Cache-Control: no-cache` asks caches on the way to check, which this is.
 */
export function hasNewest(request: Request, tag: string, changedAt: Date): boolean {
  const match = request.get('if-none-match');
  if (match !== undefined) return match.trim() === '*' || match.split(',').some((one) => opaque(one) === opaque(tag));
  const since = Date.parse(request.get('if-modified-since') ?? '');
  return !Number.isNaN(since) && Math.floor(changedAt.getTime() / 1000) <= Math.floor(since / 1000);
}
