import { Inject, Injectable } from '@nestjs/common';
import { PassportStrategy } from '@nestjs/passport';
import { Strategy } from 'passport-jwt';
import { SECRETS } from '../config/config.module.js';
import type { Secrets } from '../config/secrets.js';
import type { Viewer } from './access.js';
import { SignInCookies } from './cookies.js';
import { SessionService } from './session.service.js';

export const JWT_ISSUER = 'hubtack';
export const JWT_AUDIENCE = 'hubtack-dashboard';
export const JWT_ALGORITHM = 'HS256' as const;

/** What every token is checked for; the algorithm is ours to say, never the token's. */
export const ACCESS_CHECKS = {
  issuer: JWT_ISSUER,
  audience: JWT_AUDIENCE,
  algorithms: [JWT_ALGORITHM],
} satisfies { issuer: string; audience: string; algorithms: 'HS256'[] };

export interface AccessClaims {
  sid: string;
}

@Injectable()
export class JwtStrategy extends PassportStrategy(Strategy) {
  constructor(
    @Inject(SECRETS) secrets: Secrets,
    cookies: SignInCookies,
    private readonly sessions: SessionService,
  ) {
    super({
      jwtFromRequest: (request) => cookies.access(request),
      secretOrKey: secrets.sessionSecret,
      ...ACCESS_CHECKS,
      ignoreExpiration: false,
    });
  }

  /** The token says only which sign-in; everything else is read from the database at each request. */
  validate(claims: AccessClaims): Viewer {
    return this.sessions.viewer(claims.sid);
  }
}
