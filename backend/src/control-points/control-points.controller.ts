import { Body, Controller, Get, Param, Post, Put } from '@nestjs/common';
import { ApiCreatedResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { idParam } from '@hubtack/contracts/common.js';
import {
  changeControlPointBody,
  controlPoint,
  controlPointBody,
  controlPointList,
  type ChangeControlPointBody,
  type ControlPoint,
  type ControlPointBody,
} from '@hubtack/contracts/control-points/control-point.js';
import { AllowRoles, CurrentViewer, type Viewer } from '../auth/access.js';
import { ControlPointsService } from './control-points.service.js';

@ApiTags('control points')
@Controller('control-points')
export class ControlPointsController {
  constructor(private readonly controlPoints: ControlPointsService) {}

  @Get()
  @AllowRoles('dispatcher', 'technician', 'crewChief')
  @ApiOkResponse({ standardSchema: controlPointList })
  list(@CurrentViewer() viewer: Viewer): ControlPoint[] {
    const all = this.controlPoints.list();
    return viewer.role === 'crewChief' ? all.filter(({ active }) => active) : all;
  }

  @Post()
  @AllowRoles('dispatcher', 'technician')
  @ApiCreatedResponse({ standardSchema: controlPoint })
  add(
    @CurrentViewer() viewer: Viewer,
    @Body({ schema: controlPointBody }) body: ControlPointBody,
  ): ControlPoint {
    return this.controlPoints.add(viewer, body);
  }

  @Put(':id')
  @AllowRoles('dispatcher', 'technician')
  @ApiOkResponse({ standardSchema: controlPoint })
  change(
    @CurrentViewer() viewer: Viewer,
    @Param('id', { schema: idParam }) id: number,
    @Body({ schema: changeControlPointBody }) body: ChangeControlPointBody,
  ): ControlPoint {
    return this.controlPoints.change(viewer, id, body);
  }
}
