import { Body, Controller, Delete, Get, HttpCode, Param, Post, Res } from '@nestjs/common';
import { ApiCreatedResponse, ApiNoContentResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { me, type Me } from '@hubtack/contracts/auth/sign-in.js';
import { idParam } from '@hubtack/contracts/common.js';
import {
  displayLinkBody,
  displayLinkList,
  issuedDisplayLink,
  openDisplayBody,
  type DisplayLink,
  type DisplayLinkBody,
  type IssuedDisplayLink,
  type OpenDisplayBody,
} from '@hubtack/contracts/displays/display-link.js';
import type { Response } from 'express';
import { AllowAnyone, AllowRoles, CurrentViewer, type Viewer } from '../auth/access.js';
import { AuthService } from '../auth/auth.service.js';
import { SignInCookies } from '../auth/cookies.js';
import { SessionService } from '../auth/session.service.js';
import { Clock } from '../common/clock.js';
import { DisplaysService } from './displays.service.js';

@ApiTags('displays')
@Controller('displays')
export class DisplaysController {
  constructor(
    private readonly displays: DisplaysService,
    private readonly auth: AuthService,
    private readonly sessions: SessionService,
    private readonly cookies: SignInCookies,
    private readonly clock: Clock,
  ) {}

  @Get()
  @AllowRoles()
  @ApiOkResponse({ standardSchema: displayLinkList })
  list(): DisplayLink[] {
    return this.displays.list();
  }

  @Post()
  @AllowRoles()
  @ApiCreatedResponse({ standardSchema: issuedDisplayLink })
  make(
    @CurrentViewer() viewer: Viewer,
    @Body({ schema: displayLinkBody }) body: DisplayLinkBody,
  ): IssuedDisplayLink {
    return this.displays.make(viewer, body);
  }

  @Delete(':id')
  @HttpCode(204)
  @AllowRoles()
  @ApiNoContentResponse()
  revoke(@CurrentViewer() viewer: Viewer, @Param('id', { schema: idParam }) id: number): void {
    this.displays.revoke(viewer, id);
  }

  @Post('open')
  @HttpCode(200)
  @AllowAnyone()
  @ApiOkResponse({ standardSchema: me })
  open(
    @Body({ schema: openDisplayBody }) body: OpenDisplayBody,
    @Res({ passthrough: true }) response: Response,
  ): Me {
    const { sessionId, accessToken, refreshToken, endsAt } = this.auth.withAccess(
      this.displays.open(body.token),
    );
    this.cookies.set(response, { access: accessToken, refresh: refreshToken, endsAt, now: this.clock.now() });
    return this.auth.me(this.sessions.viewer(sessionId));
  }
}
