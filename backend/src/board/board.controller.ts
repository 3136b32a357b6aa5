import { Controller, Get, Headers, Query, Res, UseFilters } from '@nestjs/common';
import { ApiOkResponse, ApiProduces, ApiTags } from '@nestjs/swagger';
import {
  boardSnapshot,
  boardToday,
  type BoardSnapshot,
  type BoardToday,
} from '@hubtack/contracts/board/lane.js';
import type { Response } from 'express';
import { z } from 'zod';
import { AllowRoles, CurrentViewer, type Viewer } from '../auth/access.js';
import { Clock } from '../common/clock.js';
import { BoardService } from './board.service.js';
import type { Audience } from './frame.js';
import { SignInEndedFilter } from './sign-in-ended.filter.js';

/** A stream lives for about this long, spread by a tenth either way, so that boards do not come back as one. */
const STREAM_MS = 3_600_000;
const SPREAD = 0.1;
/** A browser that lost its stream waits this long before it comes back by itself. */
const RETRY = 'retry: 2000\n\n';

const streamQuery = z.object({ cursor: z.string().max(100).optional() });

const audienceOf = (viewer: Viewer): Audience => {
  if (viewer.role !== 'crewChief') return 'office';
  return viewer.crewId === null ? 'nobody' : `crew:${viewer.crewId}`;
};

@ApiTags('board')
@Controller('board')
export class BoardController {
  constructor(
    private readonly board: BoardService,
    private readonly clock: Clock,
  ) {}

  /** All lanes as they stand, with the cursor from which the stream goes on. A crew chief gets the own crew's. */
  @Get()
  @AllowRoles('dispatcher', 'technician', 'crewChief', 'display')
  @ApiOkResponse({ standardSchema: boardSnapshot })
  snapshot(@CurrentViewer() viewer: Viewer): BoardSnapshot {
    return this.board.snapshot(audienceOf(viewer));
  }

  /** Today's on-shift time by state and hour, for each crew. */
  @Get('today')
  @AllowRoles('dispatcher', 'technician', 'crewChief', 'display')
  @ApiOkResponse({ standardSchema: boardToday })
  today(@CurrentViewer() viewer: Viewer): BoardToday {
    return this.board.today(audienceOf(viewer));
  }

  /**
   * Server-sent events `lanes`, `lost-fix`, `notice`, `beat` and `reset` (contracts/STREAM.md). Resumes from Last-Event-ID, or from `?cursor=` when
   * the page opens a new stream itself. 204 when the sign-in has ended: a browser then stops coming back.
   */
  @Get('stream')
  @AllowRoles('dispatcher', 'technician', 'crewChief', 'display')
  @UseFilters(SignInEndedFilter)
  @ApiProduces('text/event-stream')
  stream(
    @CurrentViewer() viewer: Viewer,
    @Query({ schema: streamQuery }) query: { cursor?: string | undefined },
    @Headers('last-event-id') lastEventId: string | undefined,
    @Res() response: Response,
  ): void {
    response.writeHead(200, {
      'Content-Type': 'text/event-stream',
      'Cache-Control': 'no-store',
      'X-Accel-Buffering': 'no',
    });
    response.write(RETRY);
    const life = STREAM_MS * (1 + SPREAD * (2 * Math.random() - 1));
    this.board.follow(response, {
      audience: audienceOf(viewer),
      sessionId: viewer.sessionId,
      userId: viewer.userId,
      endsAt: Math.min(this.clock.now() + life, viewer.signInEndsAt),
      cursor: lastEventId ?? query.cursor,
    });
  }
}
