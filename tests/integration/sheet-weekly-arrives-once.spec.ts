import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { FiguresToDo } from '@hubtack/backend/fixes/figures-to-do.repository.js';
import { SheetsService } from '@hubtack/backend/sheets/sheets.service.js';
import { SubscriptionRepository } from '@hubtack/backend/sheets/subscription.repository.js';
import { FiguresKeeper } from '@hubtack/backend/weekly/figures.keeper.js';
import { percent } from '@hubtack/contracts/fixes/percent.js';
import { wholeOf } from '@hubtack/contracts/fixes/totals.js';
import { defaultLimits } from '@hubtack/contracts/lost-fixes/limits.js';
import type { Weekly } from '@hubtack/contracts/weekly/weekly.js';
import { outbox } from '@hubtack/drizzle/schema/outbox.js';
import { roverAssignments } from '@hubtack/drizzle/schema/rovers.js';
import { shifts } from '@hubtack/drizzle/schema/shifts.js';
import { spans } from '@hubtack/drizzle/schema/spans.js';
import { users } from '@hubtack/drizzle/schema/users.js';
import { startMailbox, type Mailbox } from '@hubtack/simulators/mailbox/mailbox.js';
import { eq } from 'drizzle-orm';
import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import { startServer, type TestServer } from '../harness/server.js';

const MINUTE = 60_000;
const HOUR = 60 * MINUTE;
/** A local time of the firm's zone, which is at +11 all these days. */
const at = (text: string): number => Date.parse(`${text}+11:00`);
const WEEK = '2026-W49';

let folder: string;
let databaseFile: string;
let mailbox: Mailbox;
let server: TestServer;
const others: TestServer[] = [];

const start = () =>
  startServer({
    DATABASE_FILE: databaseFile,
    SMTP_URL: mailbox.smtpUrl,
    PUBLIC_URL: 'https://board.pennywort.example',
  });
/** Another server on the same database. It answers no cookies. */
const another = async (time: string): Promise<TestServer> => {
  const one = await start();
  others.push(one);
  one.clock.set(at(time));
  return one;
};

beforeEach(async () => {
  folder = mkdtempSync(join(tmpdir(), 'hubtack-sheets-'));
  databaseFile = join(folder, 'hubtack.sqlite');
  mailbox = await startMailbox({});
  server = await start();
  server.clock.set(at('2026-12-04T18:00'));
  const manager = await server.as('manager');
  await manager.json('PUT', '/api/settings', {
    firmName: 'Pennywort Surveys',
    timeZone: 'Australia/Hobart',
    units: 'metric',
    currency: 'AUD',
    keepPositionsOffShift: false,
    limits: defaultLimits,
    weeklyMailHour: 7,
  });
  const dispatcher = await server.as('dispatcher');
  for (const person of [manager, dispatcher])
    await person.json('PUT', '/api/subscriptions', { sheets: ['weekly'] });
});
afterEach(async () => {
  for (const one of others.splice(0)) await one.close();
  await server.close();
  await mailbox.close();
  rmSync(folder, { recursive: true, force: true });
});

/** A crew's day of Wednesday: 8 h 0 min 1.5 s on shift, an hour of it in float. */
async function oneShift(): Promise<void> {
  const crewId = await server.makeCrew('Dogwood & "Sons"', { hourlyRate: 120 });
  const { id: roverId } = await server.makeRover('R-04');
  const from = at('2026-12-02T07:00');
  const to = from + 8 * HOUR + 1500;
  const { database } = server;
  database
    .insert(roverAssignments)
    .values({ roverId, crewId, startAt: from - HOUR })
    .run();
  database.insert(shifts).values({ crewId, startAt: from, endAt: to }).run();
  const float = { start: from + 2 * HOUR, end: from + 3 * HOUR };
  database
    .insert(spans)
    .values([
      { roverId, state: 'fixed', start: from, end: float.start },
      { roverId, state: 'float', ...float },
      { roverId, state: 'fixed', start: float.end, end: to },
    ])
    .run();
  server.app.get(FiguresToDo).add({ roverId, start: from, end: to });
  server.app.get(FiguresKeeper).flush();
}

const look = (one: TestServer, time: string) => {
  one.clock.set(at(time));
  one.app.get(SheetsService).look();
};
const put = () =>
  server.database
    .select({ reason: outbox.reason, to: outbox.to })
    .from(outbox)
    .all()
    .filter(({ reason }) => reason.startsWith('weekly'));
