import { Body, Controller, Get, Inject, Put } from '@nestjs/common';
import { ApiOkResponse, ApiTags } from '@nestjs/swagger';
import {
  settings,
  settingsBody,
  shownSettings,
  type Settings,
  type SettingsBody,
  type ShownSettings,
} from '@hubtack/contracts/settings/settings.js';
import { AllowRoles, CurrentViewer, type Viewer } from '../auth/access.js';
import { ENVIRONMENT } from '../config/config.module.js';
import type { Environment } from '../config/environment.js';
import { SettingsService } from './settings.service.js';

@ApiTags('settings')
@Controller('settings')
export class SettingsController {
  constructor(
    private readonly service: SettingsService,
    @Inject(ENVIRONMENT) private readonly environment: Environment,
  ) {}

  @Get()
  @AllowRoles('dispatcher', 'technician', 'crewChief')
  @ApiOkResponse({ standardSchema: shownSettings })
  get(): ShownSettings {
    return { ...this.service.get(), rawEpochDays: this.environment.RAW_EPOCH_DAYS };
  }

  @Put()
  @AllowRoles()
  @ApiOkResponse({ standardSchema: settings })
  change(@CurrentViewer() viewer: Viewer, @Body({ schema: settingsBody }) body: SettingsBody): Settings {
    return this.service.change(viewer, body);
  }
}
