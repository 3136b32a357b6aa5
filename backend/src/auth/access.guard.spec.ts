import type { ExecutionContext } from '@nestjs/common';
import { Reflector } from '@nestjs/core';
import { expect, it } from 'vitest';
import type { ProblemException } from '../common/problem.exception.js';
import { parseEnvironment } from '../config/environment.js';
import { AccessGuard } from './access.guard.js';
import { AllowAnyone, AllowRoverKey } from './access.js';

class Routes {
  silent(): void {}

  @AllowAnyone()
  forAnyone(): void {}

  @AllowRoverKey()
  forRovers(): void {}
}

const guard = new AccessGuard(new Reflector(), parseEnvironment({}));
function answerOf(route: keyof Routes, headers: Record<string, string> = {}): unknown {
  const context = {
    getHandler: () => Routes.prototype[route],
    getClass: () => Routes,
    switchToHttp: () => ({ getRequest: () => ({ method: 'POST', headers }) }),
  } as unknown as ExecutionContext;
  try {
    return guard.canActivate(context);
  } catch (error) {
    return (error as ProblemException).code;
  }
}
const fromElsewhere = { 'sec-fetch-site': 'cross-site' };

it('a route that does not say who may is closed to everybody', () => {
  expect(answerOf('silent')).toBe('forbidden');
});
it('a write from another site is refused before anything else, open route or not', () => {
  expect(answerOf('forAnyone')).toBe(true);
  expect(answerOf('forAnyone', fromElsewhere)).toBe('badOrigin');
});
it('a rover has no cookie to abuse: its key is checked where the sentences come in', () => {
  expect(answerOf('forRovers', fromElsewhere)).toBe(true);
});
