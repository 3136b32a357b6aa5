import { Module } from '@nestjs/common';
import { FixesModule } from '../fixes/fixes.module.js';
import { LostFixesModule } from '../lost-fixes/lost-fixes.module.js';
import { SettingsModule } from '../settings/settings.module.js';
import { ShiftsModule } from '../shifts/shifts.module.js';
import { CrewDayController } from './crew-day.controller.js';
import { CrewDayService } from './crew-day.service.js';

@Module({
  imports: [FixesModule, ShiftsModule, LostFixesModule, SettingsModule],
  controllers: [CrewDayController],
  providers: [CrewDayService],
})
export class CrewDayModule {}
