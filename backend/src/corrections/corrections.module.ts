import { Module } from '@nestjs/common';
import { CorrectionSourcesController } from './correction-sources.controller.js';
import { CorrectionSourcesService } from './correction-sources.service.js';

@Module({ controllers: [CorrectionSourcesController], providers: [CorrectionSourcesService] })
export class CorrectionsModule {}
