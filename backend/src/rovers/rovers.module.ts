import { Module } from '@nestjs/common';
import { FixesModule } from '../fixes/fixes.module.js';
import { RosterRepository } from './roster.repository.js';
import { RoverAssignmentsService } from './rover-assignments.service.js';
import { RoverKeysService } from './rover-keys.service.js';
import { RoversController } from './rovers.controller.js';
import { RoversService } from './rovers.service.js';

@Module({
  imports: [FixesModule],
  controllers: [RoversController],
  providers: [RoversService, RoverKeysService, RoverAssignmentsService, RosterRepository],
  exports: [RosterRepository],
})
export class RoversModule {}
