import type { NextFunction, Request, Response } from 'express';
import { ipKeyGenerator, rateLimit } from 'express-rate-limit';
import { ProblemException } from '../common/problem.exception.js';

const WINDOW_MS = 10 * 60_000;

const address = (request: Request): string => ipKeyGenerator(request.ip ?? '');
const account = (request: Request): string => {
  const email: unknown = (request.body as { email?: unknown } | undefined)?.email;
  return typeof email === 'string' ? email.trim().toLowerCase().slice(0, 254) : '';
};

function limiter(limit: number, key: (request: Request) => string, countsSuccess: boolean) {
  return rateLimit({
    windowMs: WINDOW_MS,
    limit,
    keyGenerator: key,
    skipSuccessfulRequests: !countsSuccess,
    standardHeaders: 'draft-7',
    legacyHeaders: false,
    handler: (_request: Request, _response: Response, next: NextFunction) =>
      next(
        new ProblemException(
          429,
          'tooManyRequests',
          // The library has set Retry-After to what is left of the window.
          'Too many tries. Wait a few minutes, then try again.',
        ),
      ),
  });
}

/**
 * Guessing is slowed by address and account together, so that nobody can lock somebody else out from elsewhere
 * (ASVS 5.0, 6.3.1), and by address alone against trying many accounts. Only failures count.
 */
export const signInLimits = () => [
  limiter(10, (request) => `${address(request)} ${account(request)}`, false),
  limiter(60, address, false),
];

/** Each may send a mail: nobody's mailbox is filled from many addresses, nor many mailboxes from one. */
export const linkLimits = () => [
  limiter(5, (request) => account(request) || address(request), true),
  limiter(20, address, true),
];
/** Tries of a token. */
export const tokenLimits = () => [limiter(30, address, false)];
