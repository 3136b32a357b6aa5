import { mkdtempSync, readFileSync, readdirSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { parseEnvironment } from '@hubtack/backend/config/environment.js';
import { MailService } from '@hubtack/backend/mail/mail.service.js';
import { OutboxService } from '@hubtack/backend/mail/outbox.service.js';
import { OutboxWorker } from '@hubtack/backend/mail/outbox.worker.js';
import { MetricsService } from '@hubtack/backend/metrics/metrics.service.js';
import { outbox } from '@hubtack/drizzle/schema/outbox.js';
import { makeTestDatabase } from '@hubtack/drizzle/testing/test-database.js';
import { startMailbox, type Mailbox } from '@hubtack/simulators/mailbox/mailbox.js';
import { Logger } from '@nestjs/common';
import { afterEach, beforeEach, expect, it } from 'vitest';
import { MovingClock } from '../harness/moving-clock.js';

const SECOND = 1000;
const MINUTE = 60 * SECOND;
const START = Date.UTC(2026, 9, 5);
let store: ReturnType<typeof makeTestDatabase>;
let clock: MovingClock;
let folder: string;
let mailbox: Mailbox;
let port: number;
const open = async () => {
  mailbox = await startMailbox({ folder, smtpPort: port });
};
// Mails that are not taken are logged; here that is the point.
Logger.overrideLogger(false);

beforeEach(async () => {
  store = makeTestDatabase();
  clock = new MovingClock();
  clock.set(START);
  folder = mkdtempSync(join(tmpdir(), 'hubtack-outbox-'));
  port = 0;
  await open();
  port = Number(new URL(mailbox.smtpUrl).port);
});
afterEach(async () => {
  await mailbox.close();
  store.remove();
  rmSync(folder, { recursive: true });
});

/** A server's worth of outbox: another one is the server after a restart. */
function server(smtpUrl: string | undefined = `smtp://127.0.0.1:${port}`) {
  const environment = parseEnvironment({ SMTP_URL: smtpUrl, MAIL_FROM: 'Board <board@pennywort.example>' });
  const service = new OutboxService(store.database, clock);
  const metrics = new MetricsService();
  const worker = new OutboxWorker(service, new MailService(environment), clock, metrics);
  const put = (subject: string, reason = subject) =>
    store.database.transaction((tx) =>
      service.put(tx, { reason, to: 'dispatcher@pennywort.example', subject, text: `${subject}: words` }),
    );
  const waiting = async () => (await metrics.outboxWaiting.get()).values[0]!.value;
  return { worker, put, waiting };
}
const subjects = () => mailbox.mails.map(({ subject }) => subject).toSorted();
const rows = () => store.database.select().from(outbox).all();

it('SMTP down for an hour, a restart in between: every mail arrives, once, and attempts grow rare', async () => {
  const first = server();
  await mailbox.close();
  for (let n = 0; n < 5; n++) first.put(`Before ${n}`);
  for (let second = 0; second < 1800; second += 5) {
    if (second === 600) first.put('Meanwhile');
    await first.worker.run();
    clock.advance(5 * SECOND);
  }
  expect(await first.waiting()).toBe(6);
  await first.worker.beforeApplicationShutdown();
  // One mail finds out for all of them: 30 s, 1, 2, 4, 8, 15 min, and once for the new one.
  expect(rows().reduce((sum, { tries }) => sum + tries, 0)).toBeLessThan(10);

  const second = server();
  for (let at = 0; at < 1800; at += 5) {
    await second.worker.run();
    clock.advance(5 * SECOND);
  }
  await open();
  for (let at = 0; at < 16 * 60; at += 5) {
    await second.worker.run();
    clock.advance(5 * SECOND);
  }
  expect(subjects()).toEqual(['Before 0', 'Before 1', 'Before 2', 'Before 3', 'Before 4', 'Meanwhile']);
  expect(mailbox.mails.find(({ subject }) => subject === 'Before 0')).toMatchObject({
    to: 'dispatcher@pennywort.example',
    text: 'Before 0: words\n',
  });
  expect(await second.waiting()).toBe(0);
});

it('a reason is good for one mail, whether it has gone out or not', async () => {
  const { worker, put } = server();
  put('One', 'the reason');
  put('Two', 'the reason');
  await worker.run();
  put('Three', 'the reason');
  await worker.run();
  expect(subjects()).toEqual(['One']);
});

it('what a failed transaction put in does not go out', async () => {
  const { worker } = server();
  const service = new OutboxService(store.database, clock);
  const mail = { reason: 'r', to: 'dispatcher@pennywort.example', subject: 'Never', text: '' };
  expect(() =>
    store.database.transaction((tx) => {
      service.put(tx, mail);
      throw new Error('undone');
    }),
  ).toThrow('undone');
  await worker.run();
  expect(subjects()).toEqual([]);
});

it('two runs at one time send each mail once', async () => {
  const { worker, put } = server();
  put('One');
  put('Two');
  await Promise.all([worker.run(), worker.run()]);
  expect(subjects()).toEqual(['One', 'Two']);
});

it('died between the mail server’s yes and writing it down: the second is the same mail by its Message-ID', async () => {
  const first = server();
  first.put('Once');
  await first.worker.run();
  // As the database stands when the process dies there.
  store.database.update(outbox).set({ sentAt: null }).run();
  clock.advance(MINUTE);
  await server().worker.run();
  const ids = readdirSync(folder).map(
    (name) => /^Message-ID: (.+)$/im.exec(readFileSync(join(folder, name), 'utf8'))?.[1],
  );
  expect(ids).toHaveLength(2);
  expect(ids[0]).toMatch(/^<\S+@pennywort\.example>\r?$/);
  expect(new Set(ids).size).toBe(1);
});

it('a database that refuses the note that a mail was taken does not send it again', async () => {
  const { worker, put } = server();
  put('Once');
  store.database.$client.exec(
    "CREATE TRIGGER full BEFORE UPDATE OF sent_at ON outbox BEGIN SELECT RAISE(ABORT, 'disk is full'); END",
  );
  await worker.run();
  store.database.$client.exec('DROP TRIGGER full');
  await worker.run();
  expect(subjects()).toEqual(['Once']);
  expect(rows()[0]!.sentAt).not.toBeNull();
});

it('without SMTP_URL mails wait; after three days nobody wants them', async () => {
  const { worker, put, waiting } = server('');
  put('Old');
  await worker.run();
  expect(await waiting()).toBe(1);
  clock.advance(71 * 60 * MINUTE);
  put('New');
  clock.advance(60 * MINUTE);
  const later = server();
  await later.worker.run();
  expect(subjects()).toEqual(['New']);
  expect(rows()[0]).toMatchObject({ sentAt: null, lastError: expect.stringMatching(/three days/) });
  expect(await later.waiting()).toBe(0);
});
