import { existsSync, mkdtempSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { PhotosService } from '@hubtack/backend/photos/photos.service.js';
import type { Photo } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import sharp from 'sharp';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { Client } from '../harness/client.js';
import { startServer, type TestServer } from '../harness/server.js';

let server: TestServer;
let uploads: string;
let chief: Client;
let other: Client;
let id: number;
beforeEach(async () => {
  uploads = mkdtempSync(join(tmpdir(), 'hubtack-uploads-'));
  server = await startServer({ UPLOADS_DIR: uploads });
  const crewId = await server.makeCrew('Dogwood');
  const rover = await server.makeRover('R-04', crewId);
  chief = await server.as('crewChief', crewId);
  other = await server.as('crewChief', await server.makeCrew('Alder'));
  const flag = { roverId: rover.id, word: 'underCover', note: null };
  id = (await chief.json<{ id: number }>('POST', '/api/lost-fixes', flag)).id;
});
afterEach(async () => {
  await server.close();
  rmSync(uploads, { recursive: true, force: true });
});

const picture = (width = 800, height = 600) =>
  sharp({ create: { width, height, channels: 3, background: '#6b8e5a' } });
const jpeg = () => picture().jpeg().toBuffer();
const stored = () => (existsSync(join(uploads, 'photos')) ? readdirSync(join(uploads, 'photos')) : []);

async function send(
  files: Buffer[],
  {
    who = chief,
    key,
    to = id,
    name = 'tree.jpg',
  }: { who?: Client; key?: string; to?: number; name?: string } = {},
): Promise<{
  status: number;
  body: Photo[] & { code?: string; detail?: string; errors?: { pointer: string }[] };
}> {
  const form = new FormData();
  for (const file of files)
    form.append('photos', new Blob([new Uint8Array(file)], { type: 'image/jpeg' }), name);
  const response = await fetch(`${server.url}/api/lost-fixes/${to}/photos`, {
    method: 'POST',
    headers: { cookie: who.cookieHeader, ...(key ? { 'idempotency-key': key } : {}) },
    body: form,
  });
  return { status: response.status, body: (await response.json()) as never };
}
async function read(photo: Photo, who = chief): Promise<{ status: number; bytes: Buffer; headers: Headers }> {
  const response = await who.call('GET', `/api/lost-fixes/${id}/photos/${photo.id}`);
  return {
    status: response.status,
    bytes: Buffer.from(await response.arrayBuffer()),
    headers: response.headers,
  };
}

describe('photos of a lost fix', () => {
  it('JPEG, PNG and WebP are kept, smaller, and can be seen by the own crew and the office', async () => {
    const { status, body } = await send([
      await picture(4000, 3000).jpeg().toBuffer(),
      await picture().png().toBuffer(),
      await picture().webp().toBuffer(),
    ]);
    expect(status).toBe(201);
    expect(body.map(({ width, height }) => [width, height])).toEqual([
      [2048, 1536],
      [800, 600],
      [800, 600],
    ]);
    const { bytes, headers } = await read(body[0]!);
    expect(headers.get('content-type')).toBe('image/webp');
    expect(headers.get('cache-control')).toContain('private');
    expect((await sharp(bytes).metadata()).width).toBe(2048);
    expect((await read(body[0]!, await server.as('dispatcher'))).status).toBe(200);
  });
  it('lose where they were taken, and stand upright', async () => {
    const tagged = await picture(800, 600)
      .withExif({
        IFD0: { Copyright: 'somebody' },
        IFD3: { GPSLatitude: '41/1 26/1 0/1', GPSLatitudeRef: 'S' },
      })
      .withMetadata({ orientation: 6 })
      .jpeg()
      .toBuffer();
    expect((await sharp(tagged).metadata()).exif).toBeDefined();
    const { body } = await send([tagged]);
    expect(body[0]).toMatchObject({ width: 600, height: 800 });
    const metadata = await sharp((await read(body[0]!)).bytes).metadata();
    expect([metadata.exif, metadata.iptc, metadata.xmp, metadata.icc]).toEqual([
      undefined,
      undefined,
      undefined,
      undefined,
    ]);
  });
  it('sent again with the same key they are kept once', async () => {
    const photo = await jpeg();
    const first = await send([photo], { key: 'a-key' });
    const second = await send([photo], { key: 'a-key' });
    expect(second.body).toEqual(first.body);
    const [third, fourth] = await Promise.all([send([photo], { key: 'b' }), send([photo], { key: 'b' })]);
    expect(third.body).toEqual(fourth.body);
    rmSync(join(uploads, 'photos', stored()[0]!));
    expect(stored()).toHaveLength(1);
  });
  it('another crew cannot add or see any, and learns of none', async () => {
    const { body } = await send([await jpeg()]);
    expect((await send([await jpeg()], { who: other })).status).toBe(404);
    expect((await read(body[0]!, other)).status).toBe(404);
    const missing = await chief.call('GET', `/api/lost-fixes/${id}/photos/99`);
    expect([missing.status, missing.headers.get('cache-control')]).toEqual([404, 'no-store']);
  });
});

it('files that belong to nobody go after a day, and only those', async () => {
  await send([await jpeg()]);
  const folder = join(uploads, 'photos');
  for (const name of [`${'0'.repeat(8)}-0000-0000-0000-${'0'.repeat(12)}.webp`, 'somebody-elses.txt'])
    writeFileSync(join(folder, name), 'x');
  const photosService = server.app.get(PhotosService);
  server.clock.advance(3_600_000);
  await photosService.dropOrphans();
  expect(stored()).toHaveLength(3);
  server.clock.advance(2 * 86_400_000);
  await photosService.dropOrphans();
  expect(stored()).toHaveLength(2);
  expect(stored()).toContain('somebody-elses.txt');
});

describe('what is refused leaves nothing behind', () => {
  afterEach(() => {
    expect(stored()).toEqual([]);
  });
  it.each([
    [
      'text with the right name',
      () => Promise.resolve(Buffer.from('no picture at all')),
      'no JPEG, PNG or WebP',
    ],
    ['a picture of another kind', () => picture().gif().toBuffer(), 'no JPEG, PNG or WebP'],
    [
      'an SVG',
      () => Promise.resolve(Buffer.from('<svg xmlns="http://www.w3.org/2000/svg"/>')),
      'no JPEG, PNG or WebP',
    ],
    [
      '12,000 by 12,000 pixels',
      () => picture(12_000, 12_000).png({ palette: true }).toBuffer(),
      'too large: 12000 by 12000',
    ],
    ['a file cut short', async () => (await noise()).subarray(0, 20_000), 'damaged or cut short'],
  ])('%s', async (_what, file, words) => {
    const { status, body } = await send([await jpeg(), await file()]);
    expect(status).toBe(400);
    expect(body).toMatchObject({ code: 'invalidBody', errors: [{ pointer: '/photos/1' }] });
    expect(body.detail).toContain(words);
  });
  it('11 MB', async () => {
    const { status, body } = await send([Buffer.alloc(11 * 2 ** 20, 7)]);
    expect([status, body.code]).toEqual([413, 'tooLarge']);
  });
  it('200 photos at once', async () => {
    const photo = await jpeg();
    const { status, body } = await send(Array.from({ length: 200 }, () => photo));
    expect([status, body.code]).toEqual([400, 'invalidBody']);
  });
  it('no photo, and no form', async () => {
    expect((await send([])).status).toBe(400);
    expect((await chief.call('POST', `/api/lost-fixes/${id}/photos`, { photos: [] })).status).toBe(400);
  });
});

it('a fifth is refused, and the four stay', async () => {
  await send([await jpeg(), await jpeg(), await jpeg()]);
  const { status, body } = await send([await jpeg(), await jpeg()]);
  expect(status).toBe(409);
  expect(body.detail).toBe('At most 4 photos for one lost fix; there are 3.');
  expect(stored()).toHaveLength(3);
  expect((await send([await jpeg()])).status).toBe(201);
});

/** A picture that does not compress away. */
const noise = () =>
  sharp({
    create: {
      width: 600,
      height: 600,
      channels: 3,
      background: '#000',
      noise: { type: 'gaussian', mean: 128, sigma: 60 },
    },
  })
    .jpeg({ quality: 95 })
    .toBuffer();
