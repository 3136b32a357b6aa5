import { Body, Controller, Get, Headers, HttpCode, Param, Post, Query } from '@nestjs/common';
import { ApiCreatedResponse, ApiHeader, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { idParam } from '@hubtack/contracts/common.js';
import {
  checkShot,
  checkShotBody,
  checkShotList,
  checkShotQuery,
  checkShotResult,
  type CheckShot,
  type CheckShotBody,
  type CheckShotResult,
} from '@hubtack/contracts/set-up/check-shot.js';
import { AllowRoles, CurrentViewer, type Viewer } from '../auth/access.js';
import { TapsService } from '../taps/taps.service.js';
import { CheckShotsService } from './check-shots.service.js';

@ApiTags('set-up')
@Controller('check-shots')
export class CheckShotsController {
  constructor(
    private readonly shots: CheckShotsService,
    private readonly taps: TapsService,
  ) {}

  /** Newest first; of a rover, of a local day, or the newest of all. */
  @Get()
  @AllowRoles('dispatcher', 'technician', 'crewChief')
  @ApiOkResponse({ standardSchema: checkShotList })
  list(
    @CurrentViewer() viewer: Viewer,
    @Query({ schema: checkShotQuery }) query: { roverId?: number | undefined; date?: string | undefined },
  ): { checkShots: CheckShot[] } {
    return { checkShots: this.shots.list(viewer, query) };
  }

  @Get(':id')
  @AllowRoles('dispatcher', 'technician', 'crewChief')
  @ApiOkResponse({ standardSchema: checkShot })
  get(@CurrentViewer() viewer: Viewer, @Param('id', { schema: idParam }) id: number): CheckShot {
    return this.shots.get(viewer, id);
  }

  /** What it would say; nothing is kept. */
  @Post('preview')
  @HttpCode(200)
  @AllowRoles('technician', 'crewChief')
  @ApiOkResponse({ standardSchema: checkShotResult })
  preview(
    @CurrentViewer() viewer: Viewer,
    @Body({ schema: checkShotBody }) body: CheckShotBody,
  ): CheckShotResult {
    return this.shots.preview(viewer, body);
  }

  @Post()
  @AllowRoles('technician', 'crewChief')
  @ApiHeader({ name: 'Idempotency-Key', required: false })
  @ApiCreatedResponse({ standardSchema: checkShot })
  add(
    @CurrentViewer() viewer: Viewer,
    @Body({ schema: checkShotBody }) body: CheckShotBody,
    @Headers('idempotency-key') key: string | undefined,
  ): CheckShot {
    return this.taps.once(viewer, key, 'POST /api/check-shots', () => this.shots.add(viewer, body));
  }
}
