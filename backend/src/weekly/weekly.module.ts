import { Module } from '@nestjs/common';
import { FixesModule } from '../fixes/fixes.module.js';
import { RoversModule } from '../rovers/rovers.module.js';
import { SettingsModule } from '../settings/settings.module.js';
import { ShiftsModule } from '../shifts/shifts.module.js';
import { CrewProfiles } from './crew-profiles.js';
import { FiguresKeeper } from './figures.keeper.js';
import { LostTimeRepository } from './lost-time.repository.js';
import { PreviewService } from './preview.service.js';
import { ShiftFiguresRepository } from './shift-figures.repository.js';
import { WeeklyController } from './weekly.controller.js';
import { WeeklyService } from './weekly.service.js';

/** Figures of every rover-shift, and weeks as sums of them. */
@Module({
  imports: [FixesModule, ShiftsModule, RoversModule, SettingsModule],
  controllers: [WeeklyController],
  providers: [
    ShiftFiguresRepository,
    LostTimeRepository,
    CrewProfiles,
    FiguresKeeper,
    WeeklyService,
    PreviewService,
  ],
  exports: [WeeklyService, FiguresKeeper],
})
export class WeeklyModule {}
