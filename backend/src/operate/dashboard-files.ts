import { existsSync, readdirSync } from 'node:fs';
import { extname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import type { NestExpressApplication } from '@nestjs/platform-express';
import express, { type NextFunction, type Request, type RequestHandler, type Response } from 'express';

const built = join(fileURLToPath(import.meta.url), '../../../../dashboard/dist');

/** Sends the compressed twin that the build wrote beside a file, to whoever can read it: for phones in the field. */
function compressedTwins(folder: string): RequestHandler {
  const twins = new Set(readdirSync(folder).filter((name) => name.endsWith('.gz')));
  return (request: Request, response: Response, next: NextFunction) => {
    const twin = `${request.path.slice(1)}.gz`;
    if (twins.has(twin) && request.acceptsEncodings('gzip')) {
      response.type(extname(request.path)).set({ 'Content-Encoding': 'gzip', Vary: 'Accept-Encoding' });
      request.url = `/${twin}`;
    }
    next();
  };
}

/** Serves the built dashboard: hashed files for a year, and the page itself for every path that is not the server's own. */
export function serveDashboard(app: NestExpressApplication): void {
  const page = join(built, 'index.html');
  if (!existsSync(page)) return;
  const assets = join(built, 'assets');
  const isServers = (path: string) => /^\/(api|health|metrics)(\/|$)/.test(path);
  app.use(
    '/assets',
    compressedTwins(assets),
    express.static(assets, { immutable: true, maxAge: '365d', fallthrough: false }),
  );
  app.use(express.static(built, { index: false, maxAge: '1h' }));
  app.use((request: Request, response: Response, next: NextFunction) => {
    const wantsPage = (request.method === 'GET' || request.method === 'HEAD') && !isServers(request.path);
    if (!wantsPage) return next();
    response.set('Cache-Control', 'no-cache').sendFile(page);
  });
}
