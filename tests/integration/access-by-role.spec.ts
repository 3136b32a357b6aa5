import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { roles, type ViewerRole } from '@hubtack/contracts/auth/role.js';
import { Client } from '../harness/client.js';
import { startServer, type TestServer } from '../harness/server.js';

type Access = ViewerRole[] | 'anyone' | 'roverKey' | 'metricsToken' | undefined;
interface Parameter {
  in: string;
  name: string;
  schema?: Record<string, unknown>;
}
interface Operation {
  'x-access'?: Access;
  parameters?: Parameter[];
  requestBody?: { content?: Record<string, { schema?: Record<string, unknown> }> };
  responses: Record<string, { content?: Record<string, { schema?: Record<string, unknown> }> }>;
}
interface Route {
  method: string;
  path: string;
  access: Access;
  operation: Operation;
}

let server: TestServer;
let routes: Route[];
let ownCrew: number;
let otherCrew: number;
let ownRover: number;
let otherRover: number;
let otherSite: number;
let ownLostFix: number;
let otherLostFix: number;
let otherCard: number;
let otherShot: number;

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
  const flag = async (roverId: number, note: string) =>
    (await manager.json<{ id: number }>('POST', '/api/lost-fixes', { roverId, word: 'underCover', note })).id;
  ownLostFix = await flag(ownRover, 'ours');
  otherLostFix = await flag(otherRover, 'foreign');
  const id = async (path: string, body: unknown) =>
    (await manager.json<{ id: number }>('POST', path, body)).id;
  otherCard = await id('/api/set-up-cards', {
    roverId: otherRover,
    poleHeightM: 1.8,
    measuringPoint: 'phaseCentre',
    antennaOffsetM: 0,
    tilt: 'off',
    correctionSourceId: null,
    messageFormat: 'any',
    toleranceProfile: null,
    checkedBy: 'Technician',
  });
  const mark = { latitude: -41.44, longitude: 147.14, heightKind: 'geoid' };
  otherShot = await id('/api/check-shots', {
    roverId: otherRover,
    controlPointId: await id('/api/control-points', {
      name: 'PM 1',
      ...mark,
      height: null,
      datum: null,
      note: null,
    }),
    measure: { from: 'typed', ...mark, heightM: null },
  });
  const document = await manager.json<{ paths: Record<string, Record<string, Operation>> }>(
    'GET',
    '/api/openapi.json',
  );
  routes = Object.entries(document.paths).flatMap(([path, methods]) =>
    Object.entries(methods).map(([method, operation]) => ({
      method: method.toUpperCase(),
      path,
      access: operation['x-access'],
      operation,
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

  const open = (to: (access: Access) => boolean) =>
    routes
      .filter(({ access }) => to(access))
      .map(({ method, path }) => `${method} ${path}`)
      .toSorted();

  // Written out on purpose: what nobody has to sign in for is worth a second thought each time it grows.
  it('without signing in: only what signing in itself, probes and rovers need', () => {
    expect(open((access) => access === 'anyone')).toEqual([
      'GET /api/auth/hints',
      'GET /api/auth/link/{token}',
      'GET /health/live',
      'GET /health/ready',
      'POST /api/auth/first-manager',
      'POST /api/auth/forgot',
      'POST /api/auth/password',
      'POST /api/auth/refresh',
      'POST /api/auth/sign-in',
      'POST /api/auth/sign-out',
      'POST /api/displays/open',
    ]);
    expect(open((access) => access === 'roverKey')).toEqual([
      'POST /api/ingest/epochs',
      'POST /api/ingest/nmea',
    ]);
    expect(open((access) => access === 'metricsToken')).toEqual(['GET /metrics']);
  });

  it('a display reads the board and nothing else', () => {
    expect(open((access) => Array.isArray(access) && access.includes('display'))).toEqual([
      'GET /api/auth/me',
      'GET /api/board',
      'GET /api/board/stream',
      'GET /api/board/today',
    ]);
  });

  // Written out on purpose: each is about the own crew, or the own person.
  it('a crew chief writes nothing of the firm\u2019s', () => {
    const written = open((access) => Array.isArray(access) && access.includes('crewChief'));
    expect(written.filter((route) => !route.startsWith('GET '))).toEqual([
      'DELETE /api/notice-rules',
      'POST /api/check-shots',
      'POST /api/check-shots/preview',
      'POST /api/crews/{id}/shift/{step}',
      'POST /api/lost-fixes',
      'POST /api/lost-fixes/{id}/photos',
      'POST /api/notices/seen',
      'POST /api/set-up-cards',
      'PUT /api/notice-rules',
      'PUT /api/subscriptions',
    ]);
  });

  it('people, displays and the audit are the manager\u2019s alone', () => {
    const strangers = routes.filter(
      ({ path, access }) =>
        /^\/api\/(users|displays|audit)/.test(path) && Array.isArray(access) && access.join() !== 'manager',
    );
    expect(strangers).toEqual([]);
  });

  it.each(['nobody', 'display', ...roles] as const)('as %s', async (role) => {
    const client = await as(role);
    const wrong: string[] = [];
    for (const route of routes) {
      if (!Array.isArray(route.access)) continue;
      const status = await statusOf(client, route);
      const isRefused = status === 401 || status === 403;
      const isOpen = role !== 'nobody' && route.access.includes(role);
      if (isRefused === isOpen) wrong.push(`${route.method} ${route.path} answers ${status}`);
    }
    expect(wrong).toEqual([]);
  });
});

describe('the document says all that a client needs', () => {
  const isEmpty = (schema: Record<string, unknown> | undefined) =>
    schema === undefined || Object.keys(schema).length === 0;

  it('names every part of a path, and the shape of every parameter', () => {
    const wrong = routes.flatMap(({ method, path, operation }) => {
      const parameters = operation.parameters ?? [];
      const named = parameters.filter((parameter) => parameter.in === 'path').map(({ name }) => `{${name}}`);
      const missing = (path.match(/\{\w+\}/g) ?? []).filter((part) => !named.includes(part));
      const shapeless = parameters.filter(({ schema }) => isEmpty(schema)).map(({ name }) => name);
      return [...missing, ...shapeless].map((name) => `${method} ${path}: ${name}`);
    });
    expect(wrong).toEqual([]);
  });

  it('gives the shape of every body that is asked for', () => {
    // These say all by their path and their cookies.
    const bodiless = [
      '/api/auth/refresh',
      '/api/auth/sign-out',
      '/api/users/{id}/invite',
      '/api/rovers/{id}/key',
      '/api/lost-fixes/{id}/take',
    ];
    const wrong = routes
      .filter(({ method, path }) => ['POST', 'PUT'].includes(method) && !bodiless.includes(path))
      .filter(({ operation }) => {
        const shapes = Object.values(operation.requestBody?.content ?? {});
        return shapes.length === 0 || shapes.some(({ schema }) => isEmpty(schema));
      });
    expect(wrong.map(({ method, path }) => `${method} ${path}`)).toEqual([]);
  });

  it('gives the shape of every answer that has a body', () => {
    // Text or pictures, not JSON: described by their own documents.
    const texts = [
      '/metrics',
      '/api/board/stream',
      '/api/lost-fixes/{id}/photos/{photoId}',
      '/api/weekly.csv',
    ];
    const wrong = routes
      .filter(({ path, operation }) => !texts.includes(path) && !operation.responses['204'])
      .filter(({ operation }) => {
        const answer = operation.responses['200'] ?? operation.responses['201'] ?? operation.responses['202'];
        return isEmpty(answer?.content?.['application/json']?.schema);
      });
    expect(wrong.map(({ method, path }) => `${method} ${path}`)).toEqual([]);
  });
});

describe('a crew chief reaches the own crew only', () => {
  /** What to ask for by id that belongs to another crew. A new route with an id must be entered here. */
  const foreign: Record<string, () => number> = {
    '/api/crews/{id}': () => otherCrew,
    '/api/sites/{id}': () => otherSite,
    '/api/rovers/{id}': () => otherRover,
    '/api/rovers/{id}/timeline': () => otherRover,
    '/api/rovers/{id}/epochs': () => otherRover,
    '/api/crews/{id}/day': () => otherCrew,
    '/api/crews/{id}/visits': () => otherCrew,
    '/api/crews/{id}/shift/{step}': () => otherCrew,
    '/api/lost-fixes/{id}': () => otherLostFix,
    '/api/set-up-cards/{id}': () => otherCard,
    '/api/check-shots/{id}': () => otherShot,
    '/api/lost-fixes/{id}/photos': () => otherLostFix,
    '/api/lost-fixes/{id}/photos/{photoId}': () => otherLostFix,
  };
  const window = '?from=2026-01-01T00:00:00Z&to=2026-01-01T01:00:00Z';

  it('by id: another crew\u2019s does not exist, the own does', async () => {
    const chief = await as('crewChief');
    const open = routes.filter(
      ({ access, path }) => Array.isArray(access) && access.includes('crewChief') && path.includes('{'),
    );
    expect(open.map(({ path }) => path).filter((path) => !(path in foreign))).toEqual([]);
    for (const { method, path } of open) {
      const theirs = path
        .replace('{id}', String(foreign[path]!()))
        .replace('{step}', 'start')
        .replace('{photoId}', '1');
      const body = method === 'GET' ? undefined : {};
      expect((await chief.call(method, theirs + window, body)).status, `${method} ${theirs}`).toBe(404);
    }
    const flag = { roverId: otherRover, word: 'underCover', note: null };
    expect((await chief.call('POST', '/api/lost-fixes', flag)).status).toBe(404);
    expect((await chief.call('GET', `/api/lost-fixes/${ownLostFix}`)).status).toBe(200);
    expect((await chief.call('GET', `/api/crews/${ownCrew}/day`)).status).toBe(200);
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
