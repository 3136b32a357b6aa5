import { Catch, type ArgumentsHost } from '@nestjs/common';
import type { Response } from 'express';
import { ProblemException } from '../common/problem.exception.js';
import { ProblemFilter } from '../common/problem.filter.js';

/** An EventSource comes back after any answer but 204 (WHATWG HTML, section 9.2): a sign-in that is over says so. */
@Catch()
export class SignInEndedFilter extends ProblemFilter {
  override catch(error: unknown, host: ArgumentsHost): void {
    if (error instanceof ProblemException && error.code === 'signInEnded')
      host.switchToHttp().getResponse<Response>().status(204).end();
    else super.catch(error, host);
  }
}
