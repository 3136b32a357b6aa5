import { randomUUID } from 'node:crypto';
import { STATUS_CODES } from 'node:http';
import { Catch, HttpException, Logger, type ArgumentsHost, type ExceptionFilter } from '@nestjs/common';
import type { Problem, ProblemCode } from '@hubtack/contracts/errors/problem.js';
import type { Response } from 'express';
import { ProblemException } from './problem.exception.js';

const codeOfStatus: Record<number, ProblemCode> = {
  400: 'badRequest',
  401: 'unauthenticated',
  403: 'forbidden',
  404: 'notFound',
  409: 'conflict',
  413: 'tooLarge',
  415: 'unsupportedMediaType',
  429: 'tooManyRequests',
  503: 'storageBusy',
};

/** SQLite result codes that a waiting caller can do something about; all others are bugs. */
const storageProblem = (error: unknown): ProblemException | undefined => {
  const code = (error as { code?: unknown } | null)?.code;
  if (typeof code !== 'string') return undefined;
  if (code.startsWith('SQLITE_BUSY') || code.startsWith('SQLITE_LOCKED'))
    return new ProblemException(503, 'storageBusy', 'The database is busy. Try again.', {
      retryAfterSeconds: 1,
      cause: error,
    });
  if (code.startsWith('SQLITE_FULL') || code.startsWith('SQLITE_IOERR'))
    return new ProblemException(503, 'storageFull', 'The server cannot write to its disk. Try again later.', {
      retryAfterSeconds: 5,
      cause: error,
    });
  return undefined;
};

/** Body-parser faults carry a status but are not Nest exceptions. */
const bodyFault = (error: unknown): ProblemException | undefined => {
  const fault = error as { status?: unknown; type?: unknown } | null;
  if (fault === null || typeof fault !== 'object' || typeof fault.type !== 'string') return undefined;
  if (fault.status === 413) return new ProblemException(413, 'tooLarge', 'The body is too large.');
  if (fault.status === 415)
    return new ProblemException(415, 'unsupportedMediaType', 'This encoding is not understood.');
  if (fault.status === 400) return new ProblemException(400, 'badRequest', 'The body cannot be read.');
  return undefined;
};

/** The one place where errors become answers. A bug answers with a generic text and a correlation id. */
@Catch()
export class ProblemFilter implements ExceptionFilter {
  private readonly logger = new Logger('Problem');

  catch(error: unknown, host: ArgumentsHost): void {
    const response = host.switchToHttp().getResponse<Response>();
    if (response.headersSent) {
      response.destroy();
      return;
    }
    const known = error instanceof HttpException ? error : (bodyFault(error) ?? storageProblem(error));
    const status = known?.getStatus() ?? 500;
    const correlationId = randomUUID();
    if (!known || status >= 500) this.logger.error({ correlationId, err: error }, 'request failed');
    const body: Problem = {
      type: 'about:blank',
      title: STATUS_CODES[status] ?? 'Error',
      status,
      detail: known ? known.message : 'Something went wrong here. Quote the correlation id.',
      code: known instanceof ProblemException ? known.code : (codeOfStatus[status] ?? 'internal'),
      correlationId,
    };
    if (known instanceof ProblemException) {
      if (known.extra.errors) body.errors = known.extra.errors;
      if (known.extra.retryAfterSeconds !== undefined)
        response.setHeader('Retry-After', String(known.extra.retryAfterSeconds));
    }
    response.status(status).type('application/problem+json').send(JSON.stringify(body));
  }
}
