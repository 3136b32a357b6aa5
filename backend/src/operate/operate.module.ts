import { Module } from '@nestjs/common';
import { AuthModule } from '../auth/auth.module.js';
import { SettingsModule } from '../settings/settings.module.js';
import { ShiftsModule } from '../shifts/shifts.module.js';
import { DemoService } from './demo.service.js';
import { RetentionService } from './retention.service.js';

@Module({
  imports: [AuthModule, SettingsModule, ShiftsModule],
  providers: [DemoService, RetentionService],
  exports: [RetentionService],
})
export class OperateModule {}
