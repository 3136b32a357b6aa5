import { Body, Controller, Delete, Get, HttpCode, Param, Post, Query } from '@nestjs/common';
import { ApiCreatedResponse, ApiNoContentResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { idParam } from '@hubtack/contracts/common.js';
import {
  correctionCheck,
  correctionCheckList,
  startCheckBody,
  type CorrectionCheck,
  type CorrectionCheckList,
  type StartCheckBody,
} from '@hubtack/contracts/corrections/check.js';
import {
  mountPointList,
  mountPointQuery,
  type MountPointList,
  type MountPointQuery,
} from '@hubtack/contracts/corrections/mount-point.js';
import { AllowRoles, CurrentViewer, type Viewer } from '../auth/access.js';
import { CorrectionChecksService } from './correction-checks.service.js';
import { MountPointsService } from './mount-points.service.js';

@ApiTags('correction sources')
@Controller('correction-sources/:id')
export class CorrectionChecksController {
  constructor(
    private readonly checks: CorrectionChecksService,
    private readonly mountPoints: MountPointsService,
  ) {}

  /** Begins a check; ask for it again while its status is running. One at a time for each source. */
  @Post('checks')
  @AllowRoles('dispatcher', 'technician')
  @ApiCreatedResponse({ standardSchema: correctionCheck })
  start(
    @CurrentViewer() viewer: Viewer,
    @Param('id', { schema: idParam }) id: number,
    @Body({ schema: startCheckBody }) body: StartCheckBody,
  ): CorrectionCheck {
    return this.checks.start(viewer, id, body);
  }

  @Get('checks')
  @AllowRoles('dispatcher', 'technician')
  @ApiOkResponse({ standardSchema: correctionCheckList })
  list(@Param('id', { schema: idParam }) id: number): CorrectionCheckList {
    return this.checks.list(id);
  }

  @Get('checks/:checkId')
  @AllowRoles('dispatcher', 'technician')
  @ApiOkResponse({ standardSchema: correctionCheck })
  get(
    @Param('id', { schema: idParam }) id: number,
    @Param('checkId', { schema: idParam }) checkId: number,
  ): CorrectionCheck {
    return this.checks.get(id, checkId);
  }

  @Delete('checks/:checkId')
  @HttpCode(204)
  @AllowRoles('dispatcher', 'technician')
  @ApiNoContentResponse()
  cancel(
    @Param('id', { schema: idParam }) id: number,
    @Param('checkId', { schema: idParam }) checkId: number,
  ): void {
    this.checks.cancel(id, checkId);
  }

  /** Asks the caster for its source table, at most once a minute. */
  @Get('mount-points')
  @AllowRoles('dispatcher', 'technician')
  @ApiOkResponse({ standardSchema: mountPointList })
  listMountPoints(
    @CurrentViewer() viewer: Viewer,
    @Param('id', { schema: idParam }) id: number,
    @Query({ schema: mountPointQuery }) query: MountPointQuery,
  ): Promise<MountPointList> {
    return this.mountPoints.list(viewer, id, query);
  }
}
