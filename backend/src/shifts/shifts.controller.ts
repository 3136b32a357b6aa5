import { Body, Controller, Delete, HttpCode, Param, Post, Put } from '@nestjs/common';
import { ApiCreatedResponse, ApiNoContentResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { idParam } from '@hubtack/contracts/common.js';
import { shift, shiftBody, type Shift, type ShiftBody } from '@hubtack/contracts/shifts/shift.js';
import { AllowRoles, CurrentViewer, type Viewer } from '../auth/access.js';
import { ShiftMarksService } from './shift-marks.service.js';

/** Marks set right afterwards, by the office. */
@ApiTags('shifts')
@Controller()
export class ShiftsController {
  constructor(private readonly marks: ShiftMarksService) {}

  @Post('crews/:id/shifts')
  @AllowRoles('dispatcher')
  @ApiCreatedResponse({ standardSchema: shift })
  add(
    @CurrentViewer() viewer: Viewer,
    @Param('id', { schema: idParam }) id: number,
    @Body({ schema: shiftBody }) body: ShiftBody,
  ): Shift {
    return this.marks.add(viewer, id, body);
  }

  @Put('shifts/:id')
  @AllowRoles('dispatcher')
  @ApiOkResponse({ standardSchema: shift })
  change(
    @CurrentViewer() viewer: Viewer,
    @Param('id', { schema: idParam }) id: number,
    @Body({ schema: shiftBody }) body: ShiftBody,
  ): Shift {
    return this.marks.change(viewer, id, body);
  }

  @Delete('shifts/:id')
  @HttpCode(204)
  @AllowRoles('dispatcher')
  @ApiNoContentResponse()
  remove(@CurrentViewer() viewer: Viewer, @Param('id', { schema: idParam }) id: number): void {
    this.marks.remove(viewer, id);
  }
}
