import { mkdirSync, readdirSync, writeFileSync } from 'node:fs';
import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import { join } from 'node:path';
import { simpleParser, type ParsedMail } from 'mailparser';
import { SMTPServer } from 'smtp-server';

const LOOPBACK = '127.0.0.1';

export interface ReceivedMail {
  to: string;
  subject: string;
  text: string;
  html: string | null;
  receivedAt: string;
}

export interface Mailbox {
  smtpUrl: string;
  /** Address of the page that lists the mails; null without one. */
  pageUrl: string | null;
  mails: ReceivedMail[];
  /** Resolves with the first mail that fits, now or later. */
  waitFor: (fits: (mail: ReceivedMail) => boolean) => Promise<ReceivedMail>;
  close: () => Promise<void>;
}

const escape = (text: string): string =>
  text.replace(/&/g, '&amp;').replace(/</g, '&lt;').replace(/"/g, '&quot;');
const linked = (text: string): string => escape(text).replace(/https?:\/\/\S+/g, '<a href="$&">$&</a>');

function page(mails: readonly ReceivedMail[]): string {
  const items = mails
    .toReversed()
    .map(
      ({ to, subject, text }) =>
        `<article><h2>${escape(subject)}</h2><p>to ${escape(to)}</p><pre>${linked(text)}</pre></article>`,
    );
  return `<!doctype html><meta charset="utf-8"><title>Mailbox</title><h1>Mails (${mails.length})</h1>${items.join('')}`;
}

const receivedMail = (mail: ParsedMail): ReceivedMail => {
  const to = Array.isArray(mail.to) ? mail.to : mail.to ? [mail.to] : [];
  return {
    to: to.map(({ text }) => text).join(', '),
    subject: mail.subject ?? '',
    text: mail.text ?? '',
    html: mail.html || null,
    receivedAt: new Date().toISOString(),
  };
};

/** Mails of earlier runs stay: the number of the last one, 0 for a new folder. */
function lastNumberIn(folder: string): number {
  mkdirSync(folder, { recursive: true });
  return Math.max(0, ...readdirSync(folder).map((name) => Number(/^(\d+)\.eml$/.exec(name)?.[1] ?? 0)));
}

/** A real SMTP server, on loopback only, that keeps what it gets: the local stand-in for a mail provider. */
export async function startMailbox(options: {
  smtpPort?: number;
  pagePort?: number | null;
  folder?: string;
}): Promise<Mailbox> {
  const mails: ReceivedMail[] = [];
  const waiting: { fits: (mail: ReceivedMail) => boolean; resolve: (mail: ReceivedMail) => void }[] = [];
  let next = options.folder ? lastNumberIn(options.folder) + 1 : 1;
  const keep = (mail: ReceivedMail, raw: Buffer) => {
    mails.push(mail);
    if (options.folder)
      writeFileSync(join(options.folder, `${String(next++).padStart(4, '0')}.eml`), raw, { mode: 0o600 });
    for (const waiter of waiting) if (waiter.fits(mail)) waiter.resolve(mail);
  };
  const smtp = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS'],
    onData: (stream, _session, done) => {
      const chunks: Buffer[] = [];
      stream.on('data', (chunk: Buffer) => chunks.push(chunk));
      stream.on('end', () => {
        const raw = Buffer.concat(chunks);
        simpleParser(raw).then(
          (parsed) => {
            keep(receivedMail(parsed), raw);
            done();
          },
          (error: Error) => done(error),
        );
      });
    },
  });
  await new Promise<void>((resolve, reject) => {
    smtp.on('error', reject);
    smtp.listen(options.smtpPort ?? 0, LOOPBACK, () => resolve());
  });
  const smtpPort = (smtp.server.address() as AddressInfo).port;
  const web =
    options.pagePort == null
      ? null
      : createServer((request, response) => {
          const wantsJson = request.url === '/mails.json';
          response.setHeader('content-type', wantsJson ? 'application/json' : 'text/html; charset=utf-8');
          response.end(wantsJson ? JSON.stringify(mails) : page(mails));
        });
  if (web)
    await new Promise<void>((resolve, reject) => {
      web.once('error', reject);
      web.listen(options.pagePort ?? 0, LOOPBACK, resolve);
    });
  return {
    smtpUrl: `smtp://${LOOPBACK}:${smtpPort}`,
    pageUrl: web ? `http://${LOOPBACK}:${(web.address() as AddressInfo).port}` : null,
    mails,
    waitFor: (fits) =>
      new Promise((resolve) => {
        const there = mails.find(fits);
        if (there) resolve(there);
        else waiting.push({ fits, resolve });
      }),
    close: async () => {
      web?.closeAllConnections();
      web?.close();
      await new Promise<void>((resolve) => {
        smtp.close(() => resolve());
      });
    },
  };
}
