import { spawnSync } from 'node:child_process';
import { existsSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, expect, it } from 'vitest';
import { addressOf, claimFolder } from './claim-folder.js';

let folder: string;
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'hubtack-claim-'));
});
afterEach(() => rmSync(folder, { recursive: true }));

it('a second sender does not get the folder of a first, until that one gives it back', async () => {
  const giveBack = (await claimFolder(folder))!;
  expect(await claimFolder(`${folder}/../${folder.split('/').at(-1)}`)).toBeNull();
  giveBack();
  const again = await claimFolder(folder);
  expect(again).not.toBeNull();
  again!();
});

it('a sender that was killed leaves nothing that keeps the next one out', async () => {
  const script =
    'require("net").createServer().listen(process.argv[1], () => process.kill(process.pid, "SIGKILL"))';
  spawnSync(process.execPath, ['-e', script, addressOf(folder)]);
  expect(existsSync(addressOf(folder))).toBe(true);
  const giveBack = await claimFolder(folder);
  expect(giveBack).not.toBeNull();
  giveBack!();
});
