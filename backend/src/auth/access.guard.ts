import { Inject, Injectable, type ExecutionContext } from '@nestjs/common';
import { Reflector } from '@nestjs/core';
import { AuthGuard } from '@nestjs/passport';
import type { Request } from 'express';
import { forbidden, ProblemException } from '../common/problem.exception.js';
import { ENVIRONMENT } from '../config/config.module.js';
import type { Environment } from '../config/environment.js';
import { ACCESS, type Access, type Viewer } from './access.js';
import { mayWriteFrom } from './origin.js';

/** The one guard in front of every route: who may is what the route says, and a route that says nothing is closed. */
@Injectable()
export class AccessGuard extends AuthGuard('jwt') {
  private readonly publicOrigin: string | null;

  constructor(
    private readonly reflector: Reflector,
    @Inject(ENVIRONMENT) environment: Environment,
  ) {
    super();
    this.publicOrigin = environment.PUBLIC_URL ? new URL(environment.PUBLIC_URL).origin : null;
  }

  override canActivate(context: ExecutionContext): boolean | Promise<boolean> {
    const access = this.reflector.getAllAndOverride<Access | undefined>(ACCESS, [
      context.getHandler(),
      context.getClass(),
    ]);
    if (access === undefined) throw forbidden();
    // Their own code checks the key or the token: no cookie can open them.
    if (access === 'roverKey' || access === 'metricsToken') return true;
    const request = context.switchToHttp().getRequest<Request & { user?: Viewer }>();
    if (!mayWriteFrom(request, this.publicOrigin))
      throw new ProblemException(403, 'badOrigin', 'This request comes from another site.');
    return access === 'anyone' || this.hasRole(context, request, access);
  }

  private async hasRole(
    context: ExecutionContext,
    request: Request & { user?: Viewer },
    roles: Exclude<Access, string>,
  ): Promise<boolean> {
    await super.canActivate(context);
    if (!request.user || !roles.includes(request.user.role)) throw forbidden();
    return true;
  }

  override handleRequest<TUser>(error: unknown, user: TUser | false): TUser {
    if (error instanceof Error) throw error;
    if (!user) throw new ProblemException(401, 'unauthenticated', 'Sign in first.');
    return user;
  }
}
