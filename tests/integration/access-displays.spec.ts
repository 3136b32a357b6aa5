import type { DisplayLink, IssuedDisplayLink } from '@hubtack/contracts/displays/display-link.js';
import { displayLinks } from '@hubtack/drizzle/schema/display-links.js';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { Client } from '../harness/client.js';
import { startServer, type TestServer } from '../harness/server.js';
import { StreamReading } from '../harness/stream-reader.js';

let server: TestServer;
let manager: Client;
beforeAll(async () => {
  server = await startServer();
  manager = await server.as('manager');
});
afterAll(() => server.close());

const make = (name: string) => manager.json<IssuedDisplayLink>('POST', '/api/displays', { name });
const open = (token: string, client = new Client(server.url)) =>
  client.call('POST', '/api/displays/open', { token });

it('a display link is told once; later it has only a name', async () => {
  const { id, token } = await make('Front office');
  const list = await manager.json<DisplayLink[]>('GET', '/api/displays');
  expect(list.find((link) => link.id === id)).toMatchObject({ name: 'Front office', lastOpenedAt: null });
  expect(JSON.stringify(list)).not.toContain(token);
  expect(JSON.stringify(server.database.select().from(displayLinks).all())).not.toContain(token);
});

it('signs a screen in for months: the short-lived cookie is renewed', async () => {
  const { token } = await make('Depot');
  const screen = new Client(server.url);
  expect(await (await open(token, screen)).json()).toMatchObject({
    role: 'display',
    name: 'Depot',
    userId: null,
    email: null,
  });
  server.clock.advance(200 * 86_400_000);
  expect((await screen.call('POST', '/api/auth/refresh')).status).toBe(200);
  expect((await screen.call('GET', '/api/board')).status).toBe(200);
  server.clock.run();
});

it('taken back, it is over at once: board, stream, renewing, and the link itself', async () => {
  const { id, token } = await make('Lost tablet');
  const screen = new Client(server.url);
  await open(token, screen);
  const other = new Client(server.url);
  await open((await make('Other')).token, other);
  const stream = await StreamReading.open(screen);
  expect((await manager.call('DELETE', `/api/displays/${id}`)).status).toBe(204);
  await stream.waitForEnd();
  expect((await screen.call('GET', '/api/board')).status).toBe(401);
  // 204 tells a browser's EventSource not to come back.
  expect((await screen.call('GET', '/api/board/stream')).status).toBe(204);
  expect((await screen.call('POST', '/api/auth/refresh')).status).toBe(401);
  const again = await open(token);
  expect([again.status, ((await again.json()) as { code: string }).code]).toEqual([410, 'linkInvalid']);
  expect((await other.call('GET', '/api/board')).status).toBe(200);
  expect((await manager.call('DELETE', `/api/displays/${id}`)).status).toBe(404);
});
