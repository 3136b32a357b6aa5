import { Module } from '@nestjs/common';
import { CommitQueue } from './commit.queue.js';
import { EpochRepository } from './epoch.repository.js';
import { FiguresToDo } from './figures-to-do.repository.js';
import { FixesController } from './fixes.controller.js';
import { FixesService } from './fixes.service.js';
import { RoverAccessService } from './rover-access.service.js';
import { SpanRepository } from './span.repository.js';
import { TimelineWriter } from './timeline.writer.js';
import { TrackStore } from './track.store.js';

/** Epochs and the fix timeline: written by the ingest, read by the board and whoever counts fix time. */
@Module({
  controllers: [FixesController],
  providers: [
    EpochRepository,
    SpanRepository,
    TrackStore,
    FiguresToDo,
    TimelineWriter,
    CommitQueue,
    FixesService,
    RoverAccessService,
  ],
  exports: [CommitQueue, FixesService, RoverAccessService, FiguresToDo],
})
export class FixesModule {}
