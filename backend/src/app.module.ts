import { Module, type DynamicModule } from '@nestjs/common';
import { ScheduleModule } from '@nestjs/schedule';
import { LoggerModule } from 'nestjs-pino';
import { AuditModule } from './audit/audit.module.js';
import { AuthModule } from './auth/auth.module.js';
import { BoardModule } from './board/board.module.js';
import { ChangesModule } from './common/changes.js';
import { ClockModule } from './common/clock.js';
import { ConfigModule } from './config/config.module.js';
import type { Environment } from './config/environment.js';
import { ControlPointsModule } from './control-points/control-points.module.js';
import { CorrectionsModule } from './corrections/corrections.module.js';
import { CrewDayModule } from './crew-day/crew-day.module.js';
import { CrewsModule } from './crews/crews.module.js';
import { DatabaseModule } from './database/database.module.js';
import { DisplaysModule } from './displays/displays.module.js';
import { FixesModule } from './fixes/fixes.module.js';
import { HealthModule } from './health/health.module.js';
import { ImportsModule } from './imports/imports.module.js';
import { IngestModule } from './ingest/ingest.module.js';
import { LogsModule } from './logs/logs.module.js';
import { LostFixesModule } from './lost-fixes/lost-fixes.module.js';
import { MetricsModule } from './metrics/metrics.module.js';
import { NoticesModule } from './notices/notices.module.js';
import { loggingOf } from './operate/logging.js';
import { OperateModule } from './operate/operate.module.js';
import { PhotosModule } from './photos/photos.module.js';
import { RoversModule } from './rovers/rovers.module.js';
import { SetUpModule } from './set-up/set-up.module.js';
import { SettingsModule } from './settings/settings.module.js';
import { SheetsModule } from './sheets/sheets.module.js';
import { SitesModule } from './sites/sites.module.js';
import { TapsModule } from './taps/taps.module.js';
import { UsersModule } from './users/users.module.js';
import { WeeklyModule } from './weekly/weekly.module.js';

@Module({})
export class AppModule {
  static of(environment: Environment): DynamicModule {
    return {
      module: AppModule,
      imports: [
        ConfigModule.of(environment),
        LoggerModule.forRoot(loggingOf(environment)),
        ScheduleModule.forRoot(),
        DatabaseModule,
        ClockModule,
        ChangesModule,
        AuditModule,
        TapsModule,
        MetricsModule,
        AuthModule,
        UsersModule,
        DisplaysModule,
        SettingsModule,
        CrewsModule,
        SitesModule,
        ControlPointsModule,
        ImportsModule,
        RoversModule,
        CorrectionsModule,
        FixesModule,
        SetUpModule,
        IngestModule,
        LostFixesModule,
        PhotosModule,
        LogsModule,
        CrewDayModule,
        WeeklyModule,
        SheetsModule,
        NoticesModule,
        BoardModule,
        HealthModule,
        OperateModule,
      ],
    };
  }
}
