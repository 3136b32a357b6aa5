import { Body, Controller, Delete, Get, Headers, HttpCode, Param, Post, Query } from '@nestjs/common';
import { ApiCreatedResponse, ApiHeader, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { idParam } from '@hubtack/contracts/common.js';
import {
  adviceBody,
  closeBody,
  flagBody,
  handOverBody,
  lostFix,
  lostFixDetail,
  lostFixList,
  lostFixQuery,
  people,
  shelveBody,
  type CloseBody,
  type FlagBody,
  type LostFix,
  type LostFixDetail,
  type LostFixList,
  type LostFixQuery,
  type ShelveBody,
} from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { AllowRoles, CurrentViewer, type Viewer } from '../auth/access.js';
import { TapsService } from '../taps/taps.service.js';
import { LostFixesService } from './lost-fixes.service.js';

@ApiTags('lost fixes')
@Controller('lost-fixes')
export class LostFixesController {
  constructor(
    private readonly service: LostFixesService,
    private readonly taps: TapsService,
  ) {}

  /** Newest first; everything that nobody has closed unless asked otherwise. A crew chief gets the own crew's. */
  @Get()
  @AllowRoles('dispatcher', 'technician', 'crewChief')
  @ApiOkResponse({ standardSchema: lostFixList })
  list(@CurrentViewer() viewer: Viewer, @Query({ schema: lostFixQuery }) query: LostFixQuery): LostFixList {
    return this.service.list(viewer, query);
  }

  @Get('people')
  @AllowRoles('dispatcher', 'technician')
  @ApiOkResponse({ standardSchema: people })
  people(): { id: number; name: string }[] {
    return this.service.people();
  }

  @Get(':id')
  @AllowRoles('dispatcher', 'technician', 'crewChief')
  @ApiOkResponse({ standardSchema: lostFixDetail })
  detail(@CurrentViewer() viewer: Viewer, @Param('id', { schema: idParam }) id: number): LostFixDetail {
    return this.service.detail(viewer, id);
  }

  /** A chief's flag, or the office's in a chief's name. Sent again with the same Idempotency-Key it counts once. */
  @Post()
  @AllowRoles('dispatcher', 'technician', 'crewChief')
  @ApiHeader({ name: 'Idempotency-Key', required: false })
  @ApiCreatedResponse({ standardSchema: lostFix })
  flag(
    @CurrentViewer() viewer: Viewer,
    @Body({ schema: flagBody }) body: FlagBody,
    @Headers('idempotency-key') key: string | undefined,
  ): LostFix {
    return this.taps.once(viewer, key, 'POST /api/lost-fixes', () => this.service.flag(viewer, body));
  }

  @Post(':id/take')
  @HttpCode(200)
  @AllowRoles('dispatcher', 'technician')
  @ApiOkResponse({ standardSchema: lostFix })
  take(@CurrentViewer() viewer: Viewer, @Param('id', { schema: idParam }) id: number): LostFix {
    return this.service.take(viewer, id);
  }

  @Post(':id/hand-over')
  @HttpCode(200)
  @AllowRoles('dispatcher', 'technician')
  @ApiOkResponse({ standardSchema: lostFix })
  handOver(
    @CurrentViewer() viewer: Viewer,
    @Param('id', { schema: idParam }) id: number,
    @Body({ schema: handOverBody }) body: { userId: number },
  ): LostFix {
    return this.service.handOver(viewer, id, body.userId);
  }

  /** Reaches the chief at once. Who advises on one that nobody has takes it. */
  @Post(':id/advice')
  @HttpCode(200)
  @AllowRoles('dispatcher', 'technician')
  @ApiOkResponse({ standardSchema: lostFix })
  advise(
    @CurrentViewer() viewer: Viewer,
    @Param('id', { schema: idParam }) id: number,
    @Body({ schema: adviceBody }) body: { text: string },
  ): LostFix {
    return this.service.advise(viewer, id, body.text);
  }

  /** Silent for so many minutes; it comes back by itself. */
  @Post(':id/shelve')
  @HttpCode(200)
  @AllowRoles('dispatcher', 'technician')
  @ApiOkResponse({ standardSchema: lostFix })
  shelve(
    @CurrentViewer() viewer: Viewer,
    @Param('id', { schema: idParam }) id: number,
    @Body({ schema: shelveBody }) body: ShelveBody,
  ): LostFix {
    return this.service.shelve(viewer, id, body);
  }

  @Delete(':id/shelve')
  @AllowRoles('dispatcher', 'technician')
  @ApiOkResponse({ standardSchema: lostFix })
  unshelve(@CurrentViewer() viewer: Viewer, @Param('id', { schema: idParam }) id: number): LostFix {
    return this.service.unshelve(viewer, id);
  }

  @Post(':id/close')
  @HttpCode(200)
  @AllowRoles('dispatcher', 'technician')
  @ApiOkResponse({ standardSchema: lostFix })
  close(
    @CurrentViewer() viewer: Viewer,
    @Param('id', { schema: idParam }) id: number,
    @Body({ schema: closeBody }) body: CloseBody,
  ): LostFix {
    return this.service.close(viewer, id, body);
  }
}
