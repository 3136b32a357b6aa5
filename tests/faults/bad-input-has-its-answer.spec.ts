import { connect } from 'node:net';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { postSentences, type TestRover } from '../harness/client.js';
import { gga } from '../harness/sentences.js';
import { startServer, type TestServer } from '../harness/server.js';
import { until } from '../harness/until.js';

let server: TestServer;
let rover: TestRover;
let second = 0;
beforeAll(async () => {
  server = await startServer();
  rover = await server.makeRover();
});
afterAll(() => server.close());

/** A good sentence that has not been sent before. */
const good = () => gga(Math.floor(Date.now() / 1000) * 1000 - 1_000_000 + 1000 * second++);
const post = (body: string | Uint8Array, query = '') => postSentences(server.url, rover.key, body, query);
const reasons = (body: Record<string, unknown>) =>
  (body.reasons as { line: number; code: string }[]).map(({ line, code }) => [line, code]);
const bytes = (text: string) => new TextEncoder().encode(text);

describe('over HTTP', () => {
  it.each([
    ['no key', {}, 401, 'roverKeyUnknown'],
    ['a wrong key', { authorization: 'Bearer nope' }, 401, 'roverKeyUnknown'],
    [
      'a wrong content type',
      { authorization: 'KEY', 'content-type': 'application/json' },
      415,
      'unsupportedMediaType',
    ],
    [
      'a content encoding',
      { authorization: 'KEY', 'content-type': 'text/plain', 'content-encoding': 'gzip' },
      415,
      'unsupportedMediaType',
    ],
  ])('%s', async (_what, headers, status, code) => {
    const filled = Object.fromEntries(
      Object.entries(headers).map(([name, value]) => [name, value === 'KEY' ? `Bearer ${rover.key}` : value]),
    );
    const response = await fetch(`${server.url}/api/ingest/nmea`, {
      method: 'POST',
      headers: filled,
      body: good(),
    });
    expect(response.status).toBe(status);
    expect(response.headers.get('content-type')).toContain('application/problem+json');
    expect(((await response.json()) as { code: string }).code).toBe(code);
  });
  it('a revoked key, at once; the other key of the rover goes on', async () => {
    const manager = await server.as('manager');
    const { id, key } = await manager.json<{ id: number; key: string }>(
      'POST',
      `/api/rovers/${rover.id}/key`,
    );
    expect((await postSentences(server.url, key, good())).status).toBe(200);
    await manager.json('DELETE', `/api/rovers/${rover.id}/keys/${id}`);
    const answer = await postSentences(server.url, key, good());
    expect([answer.status, answer.body.code]).toEqual([401, 'roverKeyRevoked']);
    expect((await post(good())).status).toBe(200);
  });
  it('six megabytes', async () => {
    const { status, body } = await post(new Uint8Array(6 * 1024 * 1024));
    expect([status, body.code]).toEqual([413, 'tooLarge']);
  });
  it('six megabytes without saying so beforehand', async () => {
    const megabyte = new Uint8Array(1024 * 1024);
    async function* pieces() {
      for (let piece = 0; piece < 6; piece++) yield megabyte;
    }
    const response = await fetch(`${server.url}/api/ingest/nmea`, {
      method: 'POST',
      headers: { authorization: `Bearer ${rover.key}`, 'content-type': 'text/plain' },
      body: pieces() as never,
      duplex: 'half',
    } as RequestInit);
    expect(response.status).toBe(413);
  });
  it('binary rubbish, nothing at all, and half a sentence alone', async () => {
    const rubbish = Uint8Array.from({ length: 5000 }, (_, index) => (index * 197 + 13) % 256);
    for (const body of [rubbish, '', good().slice(0, 30)])
      expect(await post(body).then(({ status, body: { code } }) => [status, code])).toEqual([
        400,
        'unreadable',
      ]);
  });
  it('a bad line never costs a good one', async () => {
    const broken = good().replace(/\*../, '*00');
    const body = [
      good(),
      broken,
      good(),
      `$GPGGA,${'9'.repeat(1_000_000)}\r\n`,
      good(),
      good().slice(0, 40),
    ].join('');
    const answer = await post(body);
    expect(answer).toMatchObject({ status: 200, body: { accepted: 3, rejected: 3 } });
    expect(reasons(answer.body)).toEqual([
      [2, 'badChecksum'],
      [4, 'tooLong'],
      [6, 'cutShort'],
    ]);
  });
  it('bytes of another protocol between sentences', async () => {
    const frame = Uint8Array.from([0xb5, 0x62, 0x01, 0x07, 0x24, 0x00, 0x0a, 0xd3, 0x00]);
    const body = new Uint8Array([...frame, ...bytes(good()), ...frame, ...frame, ...bytes(good())]);
    expect((await post(body)).body).toMatchObject({ accepted: 2, rejected: 0 });
  });
  it('wrong dates, times ahead, and times too old to keep', async () => {
    for (const date of ['2026-13-01', '2026-02-30', 'yesterday'])
      expect((await post(good(), `?date=${date}`)).body).toMatchObject({ code: 'invalidBody' });
    const ahead = await post(gga(Date.now() + 6 * 60_000));
    expect(reasons(ahead.body)).toEqual([[1, 'inFuture']]);
    const slightlyAhead = await post(gga(Math.floor(Date.now() / 1000) * 1000 + 4 * 60_000));
    expect(slightlyAhead.body.accepted).toBe(1);
    const old = await post(gga(Date.parse('2020-03-18T10:00:00Z')), '?date=2020-03-18');
    expect(reasons(old.body)).toEqual([[1, 'tooOld']]);
  });
  it('at most twenty reasons, all counted', async () => {
    const broken = Array.from({ length: 30 }, () => good().replace(/\*../, '*00')).join('');
    const { body } = await post(good() + broken);
    expect(body.rejected).toBe(30);
    expect(body.reasons).toHaveLength(20);
  });
  it('the server\u2019s clock jumps: sentences are dated by what it says then', async () => {
    server.clock.set(Date.parse('2026-03-10T00:00:05Z'));
    await post(gga(Date.parse('2026-03-09T23:59:59Z')));
    server.clock.set(Date.parse('2026-03-12T00:00:05Z'));
    const { body } = await post(gga(Date.parse('2026-03-11T23:59:59Z')));
    server.clock.run();
    expect(body).toMatchObject({ accepted: 1, duplicates: 0 });
  });
  it('epochs as JSON are judged one by one', async () => {
    const epochs = [
      { time: new Date(Date.now() - 5000).toISOString(), quality: 4 },
      { time: 'nonsense', quality: 4 },
      { time: new Date().toISOString(), quality: 44 },
    ];
    const response = await fetch(`${server.url}/api/ingest/epochs`, {
      method: 'POST',
      headers: { authorization: `Bearer ${rover.key}`, 'content-type': 'application/json' },
      body: JSON.stringify({ epochs }),
    });
    const body = (await response.json()) as Record<string, unknown>;
    expect(body).toMatchObject({ accepted: 1, rejected: 2 });
    expect(reasons(body)).toEqual([
      [2, 'badDate'],
      [3, 'badQuality'],
    ]);
  });
});

