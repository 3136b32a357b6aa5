import { HttpException } from '@nestjs/common';
import type { ProblemCode } from '@hubtack/contracts/errors/problem.js';

export interface FieldError {
  pointer: string;
  detail: string;
}

/** A caller's mistake, or a refusal, with a stable code. The filter turns it into RFC 9457 problem details. */
export class ProblemException extends HttpException {
  constructor(
    status: number,
    readonly code: ProblemCode,
    detail: string,
    readonly extra: { errors?: FieldError[]; retryAfterSeconds?: number; cause?: unknown } = {},
  ) {
    super(detail, status, { cause: extra.cause });
  }
}

export const notFound = (what: string) => new ProblemException(404, 'notFound', `${what} does not exist.`);
export const conflict = (detail: string, errors?: FieldError[]) =>
  new ProblemException(409, 'conflict', detail, errors ? { errors } : {});
export const forbidden = () => new ProblemException(403, 'forbidden', 'Your role may not do this.');
