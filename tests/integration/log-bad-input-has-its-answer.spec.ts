import { once } from 'node:events';
import { existsSync, mkdtempSync, readdirSync, rmSync } from 'node:fs';
import { connect } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';
import { MAX_LOG_BYTES } from '@hubtack/contracts/logs/log.js';
import { checksumOf, writeRmc } from '@hubtack/contracts/nmea/sentence-writer.js';
import sharp from 'sharp';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import type { Client } from '../harness/client.js';
import { analysed, readLog, uploadLog } from '../harness/log-upload.js';
import { published, recording } from '../harness/recordings.js';
import { gga } from '../harness/sentences.js';
import { startServer, type TestServer } from '../harness/server.js';
import { until } from '../harness/until.js';

const uploads = mkdtempSync(join(tmpdir(), 'hubtack-uploads-'));
const folder = join(uploads, 'logs');
let server: TestServer;
let technician: Client;
beforeAll(async () => {
  server = await startServer({ UPLOADS_DIR: uploads });
  technician = await server.as('technician');
});
afterEach(() => {
  // Whatever came of it, no file stays behind.
  return until(() => expect(existsSync(folder) ? readdirSync(folder) : []).toEqual([]));
});
afterAll(async () => {
  await server.close();
  rmSync(uploads, { recursive: true });
});

const walk = recording(published.walk.file);
const noon = Date.UTC(2026, 9, 7, 12);
const dated = (time: number) => gga(time) + writeRmc({ time, latitude: 1, longitude: 1 });
const filled = (bytes: number, text: string): Buffer => Buffer.alloc(bytes, text);

describe('refused at once, in words', () => {
  const utf16 = (text: string) => Buffer.from(text, 'utf16le');
  const png = () =>
    sharp({ create: { width: 20, height: 20, channels: 3, background: 'red' } })
      .png()
      .toBuffer();
  it.each<[string, () => Buffer | Promise<Buffer>, RegExp]>([
    ['empty', () => Buffer.alloc(0), /empty/],
    ['a picture', png, /picture/],
    ['packed by gzip', () => gzipSync(walk), /gzip.*[Uu]npack it first/],
    ['packed by zip', () => Buffer.from('PK\u0003\u0004....'), /zip.*[Uu]npack it first/],
    ['UTF-16 with a mark', () => utf16(`\ufeff${walk.toString('latin1')}`), /UTF-16/],
    ['UTF-16 without one', () => utf16(walk.toString('latin1')), /UTF-16/],
  ])('%s', async (_, content, words) => {
    const { status, body } = await uploadLog(technician, await content());
    expect([status, body.code, body.errors?.[0]?.pointer]).toEqual([400, 'unreadable', '/file']);
    expect(body.detail).toMatch(words);
  });

  it('no file, two files, no multipart, a date that is none, a rover that is none', async () => {
    const post = async (body: FormData | string) => {
      const headers = { cookie: technician.cookieHeader };
      const answer = await fetch(new URL('/api/logs', server.url), { method: 'POST', headers, body });
      return [answer.status, ((await answer.json()) as { code: string }).code];
    };
    const form = new FormData();
    form.append('date', '2026-10-07');
    expect(await post(form)).toEqual([400, 'unreadable']);
    form.append('file', new Blob(['a']), 'a');
    form.append('file', new Blob(['b']), 'b');
    expect(await post(form)).toEqual([400, 'invalidBody']);
    expect(await post('sentences')).toEqual([400, 'unreadable']);
    const date = await uploadLog(technician, walk, { date: '7.10.2026' });
    expect([date.status, date.body.errors?.[0]?.pointer]).toEqual([400, '/date']);
    expect((await uploadLog(technician, walk, { roverId: '9999' })).status).toBe(404);
    expect((await uploadLog(technician, walk, { roverId: 'R-07' })).status).toBe(400);
  });

  it('larger than 100 MB, whether its length says so or not', async () => {
    expect((await uploadLog(technician, filled(MAX_LOG_BYTES + 100_000, gga(noon)))).status).toBe(413);
    // Without a length, and one byte too many.
    const socket = connect(Number(new URL(server.url).port), '127.0.0.1');
    let answer = '';
    socket.setEncoding('latin1').on('data', (text: string) => (answer += text));
    socket.write(
      `POST /api/logs HTTP/1.1\r\nHost: x\r\nCookie: ${technician.cookieHeader}\r\nTransfer-Encoding: chunked\r\n` +
        'Content-Type: multipart/form-data; boundary=edge\r\n\r\n',
    );
    const chunk = async (bytes: string | Buffer) => {
      const length = Buffer.byteLength(bytes).toString(16);
      socket.write(`${length}\r\n`);
      socket.write(bytes);
      if (!socket.write('\r\n')) await once(socket, 'drain');
    };
    await chunk('--edge\r\nContent-Disposition: form-data; name="file"; filename="big.nmea"\r\n\r\n');
    const piece = filled(1024 * 1024, gga(noon));
    for (let sent = 0; sent < MAX_LOG_BYTES; sent += piece.length) await chunk(piece);
    await chunk('$');
    await chunk('\r\n--edge--\r\n');
    socket.write('0\r\n\r\n');
    await until(() => expect(answer).toMatch(/^HTTP\/1.1 413[^]*"tooLarge"/));
    socket.destroy();
  });

  it('an upload that breaks off', async () => {
    const socket = connect(Number(new URL(server.url).port), '127.0.0.1');
    socket.write(
      `POST /api/logs HTTP/1.1\r\nHost: x\r\nCookie: ${technician.cookieHeader}\r\nContent-Length: 1000000\r\n` +
        'Content-Type: multipart/form-data; boundary=edge\r\n\r\n' +
        '--edge\r\nContent-Disposition: form-data; name="file"; filename="big.nmea"\r\n\r\n' +
        gga(noon).repeat(2000),
    );
    await until(() => expect(readdirSync(folder)).toHaveLength(1));
    socket.destroy();
    await until(() => expect(readdirSync(folder)).toEqual([]));
    const { logs } = await technician.json<{ logs: unknown[] }>('GET', '/api/logs');
    expect(logs).toEqual([]);
  });
});