const userId = (email: string) =>
  server.database.select().from(users).where(eq(users.email, email)).get()!.id;

it('arrives on Monday at the hour by itself, and says in both parts what the page says', async () => {
  await oneShift();
  const page = await (await server.as('manager')).json<Weekly>('GET', `/api/weekly?week=${WEEK}`);
  server.clock.set(at('2026-12-07T07:00'));
  const mail = await mailbox.waitFor(({ to }) => to.startsWith('manager@'));
  const { totals, cost } = page.total;
  const uptime = percent(totals.fixedMs, wholeOf(totals));
  expect(uptime).toBe('87.5 %');
  expect(cost).toBe(120);
  expect(mail.subject).toBe('Week 49: 87.5 % fix uptime - Pennywort Surveys');
  for (const part of [mail.text, mail.html!]) {
    expect(part).toContain(page.sentence);
    expect(part).toContain(uptime);
    expect(part).toContain('AUD 120.00');
    for (const time of ['8:00:01.500', '7:00:01.500', '1:00:00.000']) expect(part).toContain(time);
    expect(part).toContain(`https://board.pennywort.example/weekly?week=${WEEK}`);
    expect(part).toContain('not all of it was lost work');
  }
  expect(mail.text).toContain('Dogwood & "Sons": 87.5 %');
  expect(mail.html).toContain('Dogwood &amp; &quot;Sons&quot;');
  const other = await mailbox.waitFor(({ to }) => to.startsWith('dispatcher@'));
  expect(other.text).toContain(uptime);
  expect(`${other.text}${other.html}`).not.toContain('AUD');
});

it('once, however often the clock is looked at and the server starts again', async () => {
  look(server, '2026-12-07T06:59:59');
  expect(put()).toEqual([]);
  look(server, '2026-12-07T07:00');
  look(server, '2026-12-07T07:01');
  look(await another('2026-12-07T07:02'), '2026-12-07T07:03');
  look(await another('2026-12-09T23:00'), '2026-12-09T23:59');
  expect(put()).toEqual(
    ['manager', 'dispatcher'].map((role) => {
      const to = `${role}@pennywort.example`;
      return { reason: `weekly ${WEEK} user ${userId(to)}`, to };
    }),
  );
  await mailbox.waitFor(({ to }) => to.startsWith('dispatcher@'));
  expect(mailbox.mails.filter(({ to }) => to.startsWith('manager@'))).toHaveLength(1);
});

it('once, when two servers look in the same moment and neither sees the other’s', async () => {
  const second = await another('2026-12-07T07:00');
  vi.spyOn(second.app.get(SubscriptionRepository), 'isPut').mockReturnValue(false);
  look(server, '2026-12-07T07:00');
  look(second, '2026-12-07T07:00');
  expect(put()).toHaveLength(2);
});

it.each([
  ['Wednesday night', '2026-12-09T23:59', 2],
  ['Thursday', '2026-12-10T00:00', 0],
])('after a server that was down on Monday: looked at again on %s', async (_name, time, mails) => {
  look(server, time);
  expect(put()).toHaveLength(mails);
});

it('each week has its own; who has switched it off, was switched off or is now a crew chief gets none', async () => {
  look(server, '2026-12-07T07:00');
  server.clock.set(at('2026-12-04T19:00'));
  await (await server.as('manager')).json('PUT', '/api/subscriptions', { sheets: [] });
  look(server, '2026-12-14T07:00');
  expect(put().map(({ reason }) => reason.slice(0, 15))).toEqual([
    'weekly 2026-W49',
    'weekly 2026-W49',
    'weekly 2026-W50',
  ]);
  const dispatcher = eq(users.email, 'dispatcher@pennywort.example');
  server.database.update(users).set({ role: 'crewChief' }).where(dispatcher).run();
  look(server, '2026-12-21T07:00');
  server.database.update(users).set({ role: 'technician', active: false }).where(dispatcher).run();
  look(server, '2026-12-21T07:01');
  expect(put()).toHaveLength(3);
});

it('waits for figures that are being worked out again, but not for long', () => {
  vi.spyOn(server.app.get(FiguresToDo), 'some').mockReturnValue([{ roverId: 1, start: 0, end: 1 }]);
  look(server, '2026-12-07T07:00');
  look(server, '2026-12-07T07:09');
  expect(put()).toEqual([]);
  look(server, '2026-12-07T07:10');
  expect(put()).toHaveLength(2);
});
