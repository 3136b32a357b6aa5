import { Module } from '@nestjs/common';
import { FixesModule } from '../fixes/fixes.module.js';
import { IngestController } from './ingest.controller.js';
import { IngestService } from './ingest.service.js';
import { NmeaTcpListener } from './nmea-tcp.listener.js';
import { RoverKeyService } from './rover-key.service.js';

/** The ways in for rovers. */
@Module({
  imports: [FixesModule],
  controllers: [IngestController],
  providers: [IngestService, RoverKeyService, NmeaTcpListener],
  exports: [NmeaTcpListener],
})
export class IngestModule {}
