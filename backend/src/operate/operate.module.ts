import { Module } from '@nestjs/common';
import { AuthModule } from '../auth/auth.module.js';
import { CorrectionsModule } from '../corrections/corrections.module.js';
import { SettingsModule } from '../settings/settings.module.js';
import { ShiftsModule } from '../shifts/shifts.module.js';
import { LostFixesModule } from '../lost-fixes/lost-fixes.module.js';
import { RoversModule } from '../rovers/rovers.module.js';
import { WeeklyModule } from '../weekly/weekly.module.js';
import { DemoPastService } from './demo-past.service.js';
import { DemoService } from './demo.service.js';
import { RetentionService } from './retention.service.js';

@Module({
  imports: [
    AuthModule,
    CorrectionsModule,
    SettingsModule,
    ShiftsModule,
    LostFixesModule,
    RoversModule,
    WeeklyModule,
  ],
  providers: [DemoPastService, DemoService, RetentionService],
  exports: [RetentionService],
})
export class OperateModule {}
