import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { roles, type ViewerRole } from '@hubtack/contracts/auth/role.js';
import { Client } from '../harness/client.js';
import { PASSWORD, startServer, type TestServer } from '../harness/server.js';

type Access = ViewerRole[] | 'anyone' | 'roverKey' | 'metricsToken' | undefined;
interface Route {
  method: string;
  path: string;
  access: Access;
}

let server: TestServer;
let routes: Route[];
let ownCrew: number;
let otherCrew: number;
let ownRover: number;
let otherRover: number;
let otherSite: number;

beforeAll(async () => {
  server = await startServer();
  const manager = await server.as('manager');
  const site = await manager.json<{ id: number }>('POST', '/api/sites', {
    name: 'Foreign site',
    latitude: null,
    longitude: null,
    note: null,
  });
  otherSite = site.id;
  ownCrew = await server.makeCrew('Own crew');
  otherCrew = await server.makeCrew('Foreign crew', {
    siteId: otherSite,
    phone: '0491 570 156',
    hourlyRate: 99,
  });
  ownRover = (await server.makeRover('R-own', ownCrew)).id;
  otherRover = (await server.makeRover('R-foreign', otherCrew)).id;
  const document = await manager.json<{ paths: Record<string, Record<string, { 'x-access'?: Access }>> }>(
    'GET',
    '/api/openapi.json',
  );
  routes = Object.entries(document.paths).flatMap(([path, methods]) =>
    Object.entries(methods).map(([method, route]) => ({
      method: method.toUpperCase(),
      path,
      access: route['x-access'],
    })),
  );
});
afterAll(() => server.close());

async function as(role: ViewerRole | 'nobody'): Promise<Client> {
  if (role === 'nobody') return new Client(server.url);
  if (role !== 'display') return role === 'crewChief' ? server.as(role, ownCrew) : server.as(role);
  const { token } = await (
    await server.as('manager')
  ).json<{ token: string }>('POST', '/api/displays', { name: 'Wall' });
  const display = new Client(server.url);
  await display.json('POST', '/api/displays/open', { token });
  return display;
}

/** The status alone: a stream is let go as soon as it has begun. */
async function statusOf(client: Client, { method, path }: Route, id = ownRover): Promise<number> {
  const filled = path.replace('{token}', 'x'.repeat(30)).replaceAll(/\{\w+\}/g, String(id));
  const response = await client.call(
    method,
    filled,
    method === 'GET' || method === 'DELETE' ? undefined : {},
  );
  await response.body?.cancel();
  return response.status;
}

describe('every route says who may', () => {
  it('there are routes, and none is silent about it', () => {
    expect(routes.length).toBeGreaterThan(40);
    expect(routes.filter(({ access }) => access === undefined)).toEqual([]);
  });

  it.each(['nobody', 'display', ...roles] as const)('as %s', async (role) => {
    const wrong: string[] = [];
    for (const route of routes) {
      if (!Array.isArray(route.access)) continue;
      // A sign-in of its own for each call: signing out is one of the routes.
      const client = route.path.endsWith('sign-out') ? await fresh(role) : await as(role);
      const status = await statusOf(client, route);
      const isRefused = status === 401 || status === 403;
      const isOpen = role !== 'nobody' && route.access.includes(role);
      if (isRefused === isOpen) wrong.push(`${route.method} ${route.path} answers ${status}`);
    }
    expect(wrong).toEqual([]);
  });
});

async function fresh(role: ViewerRole | 'nobody'): Promise<Client> {
  if (role === 'nobody' || role === 'display') return as(role);
  await as(role);
  const email = `${role}${role === 'crewChief' ? ownCrew : ''}@pennywort.example`.toLowerCase();
  const client = new Client(server.url);
  await client.signIn(email, PASSWORD);
  return client;
}

describe('a crew chief reaches the own crew only', () => {
  /** What to ask for by id that belongs to another crew. A new route with an id must be entered here. */
  const foreign: Record<string, () => number> = {
    '/api/crews/{id}': () => otherCrew,
    '/api/sites/{id}': () => otherSite,
    '/api/rovers/{id}': () => otherRover,
    '/api/rovers/{id}/timeline': () => otherRover,
    '/api/rovers/{id}/epochs': () => otherRover,
  };
  const window = '?from=2026-01-01T00:00:00Z&to=2026-01-01T01:00:00Z';

  it('by id: another crew\u2019s does not exist, the own does', async () => {
    const chief = await as('crewChief');
    const open = routes.filter(
      ({ access, path }) => Array.isArray(access) && access.includes('crewChief') && path.includes('{'),
    );
    expect(open.map(({ path }) => path).filter((path) => !(path in foreign))).toEqual([]);
    for (const { path } of open) {
      const theirs = path.replace('{id}', String(foreign[path]!()));
      expect((await chief.call('GET', theirs + window)).status, theirs).toBe(404);
    }
    for (const path of ['', '/timeline', '/epochs'])
      expect((await chief.call('GET', `/api/rovers/${ownRover}${path}${window}`)).status).toBe(200);
    expect((await chief.call('GET', `/api/crews/${ownCrew}`)).status).toBe(200);
  });

  it('in lists: nothing of another crew shows anywhere', async () => {
    const chief = await as('crewChief');
    const lists = routes.filter(
      ({ method, access, path }) =>
        method === 'GET' &&
        Array.isArray(access) &&
        access.includes('crewChief') &&
        !path.includes('{') &&
        !path.endsWith('/stream'),
    );
    expect(lists.length).toBeGreaterThan(5);
    for (const { path } of lists) {
      const text = await (await chief.call('GET', path)).text();
      expect(text, path).not.toMatch(/foreign|0491 570 156/i);
    }
  });

  it('money is the manager\u2019s business', async () => {
    const rates = async (client: Client) =>
      (await client.json<{ hourlyRate: number | null }[]>('GET', '/api/crews')).map(
        ({ hourlyRate }) => hourlyRate,
      );
    expect(await rates(await server.as('manager'))).toContain(99);
    expect(await rates(await server.as('dispatcher'))).toEqual([null, null]);
  });
});
