import { Body, Controller, Delete, Get, HttpCode, Param, Post, Put } from '@nestjs/common';
import { ApiCreatedResponse, ApiNoContentResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { idParam } from '@hubtack/contracts/common.js';
import {
  assignRoverBody,
  changeRoverBody,
  issuedRoverKey,
  rover,
  roverAssignmentList,
  roverBody,
  roverKeyList,
  roverList,
  type AssignRoverBody,
  type ChangeRoverBody,
  type IssuedRoverKey,
  type Rover,
  type RoverAssignment,
  type RoverBody,
  type RoverKey,
} from '@hubtack/contracts/rovers/rover.js';
import { AllowRoles, CurrentViewer, type Viewer } from '../auth/access.js';
import { RoverAssignmentsService } from './rover-assignments.service.js';
import { RoverKeysService } from './rover-keys.service.js';
import { RoversService } from './rovers.service.js';

@ApiTags('rovers')
@Controller('rovers')
export class RoversController {
  constructor(
    private readonly rovers: RoversService,
    private readonly keys: RoverKeysService,
    private readonly assignments: RoverAssignmentsService,
  ) {}

  @Get()
  @AllowRoles('dispatcher', 'technician', 'crewChief')
  @ApiOkResponse({ standardSchema: roverList })
  list(@CurrentViewer() viewer: Viewer): Rover[] {
    return this.rovers.list(viewer);
  }

  @Get(':id')
  @AllowRoles('dispatcher', 'technician', 'crewChief')
  @ApiOkResponse({ standardSchema: rover })
  get(@CurrentViewer() viewer: Viewer, @Param('id', { schema: idParam }) id: number): Rover {
    return this.rovers.get(viewer, id);
  }

  @Post()
  @AllowRoles('technician')
  @ApiCreatedResponse({ standardSchema: rover })
  add(@CurrentViewer() viewer: Viewer, @Body({ schema: roverBody }) body: RoverBody): Rover {
    return this.rovers.add(viewer, body);
  }

  @Put(':id')
  @AllowRoles('technician')
  @ApiOkResponse({ standardSchema: rover })
  change(
    @CurrentViewer() viewer: Viewer,
    @Param('id', { schema: idParam }) id: number,
    @Body({ schema: changeRoverBody }) body: ChangeRoverBody,
  ): Rover {
    return this.rovers.change(viewer, id, body);
  }

  @Get(':id/keys')
  @AllowRoles('technician')
  @ApiOkResponse({ standardSchema: roverKeyList })
  listKeys(@Param('id', { schema: idParam }) id: number): RoverKey[] {
    return this.keys.list(id);
  }

  /** Issues a key. This answer is the only time that it is shown. */
  @Post(':id/key')
  @AllowRoles('technician')
  @ApiCreatedResponse({ standardSchema: issuedRoverKey })
  issueKey(@CurrentViewer() viewer: Viewer, @Param('id', { schema: idParam }) id: number): IssuedRoverKey {
    return this.keys.issue(viewer, id);
  }

  @Delete(':id/keys/:keyId')
  @HttpCode(204)
  @AllowRoles('technician')
  @ApiNoContentResponse()
  revokeKey(
    @CurrentViewer() viewer: Viewer,
    @Param('id', { schema: idParam }) id: number,
    @Param('keyId', { schema: idParam }) keyId: number,
  ): void {
    this.keys.revoke(viewer, id, keyId);
  }

  @Get(':id/assignments')
  @AllowRoles('dispatcher', 'technician')
  @ApiOkResponse({ standardSchema: roverAssignmentList })
  listAssignments(@Param('id', { schema: idParam }) id: number): RoverAssignment[] {
    return this.assignments.list(id);
  }

  @Post(':id/assignments')
  @AllowRoles('dispatcher', 'technician')
  @ApiCreatedResponse({ standardSchema: roverAssignmentList })
  assign(
    @CurrentViewer() viewer: Viewer,
    @Param('id', { schema: idParam }) id: number,
    @Body({ schema: assignRoverBody }) body: AssignRoverBody,
  ): RoverAssignment[] {
    return this.assignments.assign(viewer, id, body);
  }
}
