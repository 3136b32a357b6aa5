import { Module } from '@nestjs/common';
import { FixesModule } from '../fixes/fixes.module.js';
import { LostFixesModule } from '../lost-fixes/lost-fixes.module.js';
import { ShiftsModule } from '../shifts/shifts.module.js';
import { BoardController } from './board.controller.js';
import { BoardService } from './board.service.js';
import { LanesStore } from './lanes.store.js';
import { NoticesModule } from '../notices/notices.module.js';
import { SettingsModule } from '../settings/settings.module.js';
import { SetUpModule } from '../set-up/set-up.module.js';
import { RoversModule } from '../rovers/rovers.module.js';

@Module({
  imports: [
    FixesModule,
    ShiftsModule,
    RoversModule,
    SetUpModule,
    SettingsModule,
    LostFixesModule,
    NoticesModule,
  ],
  controllers: [BoardController],
  providers: [BoardService, LanesStore],
})
export class BoardModule {}
