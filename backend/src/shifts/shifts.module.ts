import { Module } from '@nestjs/common';
import { FixesModule } from '../fixes/fixes.module.js';
import { SettingsModule } from '../settings/settings.module.js';
import { ShiftMarksRepository } from './shift-marks.repository.js';
import { ShiftMarksService } from './shift-marks.service.js';
import { ShiftsController } from './shifts.controller.js';
import { ShiftsService } from './shifts.service.js';

@Module({
  imports: [FixesModule, SettingsModule],
  controllers: [ShiftsController],
  providers: [ShiftsService, ShiftMarksService, ShiftMarksRepository],
  exports: [ShiftsService, ShiftMarksService, ShiftMarksRepository],
})
export class ShiftsModule {}
