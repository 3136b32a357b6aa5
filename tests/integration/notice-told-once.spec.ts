import { Changes } from '@hubtack/backend/common/changes.js';
import { NoticeRepository } from '@hubtack/backend/notices/notice.repository.js';
import { NoticesService, type Told } from '@hubtack/backend/notices/notices.service.js';
import type { Notice } from '@hubtack/contracts/notices/notice.js';
import { lostFixHistory, lostFixes } from '@hubtack/drizzle/schema/lost-fixes.js';
import { notices } from '@hubtack/drizzle/schema/notices.js';
import { outbox } from '@hubtack/drizzle/schema/outbox.js';
import { users } from '@hubtack/drizzle/schema/users.js';
import { eq } from 'drizzle-orm';
import { afterEach, beforeEach, expect, it } from 'vitest';
import type { Client } from '../harness/client.js';
import { startServer, type TestServer } from '../harness/server.js';
import { until } from '../harness/until.js';

const MINUTE = 60_000;
let server: TestServer;
let dispatcher: Client;
let chief: Client;
let otherChief: Client;
let crewId: number;
let roverId: number;
let told: Told[];
beforeEach(async () => {
  server = await startServer();
  server.clock.set(Date.UTC(2026, 9, 5, 1));
  dispatcher = await server.as('dispatcher');
  crewId = await server.makeCrew('Dogwood');
  roverId = (await server.makeRover('R-04', crewId)).id;
  chief = await server.as('crewChief', crewId);
  otherChief = await server.as('crewChief', await server.makeCrew('Alder'));
  told = [];
  server.app.get(NoticesService).told.subscribe((one) => told.push(one));
});
afterEach(() => server.close());

const list = (client: Client) => client.json<Notice[]>('GET', '/api/notices');
const texts = async (client: Client) => (await list(client)).map(({ text }) => text);
const announce = (lostFixId: number) =>
  server.app.get(Changes).announce({ kind: 'lostFix', lostFixIds: [lostFixId] });
function raise(change: Partial<typeof lostFixes.$inferInsert> = {}): number {
  const now = server.clock.now();
  const { id } = server.database
    .insert(lostFixes)
    .values({ kind: 'mountPoint', mountPoint: 'TANF00', startAt: now - 30_000, raisedAt: now, ...change })
    .returning()
    .get();
  announce(id);
  return id;
}
const advise = (lostFixId: number, text: string) => {
  const at = server.clock.now();
  server.database
    .insert(lostFixHistory)
    .values({ lostFixId, at, by: 'Dispatcher', kind: 'advice', text })
    .run();
  announce(lostFixId);
};
const evidence = ['2 of 2 rovers on TANF00 lost their corrections together'];
const diagnosis = { cause: 'mountPointDown' as const, evidence, runnerUp: null, at: 0 };

it('told at once to whom it concerns, listed for each, and mailed; seen when they say so', async () => {
  const id = raise({ diagnosis });
  await until(async () => expect(await texts(dispatcher)).toHaveLength(1));
  const [notice] = await list(dispatcher);
  expect(notice).toMatchObject({
    subject: 'mountPoint',
    kind: 'mountPoint',
    lostFixId: id,
    at: server.clock.now(),
    ways: ['board', 'sound', 'mail'],
    text: 'Corrections stopped at mount point TANF00. 2 of 2 rovers on TANF00 lost their corrections together.',
    seenAt: null,
  });
  expect(await texts(await server.as('manager'))).toHaveLength(1);
  expect(await texts(chief)).toEqual([]);
  // The technician is not there yet, and nobody who cannot sign in is told.
  expect(told.map(({ notice }) => notice.ways.join()).toSorted()).toEqual(['board', 'board,sound,mail']);
  const mails = server.database.select().from(outbox).all();
  expect(mails).toMatchObject([
    {
      to: 'dispatcher@pennywort.example',
      subject: 'Corrections stopped at mount point TANF00',
      sentAt: null,
    },
  ]);

  await dispatcher.json('POST', '/api/notices/seen', { upTo: notice!.id + 100 });
  expect((await list(dispatcher))[0]!.seenAt).toBe(server.clock.now());
  expect((await list(await server.as('manager')))[0]!.seenAt).toBeNull();
});

it('minutes later by the clock alone, and nothing twice, whatever is announced or restarted', async () => {
  const rules = [
    { subject: 'mountPoint', way: 'board', afterMinutes: 0 },
    { subject: 'mountPoint', way: 'mail', afterMinutes: 5 },
  ];
  await dispatcher.json('PUT', '/api/notice-rules', rules);
  const id = raise();
  await until(async () => expect(await texts(dispatcher)).toHaveLength(1));
  server.clock.advance(5 * MINUTE);
  await until(async () => expect(await texts(dispatcher)).toHaveLength(2));
  // A start looks at everything anew.
  server.app.get(NoticesService).onApplicationBootstrap();
  announce(id);
  await dispatcher.json('PUT', '/api/notice-rules', rules);
  server.app.get(NoticesService).run();
  expect((await list(dispatcher)).map(({ ways }) => ways)).toEqual([['mail'], ['board']]);
  expect(server.database.select().from(outbox).all()).toHaveLength(1);
});

