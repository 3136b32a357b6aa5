import type { Express } from 'express';

const isIngest = (layer: Express['router']['stack'][number]): boolean =>
  layer.route?.path.startsWith('/api/ingest/') ?? false;

/**
 * Puts the rovers' routes in front of everything that is for browsers (cookies, security headers, logs, documents,
 * the dashboard's files). Express tries its layers one after the other, and some forty of them, tried by every post of every rover,
 * cost a tenth of the rate (bench `ingest/http-1`). Call once all routes are there.
 */
export function roversFirst(app: Express): void {
  const { stack } = app.router;
  const ingest = stack.filter(isIngest);
  if (ingest.length === 0) throw new Error('the ingest routes are not where Express keeps its routes');
  stack.splice(0, stack.length, ...ingest, ...stack.filter((layer) => !isIngest(layer)));
}
