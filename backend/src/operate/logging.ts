import type { Params } from 'nestjs-pino';
import type { Environment } from '../config/environment.js';

const SECRETS = [
  'req.headers.authorization',
  'req.headers.cookie',
  'res.headers["set-cookie"]',
  '*.password',
  '*.token',
  '*.key',
  '*.refreshToken',
  '*.accessToken',
];

/** Paths that say nothing new at every request: rovers, probes, and the static files of the dashboard. */
const isQuiet = (url: string): boolean =>
  url.startsWith('/api/ingest/') ||
  url.startsWith('/health/') ||
  url === '/metrics' ||
  !url.startsWith('/api/');
/** A path that carries a secret in itself is logged without it. */
const withoutSecrets = (url: string): string =>
  url.replace(/^\/api\/auth\/link\/[^/?]+/, '/api/auth/link/…').split('?')[0]!;

/** Structured logs: one JSON object a line, fields to search by, no secrets. */
export const loggingOf = (environment: Environment): Params => ({
  pinoHttp: {
    level: environment.LOG_LEVEL,
    redact: { paths: SECRETS, censor: '[hidden]' },
    autoLogging: { ignore: (request) => isQuiet(request.url ?? '') },
    serializers: {
      req: (request: { id: unknown; method: string; url: string }) => ({
        id: request.id,
        method: request.method,
        url: withoutSecrets(request.url),
      }),
      res: (response: { statusCode: number }) => ({ statusCode: response.statusCode }),
    },
  },
  // Requests are logged where the application is put together, so that the hot way in goes without.
  forRoutes: [],
});
