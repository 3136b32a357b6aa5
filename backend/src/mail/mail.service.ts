import { Inject, Injectable, Logger } from '@nestjs/common';
import { createTransport, type Transporter } from 'nodemailer';
import { ENVIRONMENT } from '../config/config.module.js';
import type { Environment } from '../config/environment.js';
import type { Mail } from './mails.js';

/** A mail server that says nothing for this long is not there. */
const SILENCE_MS = 10_000;
/** Nothing that somebody waits for takes longer. */
const WAITED_FOR_MS = 10_000;
const LONGEST_MS = 120_000;

export interface OutgoingMail extends Mail {
  html?: string | undefined;
  /** The same at every attempt, so that a mail that arrives twice is seen to be one. */
  messageId?: string | undefined;
}

@Injectable()
export class MailService {
  private readonly logger = new Logger(MailService.name);
  private readonly transport: Transporter | null;

  constructor(@Inject(ENVIRONMENT) private readonly environment: Environment) {
    const { SMTP_URL } = environment;
    const patience = {
      connectionTimeout: SILENCE_MS,
      greetingTimeout: SILENCE_MS,
      socketTimeout: SILENCE_MS,
      dnsTimeout: SILENCE_MS,
    };
    this.transport = SMTP_URL
      ? createTransport({ ...patience, url: SMTP_URL }).on('error', (error: Error) =>
          this.logger.warn({ err: error }, 'mail transport'),
        )
      : null;
  }

  /** Whether there is a mail server to hand mails to. */
  get isSet(): boolean {
    return this.transport !== null;
  }

  /** What comes after the @ in our own addresses. */
  get domain(): string {
    return /@([^@>\s]+)/.exec(this.environment.MAIL_FROM)?.[1] ?? 'localhost';
  }

  /** Answers whether the mail server took it. A mail server that is down or not set is no error of the caller's. */
  async send(mail: Mail): Promise<boolean> {
    if (!this.transport) {
      this.logger.warn({ subject: mail.subject }, 'no SMTP_URL is set: mail not sent');
      return false;
    }
    try {
      await this.deliver(mail, WAITED_FOR_MS);
      return true;
    } catch (error) {
      this.logger.error({ err: error, subject: mail.subject }, 'mail not sent');
      return false;
    }
  }

  /** Hands one mail to the mail server; rejects with the transport's own error when it is not taken. */
  async deliver(mail: OutgoingMail, longestMs = LONGEST_MS): Promise<void> {
    if (!this.transport) throw new Error('no SMTP_URL is set');
    const signal = AbortSignal.timeout(longestMs);
    await this.transport.sendMail({ from: this.environment.MAIL_FROM, ...mail, signal });
  }
}
