import { Body, Controller, Get, Put } from '@nestjs/common';
import { ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { holidays, type Holiday } from '@hubtack/contracts/settings/holidays.js';
import { AllowRoles, CurrentViewer, type Viewer } from '../auth/access.js';
import { HolidaysService } from './holidays.service.js';

@ApiTags('settings')
@Controller('holidays')
export class HolidaysController {
  constructor(private readonly service: HolidaysService) {}

  @Get()
  @AllowRoles('dispatcher', 'technician', 'crewChief')
  @ApiOkResponse({ standardSchema: holidays })
  list(): Holiday[] {
    return this.service.list();
  }

  /** The whole list: what is not on it is no holiday any more. */
  @Put()
  @AllowRoles()
  @ApiOkResponse({ standardSchema: holidays })
  replace(@CurrentViewer() viewer: Viewer, @Body({ schema: holidays }) body: Holiday[]): Holiday[] {
    return this.service.replace(viewer, body);
  }
}
