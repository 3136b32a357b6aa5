import type { Page } from 'playwright-core';
import { launch, newPage, signIn } from '../e2e/browser.js';
import { ServerProcess } from '../harness/server-process.js';
import type { Row } from './report.js';
import { median } from './statistics.js';

const ROUNDS = 9;
const WANTED_MS = 1000;

/** From the tap to the text on the other page, ms. */
async function seen(tap: Promise<void>, page: Page, text: string): Promise<number> {
  const began = performance.now();
  // Looked for at every frame: a locator would look ever more seldom.
  const shown = page.waitForFunction(
    (words) => document.querySelector('main')?.innerText.includes(words),
    text,
  );
  await Promise.all([tap, shown]);
  return performance.now() - began;
}

/** On the demo, in Chromium: a chief's flag until the desk shows it, and advice until the phone does. */
export async function flag(): Promise<Row[]> {
  const server = await ServerProcess.make();
  await server.start();
  const browser = await launch();
  const { page: phone } = await newPage(browser, server.url, { width: 390 });
  await signIn(phone, 'chief.dogwood');
  const { page: desk } = await newPage(browser, server.url);
  await signIn(desk, 'dispatcher');
  await desk.goto('/lost-fixes');
  await desk.getByRole('heading', { name: 'Lost fixes' }).waitFor();

  const toDesk: number[] = [];
  for (let round = 0; round < ROUNDS; round++) {
    await phone.getByRole('button', { name: 'We lost the fix' }).click();
    await phone.getByRole('dialog').getByText('Under cover').click();
    await phone.getByLabel('Note (may be left empty)').fill(`tree number ${round}`);
    const tap = phone.getByRole('button', { name: 'Tell the office' }).click();
    toDesk.push(await seen(tap, desk, `tree number ${round}`));
  }
  await desk
    .locator('.desk-row')
    .filter({ hasText: 'tree number' })
    .getByRole('link', { name: 'Dogwood' })
    .click();
  const toPhone: number[] = [];
  for (let round = 0; round < ROUNDS; round++) {
    await desk.getByLabel('Advice').fill(`advice number ${round}`);
    const tap = desk.getByRole('button', { name: 'Send advice' }).click();
    toPhone.push(await seen(tap, phone, `advice number ${round}`));
  }
  await browser.close();
  await server.remove();
  const row = (name: string, times: readonly number[]): Row => ({
    name,
    value: median(times),
    unit: 'ms',
    floor: WANTED_MS,
    ratio: median(times) / WANTED_MS,
    n: ROUNDS,
  });
  return [row('flag/phone to desk', toDesk), row('flag/advice to phone', toPhone)];
}
