import { Module } from '@nestjs/common';
import { FixesModule } from '../fixes/fixes.module.js';
import { CheckRunner } from './check-runner.js';
import { CorrectionChecksController } from './correction-checks.controller.js';
import { CorrectionChecksService } from './correction-checks.service.js';
import { CorrectionSourcesController } from './correction-sources.controller.js';
import { CorrectionSourcesRepository } from './correction-sources.repository.js';
import { CorrectionSourcesService } from './correction-sources.service.js';
import { CorrectionWatch } from './correction-watch.js';
import { MountPointsService } from './mount-points.service.js';
import { CorrectionPasswords } from './passwords.js';
import { Places } from './places.js';
import { RunningChecks } from './running-checks.js';

@Module({
  imports: [FixesModule],
  controllers: [CorrectionSourcesController, CorrectionChecksController],
  providers: [
    CorrectionSourcesRepository,
    CorrectionSourcesService,
    CorrectionPasswords,
    CheckRunner,
    RunningChecks,
    Places,
    CorrectionChecksService,
    MountPointsService,
    CorrectionWatch,
  ],
  exports: [CorrectionPasswords],
})
export class CorrectionsModule {}
