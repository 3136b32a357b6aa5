import { existsSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import type { NestExpressApplication } from '@nestjs/platform-express';
import compression from 'compression';
import express, { type NextFunction, type Request, type Response } from 'express';

const built = join(fileURLToPath(import.meta.url), '../../../../dashboard/dist');

/** Serves the built dashboard: hashed files for a year, and the page itself for every path that is not the server's own. */
export function serveDashboard(app: NestExpressApplication): void {
  const page = join(built, 'index.html');
  if (!existsSync(page)) return;
  const isServers = (path: string) => /^\/(api|health|metrics)(\/|$)/.test(path);
  // For phones in the field. Never the board stream, which must not wait for a compressor's block.
  app.use(
    compression({
      filter: (request: Request, response: Response) =>
        !isServers(request.path) && compression.filter(request, response),
    }),
  );
  app.use(
    '/assets',
    express.static(join(built, 'assets'), { immutable: true, maxAge: '365d', fallthrough: false }),
  );
  app.use(express.static(built, { index: false, maxAge: '1h' }));
  app.use((request: Request, response: Response, next: NextFunction) => {
    const wantsPage = (request.method === 'GET' || request.method === 'HEAD') && !isServers(request.path);
    if (!wantsPage) return next();
    response.set('Cache-Control', 'no-cache').sendFile(page);
  });
}
