import { SheetsService } from '@hubtack/backend/sheets/sheets.service.js';
import { LostFixWatch } from '@hubtack/backend/lost-fixes/lost-fix.watch.js';
import { outbox } from '@hubtack/drizzle/schema/outbox.js';
import { startMailbox, type Mailbox } from '@hubtack/simulators/mailbox/mailbox.js';
import { afterEach, beforeEach, expect, it } from 'vitest';
import { postSentences, type Client, type TestRover } from '../harness/client.js';
import { gga } from '../harness/sentences.js';
import { startServer, type TestServer } from '../harness/server.js';

/** A Wednesday; the firm's zone is UTC until somebody says otherwise. */
const at = (clock: string): number => Date.parse(`2026-12-02T${clock}Z`);
const MINUTE = 60_000;

let mailbox: Mailbox;
let server: TestServer;
let crewId: number;
let rover: TestRover;
let chief: Client;
beforeEach(async () => {
  mailbox = await startMailbox({});
  server = await startServer({ SMTP_URL: mailbox.smtpUrl });
  server.clock.set(at('06:00:00'));
  crewId = await server.makeCrew('Dogwood');
  rover = await server.makeRover('R-04', crewId);
  chief = await server.as('crewChief', crewId);
  await chief.json('PUT', '/api/subscriptions', { sheets: ['daily'] });
});
afterEach(async () => {
  await server.close();
  await mailbox.close();
});

const step = async (name: string, clock: string, body: Record<string, unknown> = {}) => {
  server.clock.set(at(clock));
  await chief.json('POST', `/api/crews/${crewId}/shift/${name}`, body);
};
/** One epoch each five seconds: far enough apart to be quick, close enough to hold. */
async function report(from: string, to: string, quality: number): Promise<void> {
  const lines: string[] = [];
  for (let time = at(from); time < at(to); time += 5000) lines.push(gga(time, quality));
  server.clock.set(at(to));
  await postSentences(server.url, rover.key, lines.join(''), '?date=2026-12-02');
}
const look = (clock: string, dayLater = 0) => {
  server.clock.set(at(clock) + dayLater * 24 * 60 * MINUTE);
  server.app.get(SheetsService).look();
};
const put = () =>
  server.database
    .select({ reason: outbox.reason })
    .from(outbox)
    .all()
    .map(({ reason }) => reason)
    .filter((reason) => reason.startsWith('daily'));

it('a quarter of an hour after the shift is finished, the chief has the day, once', async () => {
  await step('start', '07:00:00');
  await report('07:00:00', '07:20:00', 4);
  await report('07:20:00', '07:30:00', 5);
  await step('pause', '07:30:00', { reason: 'lunch' });
  await step('resume', '07:50:00');
  await report('07:50:00', '08:00:00', 4);
  server.app.get(LostFixWatch).sweep();
  await step('finish', '08:00:00');
  look('08:14:59');
  expect(put()).toEqual([]);
  look('08:15:00');
  look('08:16:00');
  look('12:00:00');
  expect(put()).toEqual([expect.stringMatching(/^daily 2026-12-02 crew \d+ user \d+$/)]);
  const mail = await mailbox.waitFor(({ to }) => to.startsWith('crewchief'));
  expect(mail.subject).toBe('Dogwood, Wednesday 2 December 2026: 75.0 % fix uptime');
  for (const part of [mail.text, mail.html!]) {
    expect(part).toContain('75.0 % fix uptime in 40 min on shift; 1 lost fix.');
    expect(part).toContain('fixed 75.0 %, float 25.0 %');
    expect(part).toContain('07:20 Lost fix, R-04');
    expect(part).toContain('10 min 0 s, fix regained.');
    expect(part).toContain('First thing to try: ');
    expect(part).toContain('Waiting to be closed by the office');
  }
});

it('not while the shift runs or is paused, and not when it goes on after a finish by mistake', async () => {
  await step('start', '07:00:00');
  await step('finish', '08:00:00');
  await step('start', '08:10:00');
  look('08:30:00');
  await step('pause', '09:00:00', { reason: 'driving' });
  look('13:00:00');
  expect(put()).toEqual([]);
  await step('finish', '15:30:00');
  look('15:45:00');
  expect(put()).toHaveLength(1);
});

it('without marks it is the pattern that ends; each day has its own', async () => {
  const manager = await server.as('manager');
  const pattern = [3, 4].map((weekday) => ({ weekday, start: '07:00', end: '15:00' }));
  const crew = { name: 'Dogwood', phone: null, siteId: null, hourlyRate: null, active: true, pattern };
  await manager.json('PUT', `/api/crews/${crewId}`, crew);
  look('15:14:59');
  expect(put()).toEqual([]);
  look('15:15:00');
  look('10:00:00', 1);
  look('15:15:00', 1);
  expect(put().map((reason) => reason.slice(0, 16))).toEqual(['daily 2026-12-02', 'daily 2026-12-03']);
});

it('after a server that was down in the evening it still comes at night, but not the next afternoon', async () => {
  await step('start', '07:00:00');
  await step('finish', '15:00:00');
  look('03:01:00', 1);
  expect(put()).toEqual([]);
  look('23:00:00');
  expect(put()).toHaveLength(1);
});

it('no shift set, or switched off: nothing is sent', async () => {
  await report('07:00:00', '07:10:00', 4);
  look('10:00:00');
  await chief.json('PUT', '/api/subscriptions', { sheets: [] });
  await step('start', '10:10:00');
  await step('finish', '10:20:00');
  look('11:00:00');
  expect(put()).toEqual([]);
});
