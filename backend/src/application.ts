import 'reflect-metadata';
import { StandardSchemaValidationPipe } from '@nestjs/common';
import { NestFactory } from '@nestjs/core';
import type { NestExpressApplication } from '@nestjs/platform-express';
import { AppModule } from './app.module.js';
import { ProblemException } from './common/problem.exception.js';
import { ProblemFilter } from './common/problem.filter.js';
import type { Environment } from './config/environment.js';

const pointer = (path: readonly unknown[] | undefined): string =>
  (path ?? []).map((part) => `/${String((part as { key?: unknown })?.key ?? part)}`).join('');

/** Settings that every way of running the application shares: main.ts and the tests. */
export function configureApplication(app: NestExpressApplication): void {
  app.setGlobalPrefix('api', { exclude: ['health/*path', 'metrics'] });
  app.disable('x-powered-by');
  app.useGlobalFilters(new ProblemFilter());
  app.useGlobalPipes(
    new StandardSchemaValidationPipe({
      exceptionFactory: (issues) =>
        new ProblemException(400, 'invalidBody', 'Something in the request is not right.', {
          errors: issues.map((issue) => ({ pointer: pointer(issue.path), detail: issue.message })),
        }),
    }),
  );
  app.enableShutdownHooks();
}

export async function createApplication(environment: Environment): Promise<NestExpressApplication> {
  const app = await NestFactory.create<NestExpressApplication>(AppModule.of(environment), {
    bodyParser: false,
    bufferLogs: true,
  });
  configureApplication(app);
  return app;
}
