import { Module } from '@nestjs/common';
import { MailModule } from '../mail/mail.module.js';
import { NoticeRulesController, OwnNoticeRulesController } from './notice-rules.controller.js';
import { NoticeRulesService } from './notice-rules.service.js';
import { NoticeRepository } from './notice.repository.js';
import { NoticesController } from './notices.controller.js';
import { NoticesService } from './notices.service.js';

@Module({
  imports: [MailModule],
  controllers: [NoticesController, OwnNoticeRulesController, NoticeRulesController],
  providers: [NoticeRepository, NoticeRulesService, NoticesService],
  exports: [NoticesService],
})
export class NoticesModule {}
