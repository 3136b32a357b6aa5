import { Controller, Get, Param, Query } from '@nestjs/common';
import { ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { idParam } from '@hubtack/contracts/common.js';
import {
  epochSeries,
  timelineAnswer,
  timelineQuery,
  type EpochSeries,
  type TimelineAnswer,
  type TimelineQuery,
} from '@hubtack/contracts/fixes/timeline.js';
import { AllowRoles, CurrentViewer, type Viewer } from '../auth/access.js';
import { ProblemException } from '../common/problem.exception.js';
import { FixesService } from './fixes.service.js';
import { RoverAccessService } from './rover-access.service.js';

/** A chart shows hours; a longer window would read a day of raw epochs for a few hundred points. */
const MAX_SERIES_MS = 24 * 3_600_000;

@ApiTags('fixes')
@Controller('rovers/:id')
export class FixesController {
  constructor(
    private readonly fixes: FixesService,
    private readonly access: RoverAccessService,
  ) {}

  /** The fix timeline of a rover over exactly [from, to). A crew chief sees it from when the rover came to the crew. */
  @Get('timeline')
  @AllowRoles('dispatcher', 'technician', 'crewChief')
  @ApiOkResponse({ standardSchema: timelineAnswer })
  timeline(
    @CurrentViewer() viewer: Viewer,
    @Param('id', { schema: idParam }) id: number,
    @Query({ schema: timelineQuery }) query: TimelineQuery,
  ): TimelineAnswer {
    const { from, to } = this.window(viewer, id, query);
    return this.fixes.timeline(id, from, to);
  }

  /** Satellites, age and HDOP of a rover for a chart. */
  @Get('epochs')
  @AllowRoles('dispatcher', 'technician', 'crewChief')
  @ApiOkResponse({ standardSchema: epochSeries })
  epochs(
    @CurrentViewer() viewer: Viewer,
    @Param('id', { schema: idParam }) id: number,
    @Query({ schema: timelineQuery }) query: TimelineQuery,
  ): EpochSeries {
    const { from, to } = this.window(viewer, id, query);
    if (to - from > MAX_SERIES_MS)
      throw new ProblemException(400, 'badRequest', 'Ask for at most 24 hours of epochs.');
    return this.fixes.series(id, from, to);
  }

  private window(viewer: Viewer, id: number, query: TimelineQuery): { from: number; to: number } {
    const visibleFrom = this.access.visibleFrom(viewer, id);
    const from = Math.max(Date.parse(query.from), visibleFrom);
    const to = Math.max(Date.parse(query.to), from);
    return { from, to };
  }
}
