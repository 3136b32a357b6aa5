import { Injectable, type NestMiddleware } from '@nestjs/common';
import type { NextFunction, Request, Response } from 'express';
import { ProblemException } from '../common/problem.exception.js';
import { RoverKeyService } from './rover-key.service.js';

export interface RoverRequest extends Request {
  roverId?: number;
}

/** Knows the rover before its body is read: nobody without a key makes the server read five megabytes. */
@Injectable()
export class RoverKeyMiddleware implements NestMiddleware {
  constructor(private readonly keys: RoverKeyService) {}

  use(request: RoverRequest, _response: Response, next: NextFunction): void {
    const { authorization } = request.headers;
    if (!authorization?.startsWith('Bearer '))
      throw new ProblemException(
        401,
        'roverKeyUnknown',
        'Send the rover key as "Authorization: Bearer <key>".',
      );
    const known = this.keys.find(authorization.slice(7).trim());
    if (known === 'revoked')
      throw new ProblemException(401, 'roverKeyRevoked', 'This rover key has been taken back.');
    if (known === 'unknown') throw new ProblemException(401, 'roverKeyUnknown', 'No rover has this key.');
    request.roverId = known.roverId;
    next();
  }
}
