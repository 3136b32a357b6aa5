import { Body, Controller, Get, Param, Post, Put } from '@nestjs/common';
import { ApiCreatedResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { idParam } from '@hubtack/contracts/common.js';
import {
  changeCrewBody,
  crew,
  crewBody,
  crewList,
  type ChangeCrewBody,
  type Crew,
  type CrewBody,
} from '@hubtack/contracts/crews/crew.js';
import { AllowRoles, CurrentViewer, type Viewer } from '../auth/access.js';
import { CrewsService } from './crews.service.js';

@ApiTags('crews')
@Controller('crews')
export class CrewsController {
  constructor(private readonly crews: CrewsService) {}

  @Get()
  @AllowRoles('dispatcher', 'technician', 'crewChief')
  @ApiOkResponse({ standardSchema: crewList })
  list(@CurrentViewer() viewer: Viewer): Crew[] {
    return this.crews.list(viewer);
  }

  @Get(':id')
  @AllowRoles('dispatcher', 'technician', 'crewChief')
  @ApiOkResponse({ standardSchema: crew })
  get(@CurrentViewer() viewer: Viewer, @Param('id', { schema: idParam }) id: number): Crew {
    return this.crews.get(viewer, id);
  }

  @Post()
  @AllowRoles('dispatcher', 'technician')
  @ApiCreatedResponse({ standardSchema: crew })
  add(@CurrentViewer() viewer: Viewer, @Body({ schema: crewBody }) body: CrewBody): Crew {
    return this.crews.add(viewer, body);
  }

  @Put(':id')
  @AllowRoles('dispatcher', 'technician')
  @ApiOkResponse({ standardSchema: crew })
  change(
    @CurrentViewer() viewer: Viewer,
    @Param('id', { schema: idParam }) id: number,
    @Body({ schema: changeCrewBody }) body: ChangeCrewBody,
  ): Crew {
    return this.crews.change(viewer, id, body);
  }
}
