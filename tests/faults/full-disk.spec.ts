import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { Client, postSentences } from '../harness/client.js';
import { gga } from '../harness/sentences.js';
import { ServerProcess } from '../harness/server-process.js';

/** A small disk of its own needs the right to mount one. */
function smallDisk(): string | null {
  const folder = mkdtempSync(join(tmpdir(), 'hubtack-disk-'));
  try {
    execFileSync('mount', ['-t', 'tmpfs', '-o', 'size=24m', 'tmpfs', folder], { stdio: 'ignore' });
    return folder;
  } catch {
    rmSync(folder, { recursive: true });
    return null;
  }
}

/** More than the disk holds, down to its last block. */
const sizes = [12_000_000, ...Array.from({ length: 13 }, (_, power) => Math.floor(8_400_000 / 2 ** power))];

const disk = smallDisk();
let server: ServerProcess;
beforeAll(async () => {
  if (!disk) return;
  server = await ServerProcess.make({ DATABASE_FILE: join(disk, 'hubtack.sqlite') });
  await server.start();
});
afterAll(async () => {
  if (!disk) return;
  await server.remove();
  execFileSync('umount', [disk]);
});

it.skipIf(disk === null)(
  'a full disk is answered 503, the server keeps running, and recovers when there is room',
  async () => {
    const client = new Client(server.url);
    await client.signIn('manager@pennywort.example', 'tack-in-the-hub');
    const { id } = await client.json<{ id: number }>('POST', '/api/rovers', { label: 'R-full' });
    const { key } = await client.json<{ key: string }>('POST', `/api/rovers/${id}/key`);
    const start = Math.floor(Date.now() / 1000) * 1000 - 36_000_000;
    const block = (at: number) =>
      Array.from({ length: 400 }, (_, index) => gga(start + (at * 400 + index) * 1000)).join('');
    const filler = join(disk!, 'filler');
    let accepted = 0;
    expect((await postSentences(server.url, key, block(0))).status).toBe(200);
    // Fill what is left of the disk, to the last block.
    for (const size of sizes) {
      try {
        writeFileSync(`${filler}-${size}`, Buffer.alloc(size));
      } catch {
        // No room for this much; the next half.
      }
    }
    let refused: Awaited<ReturnType<typeof postSentences>> | null = null;
    let at = 1;
    for (; at < 60 && !refused; at++) {
      const answer = await postSentences(server.url, key, block(at));
      if (answer.status === 200) accepted += answer.body.accepted;
      else refused = answer;
    }
    expect([refused?.status, refused?.body.code]).toEqual([503, 'storageFull']);
    expect((await fetch(`${server.url}/health/live`)).status).toBe(200);
    for (const size of sizes) rmSync(`${filler}-${size}`, { force: true });
    const again = await postSentences(server.url, key, block(at - 1));
    expect(again).toMatchObject({ status: 200, body: { accepted: 400, duplicates: 0 } });
    expect(accepted % 400).toBe(0);
  },
);