it('one that ended, or was closed, before its minutes were up is not told', async () => {
  await dispatcher.json('PUT', '/api/notice-rules', [
    { subject: 'mountPoint', way: 'board', afterMinutes: 5 },
  ]);
  const now = server.clock.now();
  const ended = raise();
  const closed = raise();
  const open = raise();
  server.database
    .update(lostFixes)
    .set({ endAt: now + MINUTE, ending: 'regained' })
    .where(eq(lostFixes.id, ended))
    .run();
  server.database
    .update(lostFixes)
    .set({ closedAt: now + MINUTE })
    .where(eq(lostFixes.id, closed))
    .run();
  server.clock.advance(6 * MINUTE);
  await until(async () => expect(await list(dispatcher)).toHaveLength(1));
  expect((await list(dispatcher))[0]!.lostFixId).toBe(open);
});

it('advice reaches the crew it is for, also on the mount point that theirs hangs under', async () => {
  const mountPoint = raise();
  const own = raise({
    kind: 'flag',
    roverId,
    crewId,
    flagAt: server.clock.now(),
    flagWord: 'fixLooksWrong',
    sharedId: mountPoint,
  });
  advise(own, 'Check shot on nail 12');
  await until(async () =>
    expect(await texts(chief)).toEqual(['Advice for Dogwood (R-04): Check shot on nail 12']),
  );
  advise(mountPoint, 'Switch to QUARB2, 8.4 km');
  await until(async () =>
    expect((await texts(chief))[0]).toBe('Advice for mount point TANF00: Switch to QUARB2, 8.4 km'),
  );
  advise(own, 'And again');
  await until(async () => expect(await texts(chief)).toHaveLength(3));
  expect(await texts(otherChief)).toEqual([]);
  const mine = told.filter(({ notice }) => notice.subject === 'advice');
  expect(mine.map(({ notice }) => notice.text)).toEqual((await texts(chief)).toReversed());
});

it('a mail stands or falls with its notice', async () => {
  server.database.$client.exec(
    "CREATE TRIGGER no_mail BEFORE INSERT ON outbox BEGIN SELECT RAISE(ABORT, 'disk is full'); END",
  );
  raise();
  server.app.get(NoticesService).run();
  expect(await texts(dispatcher)).toEqual([]);
  expect(told).toEqual([]);
  server.database.$client.exec('DROP TRIGGER no_mail');
  await until(async () => expect(await texts(dispatcher)).toHaveLength(1));
  expect(server.database.select().from(outbox).all()).toHaveLength(1);
});

it('who was only invited, or is switched off, is told nothing', async () => {
  const email = 'dispatcher@pennywort.example';
  server.database.update(users).set({ active: false }).where(eq(users.email, email)).run();
  const values = { name: 'New', email: 'new@pennywort.example', role: 'dispatcher' as const, createdAt: 0 };
  server.database.insert(users).values(values).run();
  raise();
  await until(() => expect(told).toHaveLength(1));
  const manager = server.database.select().from(users).where(eq(users.role, 'manager')).get()!;
  expect(told[0]!.userId).toBe(manager.id);
});

it('what was told of a lost fix is found among a long past by its key', () => {
  const id = raise();
  const userId = server.database.select().from(users).all()[0]!.id;
  const row = { userId, lostFixId: id, subject: 'flag' as const, at: 0, text: '', ways: [] };
  const keys = [`${id} flag 0`, `${id} advice 7 0`, `${id}0 flag 0`, `2${id} flag 0`];
  server.database
    .insert(notices)
    .values(keys.map((dueKey) => ({ ...row, dueKey })))
    .run();
  const found = server.app.get(NoticeRepository).told([userId, 999], [id, 12345]);
  expect([...found.get(userId)!].toSorted()).toEqual([keys[1], keys[0]]);
  const plan = server.database.$client
    .prepare(
      `EXPLAIN QUERY PLAN SELECT n.due_key FROM json_each('[1]') AS u CROSS JOIN json_each('[1]') AS l
       CROSS JOIN notices AS n ON n.user_id = u.value AND n.due_key > l.value || ' ' AND n.due_key < l.value || '!'`,
    )
    .all() as { detail: string }[];
  expect(plan.map(({ detail }) => detail).join()).toMatch(
    /INDEX notices_due \(user_id=\? AND due_key>\? AND due_key<\?\)/,
  );
});
