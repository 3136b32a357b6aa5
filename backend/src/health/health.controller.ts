import { Controller, Get, Inject } from '@nestjs/common';
import {
  HealthCheck,
  HealthCheckService,
  HealthIndicatorService,
  type HealthCheckResult,
} from '@nestjs/terminus';
import { ApiTags } from '@nestjs/swagger';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { AllowAnyone } from '../auth/access.js';
import { DATABASE } from '../database/database.module.js';

@ApiTags('health')
@AllowAnyone()
@Controller('health')
export class HealthController {
  constructor(
    private readonly health: HealthCheckService,
    private readonly indicator: HealthIndicatorService,
    @Inject(DATABASE) private readonly database: HubtackDatabase,
  ) {}

  /** The process runs. */
  @Get('live')
  @HealthCheck()
  live(): Promise<HealthCheckResult> {
    return this.health.check([]);
  }

  /** It can do its work: the database takes a write. */
  @Get('ready')
  @HealthCheck()
  ready(): Promise<HealthCheckResult> {
    return this.health.check([() => this.databaseTakesWrites()]);
  }

  private databaseTakesWrites() {
    const check = this.indicator.check('database');
    const client = this.database.$client;
    try {
      client.exec('BEGIN IMMEDIATE');
      client.exec('ROLLBACK');
      return check.up();
    } catch (error) {
      return check.down({ code: (error as { code?: string }).code ?? 'unknown' });
    }
  }
}