describe('read, and said what it is', () => {
  it.each<[string, () => Buffer]>([
    ['one line of a hundred megabytes', () => filled(MAX_LOG_BYTES, 'x')],
    ['a hundred megabytes of dollars', () => filled(MAX_LOG_BYTES, '$')],
    ['binary without an end', () => filled(1_000_000, '\u0000\u0007$$\u00b5b')],
    ['a letter', () => Buffer.from('Dear Sir,\nplease find the log attached.\n')],
  ])('%s', async (_, content) => {
    const log = await analysed(technician, content());
    expect(log).toMatchObject({ status: 'failed', summary: null, detail: null });
    expect(log.problem).toMatch(/There is no sentence in it/);
  });

  it('bad lines never cost a good one, and each has its reason and its text', async () => {
    const bad = [
      `${gga(noon + 1000).slice(0, 20)}9${gga(noon + 1000).slice(21)}`,
      '$GNGGA,120002.00,4126.40,S,14708.40,E,4,22,0.7,40,M,-3,M,1.0,0001\r\n',
      `$GNGGA,129900.00,,,,,4,,,,,,,,*${checksumOf('GNGGA,129900.00,,,,,4,,,,,,,,')}\r\n`,
      '$GNGGA,120004.00,4126\u0001.40,S\r\n',
      `$GNGGA,${'9'.repeat(400)}\r\n`,
      `$GNGGA,,,,,,4,,,,,,,,*${checksumOf('GNGGA,,,,,,4,,,,,,,,')}\r\n`,
    ];
    const text = bad.map((line, index) => dated(noon + index * 60_000) + line).join('');
    const noise = '\u0000\u00b5b\u0001\u0002$\u00d3\u0000\r\n';
    const { summary, detail } = await analysed(
      technician,
      Buffer.from(noise + text + noise + dated(noon + 600_000), 'latin1'),
    );
    expect(summary).toMatchObject({ epochs: 7, badChecksum: 1, malformed: 4, untimed: 1, ignored: 2 });
    expect(detail!.rejected.map(({ line, code }) => [line, code])).toEqual([
      [4, 'badChecksum'],
      [7, 'noChecksum'],
      [10, 'badField'],
      [13, 'malformed'],
      [16, 'tooLong'],
      [19, 'untimed'],
    ]);
    expect(
      detail!.rejected.every(({ detail: why, text: line }) => why !== '' && line.startsWith('$GNGGA,')),
    ).toBe(true);
    expect(detail!.rejected[3]!.text).toBe('$GNGGA,120004.00,4126\u00b7.40,S');
    expect(detail!.rejected[4]!.text).toHaveLength(120);
  });

  it('names the first two hundred bad lines and counts the others', async () => {
    const { detail, summary } = await analysed(technician, '$GNGGA,1\n'.repeat(100_000) + dated(noon));
    expect(detail!.rejected).toHaveLength(200);
    expect([detail!.moreRejected, summary!.malformed]).toEqual([99_800, 100_000]);
  });

  it('dates that leap by years', async () => {
    const year = 365 * 86_400_000;
    const { summary, detail } = await analysed(
      technician,
      dated(noon - 4 * year) + dated(noon) + dated(noon - 2 * year) + dated(noon - 2 * year + 1000),
    );
    expect(summary).toMatchObject({
      epochs: 4,
      firstTime: new Date(noon - 4 * year).toISOString(),
      lastTime: new Date(noon).toISOString(),
      totals: { fixedMs: 10_000 + 11_000 },
    });
    expect(detail!.notes).toEqual([
      'The date leaps from 2022-10-08 to 2026-10-07 at line 3.',
      'The date leaps from 2026-10-07 to 2024-10-07 at line 5.',
    ]);
  });

  it('a log of an instrument that sends no GGA', async () => {
    const depth = (metres: number) => `$SDDBT,,f,${metres},M,,F*${checksumOf(`SDDBT,,f,${metres},M,,F`)}\r\n`;
    const log = await analysed(technician, Array.from({ length: 50 }, (_, index) => depth(index)).join(''));
    expect(log.summary).toMatchObject({
      sentences: 50,
      ignored: 50,
      epochs: 0,
      firstTime: null,
      medianSatellites: null,
    });
    expect(log.detail!.notes).toEqual([expect.stringMatching(/None of its 50 sentences is a GGA/)]);
  });

  it('any talker', async () => {
    const text = ['GP', 'GL', 'GA', 'BD', 'GB', 'QZ', 'IN'].map((talker, index) =>
      gga(noon + index * 1000, 4, { talker }),
    );
    expect((await analysed(technician, text.join(''), { date: '2026-10-07' })).summary!.epochs).toBe(7);
  });

  it('a name that no folder should see', async () => {
    const { body } = await uploadLog(technician, dated(noon), {}, '../../etc/\u202etag \u00fcber.nmea');
    expect((await readLog(technician, body.id)).name).toBe('tag \u00fcber.nmea');
  });
});