describe('over TCP', () => {
  const open = () => connect(server.tcpPort, '127.0.0.1');
  const said = (socket: ReturnType<typeof connect>) =>
    new Promise<string>((resolve) => {
      let text = '';
      socket.on('data', (chunk) => (text += chunk.toString('latin1')));
      socket.on('error', () => resolve(text));
      socket.on('close', () => resolve(text));
    });
  const accepted = async () => {
    const manager = await server.as('manager');
    const [from, to] = [new Date(Date.now() - 3_600_000), new Date()].map((date) => date.toISOString());
    const { points } = await manager.json<{ points: unknown[] }>(
      'GET',
      `/api/rovers/${rover.id}/epochs?from=${from}&to=${to}`,
    );
    return points.length;
  };

  it.each(['KEY nope\r\n', 'GET / HTTP/1.1\r\n\r\n', 'x'.repeat(100_000)])(
    'a wrong beginning gets one line and the door',
    async (text) => {
      const socket = open();
      const answer = said(socket);
      socket.write(text);
      expect(await answer).toMatch(/^ERROR [^\n]+\r\n$/);
    },
  );
  it('good sentences count between rubbish and an endless line', async () => {
    const before = await accepted();
    const socket = open();
    socket.write(`KEY ${rover.key}\r\n${good()}`);
    socket.write(Uint8Array.from({ length: 3000 }, (_, index) => (index * 31) % 256));
    socket.write(`\r\n$GPGGA,${'1'.repeat(1_000_000)}\r\n${good()}${good().slice(0, 20)}`);
    socket.end();
    await until(async () => expect(await accepted()).toBe(before + 2));
  });
  it('ten thousand connections opened and left: the server goes on', async () => {
    for (let round = 0; round < 20; round++) {
      const sockets = Array.from({ length: 500 }, () => {
        const socket = open();
        socket.on('error', () => undefined);
        return socket;
      });
      await Promise.all(
        sockets.map(
          (socket) =>
            new Promise<void>((resolve) => {
              socket.once('connect', () => resolve());
              socket.once('error', () => resolve());
            }),
        ),
      );
      for (const socket of sockets) socket.destroy();
    }
    const before = await accepted();
    const socket = open();
    socket.end(`KEY ${rover.key}\r\n${good()}`);
    await until(async () => expect(await accepted()).toBe(before + 1));
    expect((await post(good())).status).toBe(200);
  });
});
