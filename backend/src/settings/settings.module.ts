import { Module } from '@nestjs/common';
import { HolidaysController } from './holidays.controller.js';
import { HolidaysService } from './holidays.service.js';
import { SettingsController } from './settings.controller.js';
import { SettingsService } from './settings.service.js';

@Module({
  controllers: [SettingsController, HolidaysController],
  providers: [SettingsService, HolidaysService],
  exports: [SettingsService, HolidaysService],
})
export class SettingsModule {}
