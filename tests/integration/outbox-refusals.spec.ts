import { once } from 'node:events';
import { createServer, type AddressInfo, type Server } from 'node:net';
import { createInterface } from 'node:readline';
import { parseEnvironment } from '@hubtack/backend/config/environment.js';
import { MailService } from '@hubtack/backend/mail/mail.service.js';
import { OutboxService } from '@hubtack/backend/mail/outbox.service.js';
import { OutboxWorker } from '@hubtack/backend/mail/outbox.worker.js';
import { MetricsService } from '@hubtack/backend/metrics/metrics.service.js';
import { outbox } from '@hubtack/drizzle/schema/outbox.js';
import { makeTestDatabase } from '@hubtack/drizzle/testing/test-database.js';
import { Logger } from '@nestjs/common';
import { afterEach, beforeEach, expect, it } from 'vitest';
import { MovingClock } from '../harness/moving-clock.js';

const MINUTE = 60_000;
/** What the mail server says to RCPT TO, by address; anybody else is welcome. */
let answers: Record<string, string>;
let taken: string[];
/** Before the mail server says that it has taken a mail. */
let slowly: () => Promise<void>;
let smtp: Server;
let store: ReturnType<typeof makeTestDatabase>;
let clock: MovingClock;
let service: OutboxService;
let worker: OutboxWorker;

/** As much of an SMTP server (RFC 5321) as says no: the local mailbox takes everything. */
function startRefusing(): Server {
  return createServer((socket) => {
    let to = '';
    let inData = false;
    const say = (line: string) => socket.write(`${line}\r\n`);
    socket.on('error', () => undefined);
    createInterface({ input: socket }).on('line', (line) => {
      if (inData) {
        if (line !== '.') return;
        inData = false;
        taken.push(to);
        void slowly().then(() => say('250 taken'));
        return;
      }
      const command = line.slice(0, 4).toUpperCase();
      to = /^RCPT TO:<(.+?)>/i.exec(line)?.[1] ?? to;
      if (command === 'DATA') inData = true;
      if (command === 'RCPT') say(answers[to] ?? '250 welcome');
      else say({ DATA: '354 go on', QUIT: '221 bye' }[command] ?? '250 fine');
    });
    say('220 field.example');
  });
}

// Mails that are not taken are logged; here that is the point.
Logger.overrideLogger(false);

beforeEach(async () => {
  answers = {};
  taken = [];
  slowly = () => Promise.resolve();
  smtp = startRefusing().listen(0, '127.0.0.1');
  await once(smtp, 'listening');
  store = makeTestDatabase();
  clock = new MovingClock();
  clock.set(Date.UTC(2026, 9, 5));
  const SMTP_URL = `smtp://127.0.0.1:${(smtp.address() as AddressInfo).port}`;
  service = new OutboxService(store.database, clock);
  const mail = new MailService(parseEnvironment({ SMTP_URL }));
  worker = new OutboxWorker(service, mail, clock, new MetricsService());
});
afterEach(() => {
  smtp.close();
  store.remove();
});

const put = (to: string) => service.put(store.database, { reason: to, to, subject: 'News', text: 'News' });
const row = (to: string) =>
  store.database
    .select()
    .from(outbox)
    .all()
    .find((one) => one.to === to)!;

it('a recipient who does not exist: given up with the reason, the others get theirs', async () => {
  answers['gone@pennywort.example'] = '550 5.1.1 no such mailbox here';
  put('gone@pennywort.example');
  put('there@pennywort.example');
  await worker.run();
  expect(taken).toEqual(['there@pennywort.example']);
  expect(row('gone@pennywort.example')).toMatchObject({
    sentAt: null,
    failedAt: clock.now(),
    lastError: expect.stringContaining('no such mailbox here'),
  });
  clock.advance(24 * 60 * MINUTE);
  await worker.run();
  expect(row('gone@pennywort.example').tries).toBe(1);
});

it('a mailbox that is busy gets its mail later; the others need not wait for it', async () => {
  answers['busy@pennywort.example'] = '450 4.2.1 busy';
  put('busy@pennywort.example');
  put('there@pennywort.example');
  await worker.run();
  expect(taken).toEqual(['there@pennywort.example']);
  answers = {};
  await worker.run();
  expect(taken).toHaveLength(1);
  clock.advance(MINUTE / 2);
  await worker.run();
  expect(taken).toEqual(['there@pennywort.example', 'busy@pennywort.example']);
});

it('busy for three days: given up then, not before', async () => {
  answers['busy@pennywort.example'] = '450 4.2.1 busy';
  put('busy@pennywort.example');
  for (let hours = 0; hours < 72; hours++) {
    await worker.run();
    expect(row('busy@pennywort.example').failedAt).toBeNull();
    clock.advance(60 * MINUTE);
  }
  await worker.run();
  expect(row('busy@pennywort.example').failedAt).toBe(clock.now());
});

it('a mail that makes the server hang up keeps no other back', async () => {
  answers['poison@pennywort.example'] = '421 4.3.0 closing';
  put('poison@pennywort.example');
  await worker.run();
  clock.advance(MINUTE / 2);
  put('there@pennywort.example');
  await worker.run();
  expect(taken).toEqual(['there@pennywort.example']);
});

it('a server that stops waits for the mail in hand, and begins no other', async () => {
  let sayYes = () => {};
  const asked = new Promise<void>((resolve) => {
    slowly = () => {
      resolve();
      return new Promise((yes) => {
        sayYes = yes;
      });
    };
  });
  put('first@pennywort.example');
  put('second@pennywort.example');
  void worker.run();
  await asked;
  const stopped = worker.beforeApplicationShutdown();
  sayYes();
  await stopped;
  expect(row('first@pennywort.example').sentAt).toBe(clock.now());
  expect(row('second@pennywort.example').sentAt).toBeNull();
  expect(taken).toEqual(['first@pennywort.example']);
});
