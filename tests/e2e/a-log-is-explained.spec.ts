import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { recordingFile } from '../harness/recordings.js';
import { ServerProcess } from '../harness/server-process.js';
import { expectAccessible, launch, newPage, signIn } from './browser.js';

let server: ServerProcess;
let browser: Browser;
beforeAll(async () => {
  server = await ServerProcess.make();
  await server.start();
  browser = await launch();
});
afterAll(async () => {
  await browser.close();
  await server.remove();
});

it('a technician reads the log of a receiver: what was fixed, when it changed, and what could not be read', async () => {
  const { page, errors } = await newPage(browser, server.url);
  await signIn(page, 'technician');
  await page.getByRole('link', { name: 'Logs' }).click();
  await page.getByText('No log yet').waitFor();
  await page.getByLabel('Log of a receiver').setInputFiles(recordingFile('walk-rtk-fixed-float.nmea'));
  await page.getByRole('button', { name: 'Read it' }).click();

  await page.getByRole('heading', { name: 'walk-rtk-fixed-float.nmea' }).waitFor();
  // tests/fixtures/README.md: 536 epochs, 87.25 s fixed, 46.5 s float, three changes.
  const figures = page.getByRole('region', { name: 'Figures' });
  await figures.getByText('87.3 s').or(figures.getByText('87.2 s')).waitFor();
  await figures.getByText('46.5 s').waitFor();
  await figures.getByText('536').first().waitFor();
  await page.getByText('65.2 % fixed').waitFor();
  await page.getByText('3 changes of state').click();
  expect(await page.getByRole('table', { name: 'Changes of state' }).getByRole('row').count()).toBe(4);
  await expectAccessible(page);

  await page.getByRole('button', { name: 'Remove' }).click();
  await page.getByText('No log yet').waitFor();

  expect(errors).toEqual([]);

  // An image is no log: said in words, and the next try is at hand.
  await page.getByLabel('Log of a receiver').setInputFiles({
    name: 'photo.png',
    mimeType: 'image/png',
    buffer: Buffer.from('89504e470d0a1a0a0000', 'hex'),
  });
  await page.getByRole('button', { name: 'Read it' }).click();
  await page.getByText('This is a picture, not a log of sentences.').waitFor();
  expect(await page.getByText('photo.png').isVisible()).toBe(true);
});
