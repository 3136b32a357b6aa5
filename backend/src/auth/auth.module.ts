import { Module, RequestMethod, type MiddlewareConsumer, type NestModule } from '@nestjs/common';
import { APP_GUARD } from '@nestjs/core';
import { JwtModule } from '@nestjs/jwt';
import { PassportModule } from '@nestjs/passport';
import { ENVIRONMENT, SECRETS } from '../config/config.module.js';
import type { Environment } from '../config/environment.js';
import type { Secrets } from '../config/secrets.js';
import { MailModule } from '../mail/mail.module.js';
import { SettingsModule } from '../settings/settings.module.js';
import { AccessGuard } from './access.guard.js';
import { AuthController } from './auth.controller.js';
import { AuthService } from './auth.service.js';
import { ACCESS_MINUTES, SignInCookies } from './cookies.js';
import { FirstStartService } from './first-start.service.js';
import { JWT_ALGORITHM, JWT_AUDIENCE, JWT_ISSUER, JwtStrategy } from './jwt.strategy.js';
import { PasswordLinksService } from './password-links.service.js';
import { PasswordService } from './password.service.js';
import { linkLimits, signInLimits, tokenLimits } from './rate-limits.js';
import { SessionService } from './session.service.js';
import { SignInHintsService } from './sign-in-hints.service.js';

@Module({
  imports: [
    PassportModule,
    MailModule,
    SettingsModule,
    JwtModule.registerAsync({
      inject: [SECRETS],
      useFactory: (secrets: Secrets) => ({
        secret: secrets.sessionSecret,
        signOptions: {
          algorithm: JWT_ALGORITHM,
          issuer: JWT_ISSUER,
          audience: JWT_AUDIENCE,
          expiresIn: ACCESS_MINUTES * 60,
        },
      }),
    }),
  ],
  controllers: [AuthController],
  providers: [
    AuthService,
    FirstStartService,
    JwtStrategy,
    PasswordLinksService,
    PasswordService,
    SessionService,
    SignInHintsService,
    {
      provide: SignInCookies,
      inject: [ENVIRONMENT],
      useFactory: (environment: Environment) => new SignInCookies(environment),
    },
    { provide: APP_GUARD, useClass: AccessGuard },
  ],
  exports: [AuthService, PasswordLinksService, PasswordService, SessionService, SignInCookies],
})
export class AuthModule implements NestModule {
  configure(consumer: MiddlewareConsumer): void {
    const post = (path: string) => ({ path: `auth/${path}`, method: RequestMethod.POST });
    consumer.apply(...signInLimits()).forRoutes(post('sign-in'));
    consumer.apply(...linkLimits()).forRoutes(post('forgot'));
    consumer.apply(...tokenLimits()).forRoutes(post('password'), post('first-manager'), {
      path: 'auth/link/:token',
      method: RequestMethod.GET,
    });
  }
}
