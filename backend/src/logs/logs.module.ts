import type { Server } from 'node:http';
import { Module, type OnApplicationBootstrap } from '@nestjs/common';
import { HttpAdapterHost } from '@nestjs/core';
import { FixesModule } from '../fixes/fixes.module.js';
import { RoversModule } from '../rovers/rovers.module.js';
import { SettingsModule } from '../settings/settings.module.js';
import { LogFiles } from './log.files.js';
import { LogHistory } from './log-history.js';
import { LogQueue } from './log.queue.js';
import { LogsController } from './logs.controller.js';
import { LogsRepository } from './logs.repository.js';
import { LogsService } from './logs.service.js';

/** A hundred megabytes over a line of half a megabit a second; Node's own limit of five minutes would cut them off. */
const LONGEST_REQUEST_MS = 30 * 60_000;

/** Sentence logs that people upload: read in a thread of its own, one at a time. */
@Module({
  imports: [FixesModule, RoversModule, SettingsModule],
  controllers: [LogsController],
  providers: [LogsRepository, LogFiles, LogHistory, LogQueue, LogsService],
})
export class LogsModule implements OnApplicationBootstrap {
  constructor(private readonly adapter: HttpAdapterHost) {}

  onApplicationBootstrap(): void {
    (this.adapter.httpAdapter.getHttpServer() as Server).requestTimeout = LONGEST_REQUEST_MS;
  }
}
