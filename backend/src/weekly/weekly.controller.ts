import { Body, Controller, Get, HttpCode, Post, Query } from '@nestjs/common';
import { ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { preview, previewBody, type Preview, type PreviewBody } from '@hubtack/contracts/weekly/preview.js';
import { weekly, weeklyQuery, type Weekly, type WeeklyQuery } from '@hubtack/contracts/weekly/weekly.js';
import { AllowRoles, CurrentViewer, type Viewer } from '../auth/access.js';
import { PreviewService } from './preview.service.js';
import { WeeklyService } from './weekly.service.js';

@ApiTags('weekly')
@Controller('weekly')
export class WeeklyController {
  constructor(
    private readonly service: WeeklyService,
    private readonly previews: PreviewService,
  ) {}

  /** An ISO week in the firm's zone, this one when none is asked for. Money is the manager's business. */
  @Get()
  @AllowRoles('dispatcher', 'technician')
  @ApiOkResponse({ standardSchema: weekly })
  week(@CurrentViewer() viewer: Viewer, @Query({ schema: weeklyQuery }) query: WeeklyQuery): Weekly {
    const week = query.week ?? this.service.thisWeek();
    return this.service.week(week, viewer.role === 'manager', query.compare);
  }

  /** What other limits or another tolerance profile would make of the last whole week; nothing is changed. */
  @Post('preview')
  @HttpCode(200)
  @AllowRoles()
  @ApiOkResponse({ standardSchema: preview })
  preview(@Body({ schema: previewBody }) body: PreviewBody): Preview {
    return this.previews.preview(body);
  }
}
