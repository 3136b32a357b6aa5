import { Body, Controller, Get, HttpCode, Inject, Param, Post, Req, Res } from '@nestjs/common';
import { ApiNoContentResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import {
  firstManagerBody,
  forgotBody,
  linkInfo,
  me,
  passwordBody,
  signInBody,
  signInHints,
  type FirstManagerBody,
  type ForgotBody,
  type LinkInfo,
  type Me,
  type PasswordBody,
  type SignInBody,
  type SignInHints,
} from '@hubtack/contracts/auth/sign-in.js';
import type { Request, Response } from 'express';
import { Clock } from '../common/clock.js';
import { ProblemException } from '../common/problem.exception.js';
import { ENVIRONMENT } from '../config/config.module.js';
import type { Environment } from '../config/environment.js';
import { AllowAnyone, AllowRoles, CurrentViewer, type Viewer } from './access.js';
import { AuthService, type SignedIn } from './auth.service.js';
import { SignInCookies } from './cookies.js';
import { SessionService } from './session.service.js';
import { SignInHintsService } from './sign-in-hints.service.js';

@ApiTags('auth')
@Controller('auth')
export class AuthController {
  constructor(
    @Inject(ENVIRONMENT) private readonly environment: Environment,
    private readonly auth: AuthService,
    private readonly sessions: SessionService,
    private readonly cookies: SignInCookies,
    private readonly hintsOfDemo: SignInHintsService,
    private readonly clock: Clock,
  ) {}

  @Post('sign-in')
  @HttpCode(200)
  @AllowAnyone()
  @ApiOkResponse({ standardSchema: me })
  async signIn(
    @Body({ schema: signInBody }) body: SignInBody,
    @Res({ passthrough: true }) response: Response,
  ): Promise<Me> {
    return this.welcome(response, await this.auth.signIn(body));
  }

  /** Trades the refresh cookie for new ones. */
  @Post('refresh')
  @HttpCode(200)
  @AllowAnyone()
  @ApiOkResponse({ standardSchema: me })
  refresh(@Req() request: Request, @Res({ passthrough: true }) response: Response): Me {
    const token = this.cookies.refresh(request);
    if (token === null) throw new ProblemException(401, 'unauthenticated', 'Sign in first.');
    try {
      return this.welcome(response, this.auth.refresh(token));
    } catch (error) {
      if (error instanceof ProblemException) this.cookies.clear(response);
      throw error;
    }
  }

  /** Ends the sign-in on the server. Open to anyone: by now the short-lived cookie has often run out. */
  @Post('sign-out')
  @HttpCode(204)
  @AllowAnyone()
  @ApiNoContentResponse()
  signOut(@Req() request: Request, @Res({ passthrough: true }) response: Response): void {
    this.auth.signOut({ access: this.cookies.access(request), refresh: this.cookies.refresh(request) });
    this.cookies.clear(response);
  }

  @Get('me')
  @AllowRoles('dispatcher', 'technician', 'crewChief', 'display')
  @ApiOkResponse({ standardSchema: me })
  me(@CurrentViewer() viewer: Viewer): Me {
    return this.auth.me(viewer);
  }

  /** The demo's sign-ins; nothing on any other installation. */
  @Get('hints')
  @AllowAnyone()
  @ApiOkResponse({ standardSchema: signInHints })
  hints(): SignInHints {
    return this.environment.DEMO ? this.hintsOfDemo.list() : { accounts: [], password: null };
  }

  /** Mails a link to set a new password. Says the same whether or not there is such an account. */
  @Post('forgot')
  @HttpCode(204)
  @AllowAnyone()
  @ApiNoContentResponse()
  forgot(@Body({ schema: forgotBody }) body: ForgotBody): void {
    this.auth.forgot(body.email);
  }

  @Get('link/:token')
  @AllowAnyone()
  @ApiOkResponse({ standardSchema: linkInfo })
  link(@Param('token') token: string): LinkInfo {
    return this.auth.link(token);
  }

  @Post('password')
  @HttpCode(200)
  @AllowAnyone()
  @ApiOkResponse({ standardSchema: me })
  async password(
    @Body({ schema: passwordBody }) body: PasswordBody,
    @Res({ passthrough: true }) response: Response,
  ): Promise<Me> {
    return this.welcome(response, await this.auth.setPassword(body));
  }

  @Post('first-manager')
  @HttpCode(200)
  @AllowAnyone()
  @ApiOkResponse({ standardSchema: me })
  async firstManager(
    @Body({ schema: firstManagerBody }) body: FirstManagerBody,
    @Res({ passthrough: true }) response: Response,
  ): Promise<Me> {
    return this.welcome(response, await this.auth.makeFirstManager(body));
  }

  private welcome(response: Response, signedIn: SignedIn): Me {
    const { accessToken: access, refreshToken: refresh, endsAt } = signedIn;
    this.cookies.set(response, { access, refresh, endsAt, now: this.clock.now() });
    return this.auth.me(this.sessions.viewer(signedIn.sessionId));
  }
}
