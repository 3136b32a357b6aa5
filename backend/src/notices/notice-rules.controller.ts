import { Body, Controller, Delete, Get, Param, Put } from '@nestjs/common';
import { ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { idParam } from '@hubtack/contracts/common.js';
import { noticeRules, type NoticeRule } from '@hubtack/contracts/notices/notice.js';
import { AllowRoles, CurrentViewer, type Viewer } from '../auth/access.js';
import { NoticeRulesService } from './notice-rules.service.js';
import { personOf } from './person-of.js';

@ApiTags('notices')
@Controller('notice-rules')
@AllowRoles('dispatcher', 'technician', 'crewChief')
export class OwnNoticeRulesController {
  constructor(private readonly rules: NoticeRulesService) {}

  /** What I am told: my own rules, or those of my role. */
  @Get()
  @ApiOkResponse({ standardSchema: noticeRules })
  get(@CurrentViewer() viewer: Viewer): NoticeRule[] {
    return this.rules.rules(personOf(viewer));
  }

  @Put()
  @ApiOkResponse({ standardSchema: noticeRules })
  set(@CurrentViewer() viewer: Viewer, @Body({ schema: noticeRules }) body: NoticeRule[]): NoticeRule[] {
    return this.rules.set(viewer, personOf(viewer), body);
  }

  /** Back to the rules of my role. */
  @Delete()
  @ApiOkResponse({ standardSchema: noticeRules })
  reset(@CurrentViewer() viewer: Viewer): NoticeRule[] {
    return this.rules.reset(viewer, personOf(viewer));
  }
}

@ApiTags('notices')
@Controller('users/:id/notice-rules')
@AllowRoles()
export class NoticeRulesController {
  constructor(private readonly rules: NoticeRulesService) {}

  @Get()
  @ApiOkResponse({ standardSchema: noticeRules })
  get(@Param('id', { schema: idParam }) id: number): NoticeRule[] {
    return this.rules.rules(id);
  }

  @Put()
  @ApiOkResponse({ standardSchema: noticeRules })
  set(
    @CurrentViewer() viewer: Viewer,
    @Param('id', { schema: idParam }) id: number,
    @Body({ schema: noticeRules }) body: NoticeRule[],
  ): NoticeRule[] {
    return this.rules.set(viewer, id, body);
  }

  /** Back to the rules of the role. */
  @Delete()
  @ApiOkResponse({ standardSchema: noticeRules })
  reset(@CurrentViewer() viewer: Viewer, @Param('id', { schema: idParam }) id: number): NoticeRule[] {
    return this.rules.reset(viewer, id);
  }
}
