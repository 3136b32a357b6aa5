import { Module } from '@nestjs/common';
import { FixesModule } from '../fixes/fixes.module.js';
import { RoversModule } from '../rovers/rovers.module.js';
import { SettingsModule } from '../settings/settings.module.js';
import { LogFiles } from './log.files.js';
import { LogHistory } from './log-history.js';
import { LogQueue } from './log.queue.js';
import { LogsController } from './logs.controller.js';
import { LogsRepository } from './logs.repository.js';
import { LogsService } from './logs.service.js';

/** Sentence logs that people upload: read in a thread of its own, one at a time. */
@Module({
  imports: [FixesModule, RoversModule, SettingsModule],
  controllers: [LogsController],
  providers: [LogsRepository, LogFiles, LogHistory, LogQueue, LogsService],
})
export class LogsModule {}
