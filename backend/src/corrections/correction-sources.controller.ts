import { Body, Controller, Get, Param, Post, Put } from '@nestjs/common';
import { ApiCreatedResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { idParam } from '@hubtack/contracts/common.js';
import {
  correctionSource,
  correctionSourceBody,
  correctionSourceList,
  type CorrectionSource,
  type CorrectionSourceBody,
} from '@hubtack/contracts/corrections/correction-source.js';
import { AllowRoles, CurrentViewer, type Viewer } from '../auth/access.js';
import { CorrectionSourcesService } from './correction-sources.service.js';

@ApiTags('correction sources')
@Controller('correction-sources')
export class CorrectionSourcesController {
  constructor(private readonly sources: CorrectionSourcesService) {}

  @Get()
  @AllowRoles('dispatcher', 'technician')
  @ApiOkResponse({ standardSchema: correctionSourceList })
  list(): CorrectionSource[] {
    return this.sources.list();
  }

  @Get(':id')
  @AllowRoles('dispatcher', 'technician')
  @ApiOkResponse({ standardSchema: correctionSource })
  get(@Param('id', { schema: idParam }) id: number): CorrectionSource {
    return this.sources.get(id);
  }

  @Post()
  @AllowRoles('technician')
  @ApiCreatedResponse({ standardSchema: correctionSource })
  add(
    @CurrentViewer() viewer: Viewer,
    @Body({ schema: correctionSourceBody }) body: CorrectionSourceBody,
  ): CorrectionSource {
    return this.sources.add(viewer, body);
  }

  @Put(':id')
  @AllowRoles('technician')
  @ApiOkResponse({ standardSchema: correctionSource })
  change(
    @CurrentViewer() viewer: Viewer,
    @Param('id', { schema: idParam }) id: number,
    @Body({ schema: correctionSourceBody }) body: CorrectionSourceBody,
  ): CorrectionSource {
    return this.sources.change(viewer, id, body);
  }
}
