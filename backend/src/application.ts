import 'reflect-metadata';
import { StandardSchemaValidationPipe } from '@nestjs/common';
import { NestFactory } from '@nestjs/core';
import type { NestExpressApplication } from '@nestjs/platform-express';
import { DocumentBuilder, SwaggerModule } from '@nestjs/swagger';
import cookieParser from 'cookie-parser';
import { json, type RequestHandler } from 'express';
import helmet from 'helmet';
import { Logger, PinoLogger } from 'nestjs-pino';
import { pinoHttp, type Options } from 'pino-http';
import { AppModule } from './app.module.js';
import { ProblemException } from './common/problem.exception.js';
import { ProblemFilter } from './common/problem.filter.js';
import type { Environment } from './config/environment.js';
import { serveDashboard } from './operate/dashboard-files.js';
import { loggingOf } from './operate/logging.js';

const pointer = (path: readonly unknown[] | undefined): string =>
  (path ?? []).map((part) => `/${String((part as { key?: unknown } | null)?.key ?? part)}`).join('');

const security = helmet({
  contentSecurityPolicy: {
    directives: {
      defaultSrc: ["'self'"],
      // Fluent UI writes its style rules into the page.
      styleSrc: ["'self'", "'unsafe-inline'"],
      imgSrc: ["'self'", 'data:', 'blob:'],
      fontSrc: ["'self'", 'data:'],
      connectSrc: ["'self'"],
      frameAncestors: ["'none'"],
      // Set by whatever ends TLS in front; plain http on loopback must go on working.
      upgradeInsecureRequests: null,
    },
  },
  strictTransportSecurity: false,
});

const noStore: RequestHandler = (request, response, next) => {
  if (request.url.startsWith('/api/')) response.setHeader('Cache-Control', 'no-store');
  next();
};

function describeApi(app: NestExpressApplication): void {
  const config = new DocumentBuilder()
    .setTitle('Hubtack')
    .setDescription('Rovers in, board out. `x-access` of each route says who may.')
    .setVersion('1')
    .addBearerAuth({ type: 'http', scheme: 'bearer', description: 'Rover key' })
    .build();
  SwaggerModule.setup('api/docs', app, () => SwaggerModule.createDocument(app, config), {
    jsonDocumentUrl: 'api/openapi.json',
  });
}

/** Settings that every way of running the application shares: main.ts and the tests. Rovers pass all this by: see `roversFirst`. */
export function configureApplication(app: NestExpressApplication, environment: Environment): void {
  app.setGlobalPrefix('api', { exclude: ['health/*path', 'metrics'] });
  app.disable('x-powered-by');
  app.disable('etag');
  // Behind a proxy on this machine everybody would share one address, and one rate limit. No other peer is believed.
  app.set('trust proxy', 'loopback');
  const logging = { ...(loggingOf(environment).pinoHttp as Options), logger: PinoLogger.root };
  app.use(pinoHttp(logging));
  app.use(security);
  app.use(noStore);
  app.use(cookieParser());
  app.use(json({ limit: '1mb' }));
  app.useGlobalFilters(new ProblemFilter());
  app.useGlobalPipes(
    new StandardSchemaValidationPipe({
      exceptionFactory: (issues) =>
        new ProblemException(400, 'invalidBody', 'Something in the request is not right.', {
          errors: issues.map((issue) => ({ pointer: pointer(issue.path), detail: issue.message })),
        }),
    }),
  );
  describeApi(app);
  serveDashboard(app);
  app.enableShutdownHooks();
}

export async function createApplication(environment: Environment): Promise<NestExpressApplication> {
  const app = await NestFactory.create<NestExpressApplication>(AppModule.of(environment), {
    bodyParser: false,
    bufferLogs: true,
  });
  app.useLogger(app.get(Logger));
  configureApplication(app, environment);
  return app;
}
