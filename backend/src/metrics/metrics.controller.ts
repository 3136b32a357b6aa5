import { timingSafeEqual } from 'node:crypto';
import { Controller, Get, Inject, Req, Res } from '@nestjs/common';
import { ApiBearerAuth, ApiProduces, ApiTags } from '@nestjs/swagger';
import type { Request, Response } from 'express';
import { AllowMetricsToken } from '../auth/access.js';
import { ProblemException } from '../common/problem.exception.js';
import { ENVIRONMENT } from '../config/config.module.js';
import type { Environment } from '../config/environment.js';
import { MetricsService } from './metrics.service.js';

const isLoopback = (address: string | undefined): boolean =>
  address === '::1' || address?.replace('::ffff:', '').startsWith('127.') === true;

const sameText = (given: string, wanted: string): boolean => {
  const [left, right] = [Buffer.from(given), Buffer.from(wanted)];
  return left.length === right.length && timingSafeEqual(left, right);
};

@ApiTags('metrics')
@ApiBearerAuth()
@Controller('metrics')
export class MetricsController {
  constructor(
    private readonly metrics: MetricsService,
    @Inject(ENVIRONMENT) private readonly environment: Environment,
  ) {}

  /** Prometheus text. With METRICS_TOKEN set, for who has it; without, from this machine only. */
  @Get()
  @AllowMetricsToken()
  @ApiProduces('text/plain')
  async read(@Req() request: Request, @Res() response: Response): Promise<void> {
    const { METRICS_TOKEN } = this.environment;
    const allowed =
      METRICS_TOKEN === undefined
        ? isLoopback(request.socket.remoteAddress)
        : sameText(request.headers.authorization ?? '', `Bearer ${METRICS_TOKEN}`);
    if (!allowed) throw new ProblemException(401, 'unauthenticated', 'Send the metrics token.');
    const { registry } = this.metrics;
    response.type(registry.contentType).send(await registry.metrics());
  }
}
