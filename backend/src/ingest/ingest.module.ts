import { Module, type OnApplicationBootstrap } from '@nestjs/common';
import { HttpAdapterHost } from '@nestjs/core';
import type { Express } from 'express';
import { FixesModule } from '../fixes/fixes.module.js';
import { IngestController } from './ingest.controller.js';
import { IngestService } from './ingest.service.js';
import { NmeaTcpListener } from './nmea-tcp.listener.js';
import { roversFirst } from './rovers-first.js';
import { RoverKeyService } from './rover-key.service.js';

/** The ways in for rovers. */
@Module({
  imports: [FixesModule],
  controllers: [IngestController],
  providers: [IngestService, RoverKeyService, NmeaTcpListener],
  exports: [NmeaTcpListener],
})
export class IngestModule implements OnApplicationBootstrap {
  constructor(private readonly adapter: HttpAdapterHost) {}

  onApplicationBootstrap(): void {
    roversFirst(this.adapter.httpAdapter.getInstance<Express>());
  }
}
