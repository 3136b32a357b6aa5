import { Module, type MiddlewareConsumer, type NestModule } from '@nestjs/common';
import { json, raw } from 'express';
import { FixesModule } from '../fixes/fixes.module.js';
import { IngestController } from './ingest.controller.js';
import { IngestService } from './ingest.service.js';
import { NmeaTcpListener } from './nmea-tcp.listener.js';
import { RoverKeyMiddleware } from './rover-key.middleware.js';
import { RoverKeyService } from './rover-key.service.js';

const LARGEST_POST = '5mb';

/** The ways in for rovers. Bodies are read here and nowhere else, after the key is known. */
@Module({
  imports: [FixesModule],
  controllers: [IngestController],
  providers: [IngestService, RoverKeyService, NmeaTcpListener],
  exports: [NmeaTcpListener],
})
export class IngestModule implements NestModule {
  configure(consumer: MiddlewareConsumer): void {
    consumer
      .apply(
        RoverKeyMiddleware,
        raw({ type: 'text/plain', limit: LARGEST_POST }),
        json({ limit: LARGEST_POST }),
      )
      .forRoutes(IngestController);
  }
}
