import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import type { LostFixDetail, LostFix } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import type { CrewDayView } from '@hubtack/contracts/shifts/shift.js';
import type { Browser } from 'playwright-core';
import sharp from 'sharp';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { Client, postSentences } from '../harness/client.js';
import { gga } from '../harness/sentences.js';
import { ServerProcess } from '../harness/server-process.js';
import { until } from '../harness/until.js';
import { launch, newPage, signIn } from './browser.js';

let server: ServerProcess;
let browser: Browser;
let office: Client;
const keys = new Map<string, string>();

beforeAll(async () => {
  server = await ServerProcess.make();
  await server.start();
  browser = await launch();
  const file = join(server.folder, 'demo-rover-keys.json');
  for (const { label, key } of JSON.parse(readFileSync(file, 'utf8')) as { label: string; key: string }[])
    keys.set(label, key);
  office = new Client(server.url);
  await office.signIn('dispatcher@pennywort.example', 'tack-in-the-hub');
});
afterAll(async () => {
  await browser.close();
  await server.remove();
});

const post = (label: string, quality: number) =>
  postSentences(server.url, keys.get(label)!, gga(Math.floor(Date.now() / 1000) * 1000, quality));
const ofCrew = async (name: string) =>
  (await office.json<{ lostFixes: LostFix[] }>('GET', '/api/lost-fixes?status=all')).lostFixes.filter(
    ({ crewName }) => crewName === name,
  );

it('a chief flags with a photo, the desk shows it, advice comes back, and the office closes it', async () => {
  await post('R-04', 5);
  const phone = await newPage(browser, server.url, { width: 390 });
  await signIn(phone.page, 'chief.dogwood');
  await phone.page.getByRole('heading', { name: 'Crew Dogwood' }).waitFor();
  const desk = await newPage(browser, server.url);
  await signIn(desk.page, 'dispatcher');
  await desk.page.goto('/lost-fixes');
  await desk.page.getByRole('heading', { name: 'Lost fixes' }).waitFor();

  await phone.page.getByRole('button', { name: 'We lost the fix' }).click();
  await phone.page.getByText('Under cover').click();
  await phone.page.getByLabel('Note (may be left empty)').fill('big gum tree');
  const picture = await sharp({ create: { width: 300, height: 200, channels: 3, background: '#4a6' } })
    .jpeg()
    .toBuffer();
  await phone.page
    .locator('input[type=file]')
    .setInputFiles([{ name: 'tree.jpg', mimeType: 'image/jpeg', buffer: picture }]);
  await phone.page.getByRole('button', { name: 'Tell the office' }).click();

  await desk.page.getByRole('list').filter({ hasText: 'big gum tree' }).first().waitFor();
  await desk.page
    .locator('.desk-row')
    .filter({ hasText: 'big gum tree' })
    .getByRole('link', { name: 'Dogwood' })
    .click();
  await desk.page.getByRole('heading', { name: /Dogwood/ }).waitFor();
  await desk.page.getByRole('img', { name: /^Photo by/ }).waitFor();
  await desk.page.getByLabel('Advice').fill('Move into the open, wait a minute');
  await desk.page.getByLabel('Advice').press('Control+Enter');
  await phone.page
    .getByRole('region', { name: 'Advice from the office' })
    .getByText('Move into the open, wait a minute')
    .waitFor();

  const [mine] = (await ofCrew('Dogwood')).filter(({ flag }) => flag !== null);
  const second = new Client(server.url);
  await second.signIn('technician@pennywort.example', 'tack-in-the-hub');
  expect((await second.call('POST', `/api/lost-fixes/${mine!.id}/take`)).status).toBe(409);

  await desk.page.getByRole('button', { name: 'Close it' }).click();
  await desk.page.getByLabel('What was it?').selectOption({ label: 'Sky blocked' });
  await desk.page.getByRole('dialog').getByLabel('Note').fill('Tree cover, moved setup');
  await desk.page.getByRole('dialog').getByRole('button', { name: 'Close it' }).click();
  await desk.page.getByText('Closed by Dispatcher as').waitFor();
  const detail = await office.json<LostFixDetail>('GET', `/api/lost-fixes/${mine!.id}`);
  expect(detail.history.map(({ kind }) => kind)).toEqual(
    expect.arrayContaining(['flagged', 'photo', 'advice', 'taken', 'closed']),
  );
  expect([...phone.errors, ...desk.errors]).toEqual([]);
  await phone.page.context().close();
  await desk.page.context().close();
});

it('tapped without signal, with the page closed meanwhile: it arrives once, in order, with the time of the tap', async () => {
  const { page } = await newPage(browser, server.url, { width: 390, withServiceWorker: true, expected: /./ });
  const context = page.context();
  await signIn(page, 'chief.alder');
  await page.getByRole('heading', { name: 'Crew Alder' }).waitFor();
  await page.evaluate(async () => {
    await navigator.serviceWorker.ready;
  });
  // Once more, so that what the page needs is kept.
  await page.reload();
  await page.getByRole('heading', { name: 'Crew Alder' }).waitFor();
  await page.waitForFunction(() => navigator.serviceWorker.controller !== null);
  await until(async () => {
    const kept = await page.evaluate(async () => {
      const names = await caches.keys();
      const urls = await Promise.all(
        names.map(async (name) => (await (await caches.open(name)).keys()).map(({ url }) => url)),
      );
      return urls.flat();
    });
    expect(kept.some((url) => url.endsWith('/day'))).toBe(true);
    expect(kept.some((url) => url.endsWith('/api/auth/me'))).toBe(true);
  });

  await context.setOffline(true);
  const tappedFrom = Date.now();
  await page.getByRole('button', { name: 'Pause' }).click();
  await page.getByRole('dialog').getByRole('button', { name: 'Lunch' }).click();
  await page.getByRole('heading', { name: 'Waiting to be sent' }).waitFor();
  await page.getByRole('button', { name: 'We lost the fix' }).click();
  await page.getByText('No mobile signal').click();
  await page.getByRole('button', { name: 'Tell the office' }).click();
  await expect.poll(() => page.locator('.tap-list li').count()).toBe(2);
  const tappedUntil = Date.now();
  await page.close();

  const again = await context.newPage();
  await again.goto('/my-crew');
  await again.getByRole('heading', { name: 'Waiting to be sent' }).waitFor();
  expect(await again.locator('.tap-list li').count()).toBe(2);
  await context.setOffline(false);
  await expect.poll(() => again.locator('.tap-list').innerText(), { timeout: 30_000 }).toBe('');

  const alder = (await office.json<{ id: number; name: string }[]>('GET', '/api/crews')).find(
    ({ name }) => name === 'Alder',
  )!;
  const day = await office.json<CrewDayView>('GET', `/api/crews/${alder.id}/day`);
  const pauses = day.shifts.flatMap((shift) => shift.pauses);
  expect(pauses).toHaveLength(1);
  const flagged = (await ofCrew('Alder')).filter(({ flag }) => flag !== null);
  expect(flagged).toHaveLength(1);
  const times = [pauses[0]!.start, flagged[0]!.flag!.at];
  expect(times[0]).toBeLessThan(times[1]!);
  for (const at of times) {
    expect(at).toBeGreaterThanOrEqual(tappedFrom);
    expect(at).toBeLessThanOrEqual(tappedUntil);
  }
  await context.close();
});
