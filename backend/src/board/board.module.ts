import { Module } from '@nestjs/common';
import { FixesModule } from '../fixes/fixes.module.js';
import { ShiftsModule } from '../shifts/shifts.module.js';
import { BoardController } from './board.controller.js';
import { BoardService } from './board.service.js';
import { LanesStore } from './lanes.store.js';
import { RosterRepository } from './roster.repository.js';

@Module({
  imports: [FixesModule, ShiftsModule],
  controllers: [BoardController],
  providers: [BoardService, LanesStore, RosterRepository],
})
export class BoardModule {}
