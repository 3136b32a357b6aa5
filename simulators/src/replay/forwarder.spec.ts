import { mkdtempSync, rmSync } from 'node:fs';
import { createServer, type IncomingMessage, type Server, type ServerResponse } from 'node:http';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { text } from 'node:stream/consumers';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { KeyRefused, forward } from './forwarder.js';
import { Spool } from './spool.js';

type Answer = (response: ServerResponse, request: IncomingMessage) => void;

let server: Server;
let url: string;
let folder: string;
let spool: Spool;
/** What the server does with the posts it gets, in turn; the last one stands. */
let answers: Answer[];
let received: string[];

const taken = { accepted: 1, duplicates: 0, ignored: 0, rejected: 0, reasons: [] };
const json =
  (status: number, body: unknown, headers: Record<string, string> = {}): Answer =>
  (response) =>
    response.writeHead(status, { 'content-type': 'application/json', ...headers }).end(JSON.stringify(body));
const ok = json(200, taken);
const html: Answer = (response) =>
  response.writeHead(200, { 'content-type': 'text/html' }).end('<p>Welcome to our guest network');

beforeEach(async () => {
  answers = [ok];
  received = [];
  server = createServer((request, response) => {
    void text(request).then((body) => {
      received.push(`${request.url} ${body}`);
      (answers.length > 1 ? answers.shift()! : answers[0]!)(response, request);
    });
  });
  await new Promise<void>((resolve) => {
    server.listen(0, '127.0.0.1', resolve);
  });
  url = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
  folder = mkdtempSync(join(tmpdir(), 'hubtack-forward-'));
  spool = new Spool(folder);
});
afterEach(() => {
  server.closeAllConnections();
  server.close();
  rmSync(folder, { recursive: true });
});

const keep = (...bodies: string[]) => {
  for (const body of bodies) spool.keep({ date: '2026-03-09', body: new TextEncoder().encode(body) });
};
async function run() {
  const waits: [string, number][] = [];
  const sent = await forward({
    url,
    key: 'k',
    spool,
    isFinished: () => true,
    onWaiting: (why, ms) => waits.push([why, ms]),
    rest: () => Promise.resolve(),
  });
  return { sent, waits };
}

describe('forwarding', () => {
  it('sends all in order with the date, and counts what the server made of it', async () => {
    keep('a', 'b', 'c');
    const reasons = [{ line: 1, code: 'badChecksum', detail: '' }];
    answers = [json(200, { ...taken, rejected: 30, reasons }), json(200, { ...taken, duplicates: 4 }), ok];
    const { sent } = await run();
    expect(received).toEqual(['a', 'b', 'c'].map((body) => `/api/ingest/nmea?date=2026-03-09 ${body}`));
    expect(sent).toMatchObject({ posts: 3, accepted: 3, duplicates: 4, rejected: 30 });
    expect([...sent.reasons]).toEqual([
      ['badChecksum', 1],
      ['not named', 29],
    ]);
    expect(spool.length).toBe(0);
  });

  it('keeps a post until the server itself has answered for it, whatever else answers meanwhile', async () => {
    keep('a', 'b');
    const cut: Answer = (response) => response.destroy();
    const elsewhere: Answer = (response) => response.writeHead(302, { location: '/sign-on' }).end();
    const others = [
      html,
      json(200, { fine: true }),
      elsewhere,
      json(400, { code: 'other' }),
      json(503, {}),
      cut,
    ];
    answers = [...others, ok];
    const { sent, waits } = await run();
    expect(received.map((line) => line.at(-1)).join('')).toBe('aaaaaaab');
    expect(sent).toMatchObject({ posts: 2, accepted: 2, rejected: 0 });
    expect(waits.map(([, ms]) => ms)).toEqual([500, 1000, 2000, 4000, 8000, 16_000]);
    expect(waits[0]![0]).toContain('not Hubtack');
  });

  it('waits as long as Retry-After says', async () => {
    keep('a');
    answers = [json(429, {}, { 'retry-after': '7' }), ok];
    expect((await run()).waits).toEqual([['the server answers 429', 7000]]);
  });

  it('lets a post go in which nothing could be read: sending it again would change nothing', async () => {
    keep('rubbish', 'b');
    answers = [json(400, { code: 'unreadable' }), ok];
    const { sent } = await run();
    expect([sent.accepted, sent.rejected, [...sent.reasons]]).toEqual([1, 1, [['unreadable', 1]]]);
    expect(spool.length).toBe(0);
  });

  it('a refused key ends it, and everything stays for when the key is right', async () => {
    keep('a', 'b');
    answers = [json(401, { code: 'unknownKey' })];
    await expect(run()).rejects.toThrow(KeyRefused);
    expect(new Spool(folder).length).toBe(2);
  });

  it('told to stop while the server is away, it ends and keeps what is not answered', async () => {
    keep('a');
    answers = [json(503, {})];
    const stop = new AbortController();
    const sent = await forward({
      url,
      key: 'k',
      spool,
      isFinished: () => false,
      onWaiting: () => stop.abort(),
      stop: stop.signal,
    });
    expect([sent.posts, spool.length]).toEqual([0, 1]);
  });
});
