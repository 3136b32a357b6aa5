import { Module } from '@nestjs/common';
import { FixesModule } from '../fixes/fixes.module.js';
import { RoversModule } from '../rovers/rovers.module.js';
import { SettingsModule } from '../settings/settings.module.js';
import { CheckShotsController } from './check-shots.controller.js';
import { CheckShotsRepository } from './check-shots.repository.js';
import { CheckShotsService } from './check-shots.service.js';
import { RoverBadgesRepository } from './rover-badges.repository.js';
import { SetUpCardsController } from './set-up-cards.controller.js';
import { SetUpCardsRepository } from './set-up-cards.repository.js';
import { SetUpCardsService } from './set-up-cards.service.js';

@Module({
  imports: [FixesModule, RoversModule, SettingsModule],
  controllers: [SetUpCardsController, CheckShotsController],
  providers: [
    SetUpCardsRepository,
    SetUpCardsService,
    CheckShotsRepository,
    CheckShotsService,
    RoverBadgesRepository,
  ],
  exports: [RoverBadgesRepository],
})
export class SetUpModule {}
