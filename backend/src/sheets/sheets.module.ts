import { Module } from '@nestjs/common';
import { FixesModule } from '../fixes/fixes.module.js';
import { LostFixesModule } from '../lost-fixes/lost-fixes.module.js';
import { MailModule } from '../mail/mail.module.js';
import { SettingsModule } from '../settings/settings.module.js';
import { ShiftsModule } from '../shifts/shifts.module.js';
import { WeeklyModule } from '../weekly/weekly.module.js';
import { CrewDayReader } from './crew-day.reader.js';
import { SubscriptionsController, WeeklyCsvController } from './sheets.controller.js';
import { SheetsService } from './sheets.service.js';
import { SubscriptionRepository } from './subscription.repository.js';
import { SubscriptionsService } from './subscriptions.service.js';

/** What goes out of the weekly figures: CSV, the week by mail, a crew's day by mail. */
@Module({
  imports: [FixesModule, ShiftsModule, LostFixesModule, SettingsModule, WeeklyModule, MailModule],
  controllers: [WeeklyCsvController, SubscriptionsController],
  providers: [SubscriptionRepository, SubscriptionsService, CrewDayReader, SheetsService],
})
export class SheetsModule {}
