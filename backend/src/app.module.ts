import { Module, type DynamicModule } from '@nestjs/common';
import { AuditModule } from './audit/audit.module.js';
import { ChangesModule } from './common/changes.js';
import { ClockModule } from './common/clock.js';
import { ConfigModule } from './config/config.module.js';
import type { Environment } from './config/environment.js';
import { DatabaseModule } from './database/database.module.js';

@Module({})
export class AppModule {
  static of(environment: Environment): DynamicModule {
    return {
      module: AppModule,
      imports: [ConfigModule.of(environment), DatabaseModule, ClockModule, ChangesModule, AuditModule],
    };
  }
}
