import { Module } from '@nestjs/common';
import { ControlPointsController } from './control-points.controller.js';
import { ControlPointsService } from './control-points.service.js';

@Module({ controllers: [ControlPointsController], providers: [ControlPointsService] })
export class ControlPointsModule {}
