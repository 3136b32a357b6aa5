import { Body, Controller, Get, Headers, HttpCode, Param, Post, Query } from '@nestjs/common';
import { ApiHeader, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { idParam } from '@hubtack/contracts/common.js';
import {
  crewDay,
  crewDayQuery,
  shiftStep,
  siteVisitList,
  shiftStepBody,
  type CrewDayView,
  type ShiftStep,
  type ShiftStepBody,
  type SiteVisitList,
} from '@hubtack/contracts/shifts/shift.js';
import { AllowRoles, CurrentViewer, type Viewer } from '../auth/access.js';
import { ShiftMarksService } from '../shifts/shift-marks.service.js';
import { TapsService } from '../taps/taps.service.js';
import { CrewDayService } from './crew-day.service.js';

@ApiTags('shifts')
@Controller('crews/:id')
export class CrewDayController {
  constructor(
    private readonly crewDays: CrewDayService,
    private readonly marks: ShiftMarksService,
    private readonly taps: TapsService,
  ) {}

  @Get('day')
  @AllowRoles('dispatcher', 'technician', 'crewChief')
  @ApiOkResponse({ standardSchema: crewDay })
  day(
    @CurrentViewer() viewer: Viewer,
    @Param('id', { schema: idParam }) id: number,
    @Query({ schema: crewDayQuery }) query: { date?: string | undefined },
  ): CrewDayView {
    return this.crewDays.day(viewer, id, query.date);
  }

  @Get('visits')
  @AllowRoles('dispatcher', 'technician', 'crewChief')
  @ApiOkResponse({ standardSchema: siteVisitList })
  visits(
    @CurrentViewer() viewer: Viewer,
    @Param('id', { schema: idParam }) id: number,
    @Query({ schema: crewDayQuery }) query: { date?: string | undefined },
  ): SiteVisitList {
    return this.crewDays.visits(viewer, id, query.date);
  }

  /** start, pause (with a reason), resume, finish. Sent again with the same Idempotency-Key it counts once. */
  @Post('shift/:step')
  @HttpCode(200)
  @AllowRoles('dispatcher', 'crewChief')
  @ApiHeader({ name: 'Idempotency-Key', required: false })
  @ApiOkResponse({ standardSchema: crewDay })
  step(
    @CurrentViewer() viewer: Viewer,
    @Param('id', { schema: idParam }) id: number,
    @Param('step', { schema: shiftStep }) step: ShiftStep,
    @Body({ schema: shiftStepBody }) body: ShiftStepBody,
    @Headers('idempotency-key') key: string | undefined,
  ): CrewDayView {
    this.crewDays.check(viewer, id);
    this.taps.once(viewer, key, `POST /api/crews/${id}/shift/${step}`, () => {
      this.marks.step(viewer, id, step, body);
      return null;
    });
    return this.crewDays.day(viewer, id);
  }
}
