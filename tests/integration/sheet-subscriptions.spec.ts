import type { SubscriptionList } from '@hubtack/contracts/sheets/subscription.js';
import { afterAll, beforeAll, expect, it } from 'vitest';
import type { Client } from '../harness/client.js';
import { startServer, type TestServer } from '../harness/server.js';

const own = '/api/subscriptions';
let server: TestServer;
let crewId: number;
beforeAll(async () => {
  server = await startServer();
  crewId = await server.makeCrew('Dogwood');
});
afterAll(() => server.close());

const get = (client: Client) => client.json<SubscriptionList>('GET', own);
const set = (client: Client, sheets: string[]) => client.json<SubscriptionList>('PUT', own, { sheets });

it('nothing is sent until somebody asks for it; each has the own choice', async () => {
  const manager = await server.as('manager');
  expect(await get(manager)).toEqual({
    sheets: [{ sheet: 'weekly', isOn: false }],
    weeklyMailHour: 7,
    timeZone: 'UTC',
    isMailSet: false,
  });
  expect((await set(manager, ['weekly', 'weekly'])).sheets).toEqual([{ sheet: 'weekly', isOn: true }]);
  expect((await get(manager)).sheets).toEqual([{ sheet: 'weekly', isOn: true }]);
  expect((await get(await server.as('technician'))).sheets).toEqual([{ sheet: 'weekly', isOn: false }]);
  expect((await set(manager, [])).sheets).toEqual([{ sheet: 'weekly', isOn: false }]);
});

it('a crew chief may have the own crew’s day, and no week', async () => {
  const chief = await server.as('crewChief', crewId);
  expect((await set(chief, ['daily'])).sheets).toEqual([{ sheet: 'daily', isOn: true }]);
  const answer = await chief.call('PUT', own, { sheets: ['daily', 'weekly'] });
  expect(answer.status).toBe(400);
  expect(await answer.json()).toMatchObject({
    code: 'invalidBody',
    errors: [{ pointer: '/sheets/1', detail: 'The weekly sheet is not for your role' }],
  });
  expect((await get(chief)).sheets).toEqual([{ sheet: 'daily', isOn: true }]);
});

it('a sheet that there is not is refused beside its cause', async () => {
  const answer = await (await server.as('dispatcher')).call('PUT', own, { sheets: ['monthly'] });
  expect(answer.status).toBe(400);
  const { errors } = (await answer.json()) as { errors: { pointer: string }[] };
  expect(errors.map(({ pointer }) => pointer)).toEqual(['/sheets/0']);
});
