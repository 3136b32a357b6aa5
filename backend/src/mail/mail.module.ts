import { Module } from '@nestjs/common';
import { MailService } from './mail.service.js';
import { OutboxService } from './outbox.service.js';
import { OutboxWorker } from './outbox.worker.js';

@Module({ providers: [MailService, OutboxService, OutboxWorker], exports: [MailService, OutboxService] })
export class MailModule {}
