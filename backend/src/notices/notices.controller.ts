import { Body, Controller, Get, HttpCode, Post } from '@nestjs/common';
import { ApiNoContentResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { noticeList, noticesSeenBody, type Notice } from '@hubtack/contracts/notices/notice.js';
import { AllowRoles, CurrentViewer, type Viewer } from '../auth/access.js';
import { NoticesService } from './notices.service.js';
import { personOf } from './person-of.js';

@ApiTags('notices')
@Controller('notices')
export class NoticesController {
  constructor(private readonly notices: NoticesService) {}

  /** What I was told, the newest fifty. */
  @Get()
  @AllowRoles('dispatcher', 'technician', 'crewChief')
  @ApiOkResponse({ standardSchema: noticeList })
  list(@CurrentViewer() viewer: Viewer): Notice[] {
    return this.notices.newest(personOf(viewer));
  }

  /** I have seen mine up to this one. */
  @Post('seen')
  @HttpCode(204)
  @AllowRoles('dispatcher', 'technician', 'crewChief')
  @ApiNoContentResponse()
  seen(@CurrentViewer() viewer: Viewer, @Body({ schema: noticesSeenBody }) body: { upTo: number }): void {
    this.notices.markSeen(personOf(viewer), body.upTo);
  }
}
