import { Body, Controller, Get, Put } from '@nestjs/common';
import { ApiOkResponse, ApiTags } from '@nestjs/swagger';
import {
  settings,
  settingsBody,
  type Settings,
  type SettingsBody,
} from '@hubtack/contracts/settings/settings.js';
import { AllowRoles, CurrentViewer, type Viewer } from '../auth/access.js';
import { SettingsService } from './settings.service.js';

@ApiTags('settings')
@Controller('settings')
export class SettingsController {
  constructor(private readonly service: SettingsService) {}

  @Get()
  @AllowRoles('dispatcher', 'technician', 'crewChief')
  @ApiOkResponse({ standardSchema: settings })
  get(): Settings {
    return this.service.get();
  }

  @Put()
  @AllowRoles()
  @ApiOkResponse({ standardSchema: settings })
  change(@CurrentViewer() viewer: Viewer, @Body({ schema: settingsBody }) body: SettingsBody): Settings {
    return this.service.change(viewer, body);
  }
}
