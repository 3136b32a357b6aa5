import { startCaster, type Caster } from '@hubtack/simulators/caster/caster.js';
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { Client } from '../harness/client.js';
import { ServerProcess } from '../harness/server-process.js';
import { expectAccessible, launch, newPage, signIn } from './browser.js';

const PASSWORD = 'a-password-that-nobody-sees';
const login = { user: 'field', password: PASSWORD };
const well = { stream: { kind: 'msm' }, longitude: 147.1284, login } as const;

let server: ServerProcess;
let browser: Browser;
let caster: Caster;

beforeAll(async () => {
  caster = await startCaster({
    mountPoints: [
      { ...well, name: 'PENN07', identifier: 'Pennywort yard', latitude: -41.4312, stationId: 11 },
      { ...well, name: 'MILR07', identifier: 'Mill Race', latitude: -41.5033, stationId: 12 },
      { ...well, name: 'VIRT07', identifier: 'Virtual base', latitude: -41.44, isNetwork: true },
    ],
  });
  server = await ServerProcess.make({ CASTER_PRIVATE_ADDRESSES: 'allow' });
  await server.start();
  browser = await launch();
});
afterAll(async () => {
  await browser.close();
  await server.remove();
  await caster.close();
});

const step = (page: Page, name: string) =>
  page.getByRole('list', { name: 'Steps of the check' }).getByRole('listitem').filter({ hasText: name });
const chooseSite = (page: Page, label: string) =>
  page.getByLabel(label).selectOption({ label: 'Tannery Flats subdivision' });

it('a mistyped login is typed, fails at its step, is set right by a suggestion, and passes with the base distance', async () => {
  const { page, errors } = await newPage(browser, server.url);
  await signIn(page, 'technician');
  await page.getByRole('link', { name: 'Corrections' }).click();
  await page.getByRole('button', { name: 'Add a source' }).click();
  const form = page.getByRole('dialog');
  await form.getByLabel('Name').fill('Pennywort yard');
  // As it is copied from a mail: the form offers to take it apart, and the letter O is noticed.
  await form.getByLabel('Address').fill(`http://127.0.0.1:${caster.port}/PENNO7`);
  await form.getByText('begins with a protocol').waitFor();
  await form.getByRole('button', { name: 'Split it' }).click();
  await expect.poll(() => form.getByLabel('Mount point').inputValue()).toBe('PENNO7');
  expect(await form.getByLabel('Address').inputValue()).toBe('127.0.0.1');
  expect(await form.getByLabel('Port').inputValue()).toBe(String(caster.port));
  await form.getByText('letter O where figures usually stand').waitFor();
  await form.getByLabel('User').fill(login.user);
  await form.getByLabel('Password', { exact: true }).fill(PASSWORD);
  await form.getByText('travels in the clear').waitFor();
  await form.getByRole('button', { name: 'Add it' }).click();

  await page.getByRole('heading', { name: 'Pennywort yard' }).waitFor();
  await page.getByText('field, password kept').waitFor();
  await page.getByText('Never checked').waitFor();
  await chooseSite(page, 'For the work at');
  await page.getByRole('button', { name: 'Check', exact: true }).click();
  await page.getByText('Failed at “Mount point there”').first().waitFor();
  await step(page, 'Source table read').getByText('Passed').waitFor();
  await step(page, 'Login accepted').getByText('Skipped').waitFor();
  await expectAccessible(page);

  await page.getByRole('button', { name: 'Use PENN07' }).first().click();
  await page.getByText('The mount point of this source is PENN07 now.').waitFor();
  await page.getByRole('button', { name: 'Check again' }).click();
  await page.getByRole('button', { name: 'Cancel the check' }).waitFor();
  // It can be left, and come back to.
  await page.getByRole('link', { name: 'All correction sources' }).click();
  await page
    .getByRole('row', { name: /Pennywort yard/ })
    .getByText('Being checked now')
    .waitFor();
  await page.getByRole('link', { name: 'Pennywort yard' }).click();
  await page.getByText('Base distance to Tannery Flats subdivision').waitFor({ timeout: 60_000 });
  await page
    .getByRole('button', { name: 'Cancel the check' })
    .waitFor({ state: 'detached', timeout: 60_000 });
  await step(page, 'Base position').getByText('Passed').waitFor();
  const stream = page.getByRole('table', { name: 'Messages in the stream' });
  await stream.getByRole('row', { name: /^1077/ }).waitFor();
  await page.getByText('A check proves the stream, not the position.').waitFor();
  await expectAccessible(page);

  // The old one is still there to be compared with.
  const history = page.getByRole('table', { name: 'Checks so far' });
  await expect.poll(() => history.getByRole('row').count()).toBe(3);
  await history.getByRole('link').nth(1).click();
  await page.getByRole('heading', { name: 'Nearest spellings' }).waitFor();
  expect(await page.content()).not.toContain(PASSWORD);
  expect(errors).toEqual([]);
  await page.context().close();
});

it('a mount point is chosen from the list, and what changes with it is shown first', async () => {
  const office = new Client(server.url);
  await office.signIn('technician@pennywort.example', 'tack-in-the-hub');
  await office.json('POST', '/api/correction-sources', {
    name: 'Yard for the list',
    address: '127.0.0.1',
    port: caster.port,
    mountPoint: 'PENN07',
    ...login,
  });
  const { page, errors } = await newPage(browser, server.url, { width: 390, look: 'dark' });
  await signIn(page, 'technician');
  await page.goto('/corrections');
  await page.getByRole('link', { name: 'Yard for the list' }).click();
  await page.getByRole('link', { name: 'Mount points of this caster' }).click();
  await page.getByText('3 of 3').waitFor();
  await chooseSite(page, 'Distances from');
  await page.getByRole('cell', { name: / km$/ }).first().waitFor();
  await expectAccessible(page);
  await page.getByRole('button', { name: 'Show the plan' }).click();
  await page.getByRole('img', { name: /^PENN07, .* in use$/ }).waitFor();
  await expectAccessible(page);
  await page.getByRole('button', { name: 'Show the table' }).click();
  await page.getByLabel('Search').fill('virtual');
  await page.getByText('1 of 3').waitFor();
  expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(390);
  await page.getByRole('button', { name: 'Choose VIRT07' }).click();
  const sheet = page.getByRole('dialog');
  await sheet.getByLabel('Mount point: PENN07 becomes VIRT07').waitFor();
  await sheet.getByLabel('Rover’s position: not sent becomes sent').waitFor();
  await sheet.getByText('tell the crews').waitFor();
  await expectAccessible(page);
  await sheet.getByRole('button', { name: 'Change the source' }).click();
  await page.getByRole('button', { name: 'Check it' }).click();
  await page.getByText('computed by the network').waitFor({ timeout: 60_000 });
  await page.getByText('is sent', { exact: true }).waitFor();
  expect(errors).toEqual([]);
  await page.context().close();
});
