import { Inject, Injectable, Logger } from '@nestjs/common';
import { createTransport, type Transporter } from 'nodemailer';
import { ENVIRONMENT } from '../config/config.module.js';
import type { Environment } from '../config/environment.js';
import type { Mail } from './mails.js';

const TIMEOUT_MS = 10_000;

@Injectable()
export class MailService {
  private readonly logger = new Logger(MailService.name);
  private readonly transport: Transporter | null;

  constructor(@Inject(ENVIRONMENT) private readonly environment: Environment) {
    const { SMTP_URL } = environment;
    this.transport = SMTP_URL
      ? createTransport(SMTP_URL, {}).on('error', (error: Error) =>
          this.logger.warn({ err: error }, 'mail transport'),
        )
      : null;
  }

  /** Answers whether the mail server took it. A mail server that is down or not set is no error of the caller's. */
  async send(mail: Mail): Promise<boolean> {
    if (!this.transport) {
      this.logger.warn({ subject: mail.subject }, 'no SMTP_URL is set: mail not sent');
      return false;
    }
    const tooLong = AbortSignal.timeout(TIMEOUT_MS);
    try {
      await Promise.race([
        this.transport.sendMail({ from: this.environment.MAIL_FROM, ...mail }),
        new Promise((_, reject) => {
          tooLong.addEventListener('abort', () => reject(new Error('the mail server does not answer')), {
            once: true,
          });
        }),
      ]);
      return true;
    } catch (error) {
      this.logger.error({ err: error, subject: mail.subject }, 'mail not sent');
      return false;
    }
  }
}
