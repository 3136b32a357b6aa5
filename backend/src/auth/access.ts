import { SetMetadata, applyDecorators, createParamDecorator, type ExecutionContext } from '@nestjs/common';
import { ApiExtension } from '@nestjs/swagger';
import type { ViewerRole } from '@hubtack/contracts/auth/role.js';
import type { Request } from 'express';

/** The signed-in person or display, as the guard puts it on the request. */
export interface Viewer {
  sessionId: string;
  /** When the sign-in is over by itself, ms UTC. */
  signInEndsAt: number;
  userId: number | null;
  name: string;
  role: ViewerRole;
  crewId: number | null;
}

export const ACCESS = 'hubtack:access';
export type Access = readonly ViewerRole[] | 'anyone' | 'roverKey' | 'metricsToken';

const access = (value: Access) =>
  applyDecorators(SetMetadata(ACCESS, value), ApiExtension('x-access', value));

/** Every route says who may. A route that says nothing is refused to everybody. A manager may do everything. */
export const AllowRoles = (...roles: ViewerRole[]) => access(['manager', ...roles]);
/** Open to people who are not signed in. */
export const AllowAnyone = () => access('anyone');
/** Opened by a rover's own key, which the ingest checks. */
export const AllowRoverKey = () => access('roverKey');
export const AllowMetricsToken = () => access('metricsToken');

export const CurrentViewer = createParamDecorator((_: unknown, context: ExecutionContext): Viewer => {
  const { user } = context.switchToHttp().getRequest<Request & { user?: Viewer }>();
  if (!user) throw new Error('CurrentViewer used on a route without sign-in');
  return user;
});
