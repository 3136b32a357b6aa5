import { Module } from '@nestjs/common';
import { FixesModule } from '../fixes/fixes.module.js';
import { RoversModule } from '../rovers/rovers.module.js';
import { SettingsModule } from '../settings/settings.module.js';
import { ShiftsModule } from '../shifts/shifts.module.js';
import { DiagnosisService } from './diagnosis.service.js';
import { EpisodeKeeper } from './episode.keeper.js';
import { EvidenceReader } from './evidence.reader.js';
import { LostFixAccess } from './lost-fix.access.js';
import { LostFixRepository } from './lost-fix.repository.js';
import { LostFixWatch } from './lost-fix.watch.js';
import { LostFixWriter } from './lost-fix.writer.js';
import { LostFixesController } from './lost-fixes.controller.js';
import { LostFixesService } from './lost-fixes.service.js';
import { NearMountPoints } from './near-mount-points.js';
import { OutageKeeper } from './outage.keeper.js';

/** Lost fixes: raised by the timeline, explained, and answered by people. */
@Module({
  imports: [FixesModule, ShiftsModule, RoversModule, SettingsModule],
  controllers: [LostFixesController],
  providers: [
    LostFixRepository,
    LostFixWriter,
    LostFixAccess,
    EvidenceReader,
    OutageKeeper,
    DiagnosisService,
    EpisodeKeeper,
    LostFixWatch,
    NearMountPoints,
    LostFixesService,
  ],
  exports: [EpisodeKeeper, LostFixesService, LostFixAccess, LostFixRepository, LostFixWatch],
})
export class LostFixesModule {}
