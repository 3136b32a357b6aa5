import type { Request } from 'express';

const SAFE = new Set(['GET', 'HEAD', 'OPTIONS']);

/**
 * Whether a request may change something, going by where it comes from: Fetch Metadata where the browser sends it, else
 * Origin against Host (OWASP CSRF cheat sheet). A request with neither comes from a script, which has no cookies of
 * somebody else's to abuse; browsers always send one of them with a write.
 */
export function mayWriteFrom(request: Request, publicOrigin: string | null): boolean {
  if (SAFE.has(request.method)) return true;
  const site = request.headers['sec-fetch-site'];
  if (typeof site === 'string') return site === 'same-origin' || site === 'none';
  const { origin, host } = request.headers;
  if (origin === undefined) return true;
  if (origin === publicOrigin) return true;
  return URL.canParse(origin) && new URL(origin).host === host;
}
