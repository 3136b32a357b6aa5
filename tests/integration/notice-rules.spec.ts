import { defaultNoticeRules, type NoticeRule } from '@hubtack/contracts/notices/notice.js';
import type { AuditList } from '@hubtack/contracts/audit/audit-entry.js';
import { users } from '@hubtack/drizzle/schema/users.js';
import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, expect, it } from 'vitest';
import type { Client } from '../harness/client.js';
import { startServer, type TestServer } from '../harness/server.js';

let server: TestServer;
let manager: Client;
let dispatcher: Client;
let dispatcherId: number;
beforeAll(async () => {
  server = await startServer();
  manager = await server.as('manager');
  dispatcher = await server.as('dispatcher');
  dispatcherId = server.database.select().from(users).where(eq(users.role, 'dispatcher')).get()!.id;
});
afterAll(() => server.close());

const own = '/api/notice-rules';
const theirs = () => `/api/users/${dispatcherId}/notice-rules`;
const byName = (rules: NoticeRule[]) =>
  rules.map(({ subject, way, afterMinutes }) => `${subject} ${way} ${afterMinutes}`).toSorted();
const audited = async () =>
  (await manager.json<AuditList>('GET', '/api/audit')).entries.filter(
    ({ action }) => action === 'noticeRules.changed',
  );

it('a person starts with the rules of the role, sets others, and may go back', async () => {
  expect(await dispatcher.json('GET', own)).toEqual(defaultNoticeRules.dispatcher);
  const rules: NoticeRule[] = [
    { subject: 'flag', way: 'speech', afterMinutes: 0 },
    { subject: 'lostFix', way: 'mail', afterMinutes: 20 },
  ];
  expect(byName(await dispatcher.json('PUT', own, rules))).toEqual(byName(rules));
  expect(byName(await dispatcher.json('GET', own))).toEqual(byName(rules));
  expect(await dispatcher.json('PUT', own, [])).toEqual([]);
  expect(await dispatcher.json('GET', own)).toEqual([]);
  expect(await dispatcher.json('DELETE', own)).toEqual(defaultNoticeRules.dispatcher);
  expect(await dispatcher.json('GET', own)).toEqual(defaultNoticeRules.dispatcher);
  expect(await audited()).toEqual([]);
});

it('a manager changes another’s, and the audit has what it was and what it is', async () => {
  const rules: NoticeRule[] = [{ subject: 'mountPoint', way: 'board', afterMinutes: 3 }];
  expect(await manager.json('PUT', theirs(), rules)).toEqual(rules);
  expect(await dispatcher.json('GET', own)).toEqual(rules);
  expect(await manager.json('GET', theirs())).toEqual(rules);
  await manager.json('DELETE', theirs());
  expect(await dispatcher.json('GET', own)).toEqual(defaultNoticeRules.dispatcher);
  const subject = 'dispatcher@pennywort.example';
  expect(await audited()).toMatchObject([
    { subject, before: { rules }, after: { rules: defaultNoticeRules.dispatcher } },
    { subject, before: { rules: defaultNoticeRules.dispatcher }, after: { rules } },
  ]);
});

it.each([
  ['a way that there is not', [{ subject: 'flag', way: 'pager', afterMinutes: 0 }], '/0/way'],
  ['minutes past eight hours', [{ subject: 'flag', way: 'mail', afterMinutes: 481 }], '/0/afterMinutes'],
  [
    'two for one subject and way',
    [0, 1].map((afterMinutes) => ({ subject: 'flag', way: 'mail', afterMinutes })),
    '',
  ],
])('%s is refused beside its cause, and the rules stay', async (_name, rules, pointer) => {
  const before = await dispatcher.json('GET', own);
  const answer = await dispatcher.call('PUT', own, rules);
  expect(answer.status).toBe(400);
  const problem = (await answer.json()) as { code: string; errors: { pointer: string }[] };
  expect(problem.code).toBe('invalidBody');
  expect(problem.errors.map((error) => error.pointer)).toContain(pointer);
  expect(await dispatcher.json('GET', own)).toEqual(before);
});

it('nobody else reaches another’s rules; there are none of nobody', async () => {
  for (const method of ['GET', 'PUT', 'DELETE'])
    expect((await dispatcher.call(method, theirs(), method === 'PUT' ? [] : undefined)).status).toBe(403);
  expect((await manager.call('GET', '/api/users/99999/notice-rules')).status).toBe(404);
  expect((await manager.call('PUT', '/api/users/99999/notice-rules', [])).status).toBe(404);
});
