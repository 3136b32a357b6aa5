import { spawn, type ChildProcess } from 'node:child_process';
import { join } from 'node:path';
import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Client, postSentences } from '../harness/client.js';
import { fromRoot } from '../harness/root.js';
import { gga } from '../harness/sentences.js';
import { ServerProcess } from '../harness/server-process.js';
import { expectAccessible, launch, newPage, signIn } from './browser.js';

let server: ServerProcess;
let browser: Browser;
let fleet: ChildProcess;

beforeAll(async () => {
  server = await ServerProcess.make();
  await server.start();
  browser = await launch();
  const program = fromRoot('simulators/dist/fleet/main.js');
  const keys = join(server.folder, 'demo-rover-keys.json');
  fleet = spawn(process.execPath, [program, '--url', server.url, '--keys', keys, '--scenario', 'demo'], {
    stdio: 'ignore',
  });
});
afterAll(async () => {
  fleet.kill();
  await browser.close();
  await server.remove();
});

const lane = (name: string) => new RegExp(`^${name},`);

describe('each role signs in and does what it came for', () => {
  it('dispatcher: sees the crews by need, opens one, searches, and reads the day', async () => {
    const { page, errors } = await newPage(browser, server.url);
    await signIn(page, 'dispatcher');
    await page.getByText('live', { exact: true }).waitFor();
    await page
      .getByRole('row', { name: lane('Currawong') })
      .getByText('Fixed')
      .waitFor({ timeout: 60_000 });
    await page.getByRole('button', { name: 'Dogwood' }).click();
    await page.getByRole('complementary').getByText('Age of corrections, s').waitFor();
    await page.keyboard.press('Escape');
    await page.keyboard.press('/');
    await page.keyboard.type('echid');
    await expect.poll(() => page.getByRole('row', { name: /R-0/ }).count()).toBe(1);
    await page.getByLabel('Search the board').fill('');
    await page.getByRole('button', { name: 'Today by crew' }).click();
    await page.getByRole('heading', { name: 'Today by crew: shares of on-shift time' }).waitFor();
    await page.getByRole('button', { name: 'Show the plan' }).click();
    await page.getByRole('button', { name: /^Alder, / }).waitFor();
    expect(errors).toEqual([]);
    await page.context().close();
  });

  it('technician: adds a rover, hands it over, issues a key, and the rover\u2019s first sentence is on the board within a second', async () => {
    const { page, errors } = await newPage(browser, server.url);
    await signIn(page, 'technician');
    await page.getByRole('link', { name: 'Rovers' }).click();
    await page.getByRole('button', { name: 'Add a rover' }).click();
    await page.getByRole('button', { name: 'Add the rover' }).click();
    await page.getByText('Write a label such as R-07').waitFor();
    await page.getByLabel('Label').fill('R-09');
    await page.getByLabel('Label').press('Enter');
    await page.getByRole('heading', { name: 'R-09' }).waitFor();
    await page.getByLabel('Hand over to').selectOption({ label: 'Banksia' });
    await page.getByRole('button', { name: 'Hand over now' }).click();
    await page.getByText('Its time counts for the crew').waitFor();
    await page.getByRole('button', { name: 'Issue a key' }).click();
    const key = (await page.getByLabel('the new key', { exact: true }).textContent())!.trim();
    expect(key).toMatch(/^hub_[\w-]{43}$/);
    await page.getByRole('link', { name: 'Board', exact: true }).click();
    const row = page.getByRole('row', { name: 'Banksia, R-09' });
    await row.getByText('Quiet').waitFor();
    await postSentences(server.url, key, gga(Math.floor(Date.now() / 1000) * 1000, 4, { satellites: 17 }));
    await row.getByText('Fixed').waitFor({ timeout: 1000 });
    await row.getByText('17').waitFor();
    await page.getByRole('link', { name: 'Logs' }).click();
    await page.getByRole('link', { name: 'Sentence reader' }).click();
    await page.getByRole('button', { name: 'Show an example' }).click();
    await page.getByText('RTK, ambiguities fixed').waitFor();
    expect(errors).toEqual([]);
    await page.context().close();
  });

  it('manager: settings are there and saved, somebody is invited, a wall display opens and is taken back', async () => {
    const { page, errors } = await newPage(browser, server.url);
    await signIn(page, 'manager');
    await page.getByRole('link', { name: 'Settings' }).click();
    await expect.poll(() => page.getByLabel('Firm').inputValue()).toBe('Pennywort Surveys');
    await page.getByLabel('Time zone').fill('Australia/Nowhere');
    await page.getByRole('button', { name: 'Save' }).click();
    await page.getByText('No such time zone').waitFor();
    await page.getByLabel('Time zone').fill('Australia/Hobart');
    await page.getByRole('button', { name: 'Save' }).click();
    await page.getByText('Saved.').waitFor();
    await page.getByRole('link', { name: 'Users' }).click();
    await page.getByRole('button', { name: 'Invite somebody' }).click();
    await page.getByLabel('Name').fill('New technician');
    await page.getByLabel('E-mail address').fill('manager@pennywort.example');
    await page.getByLabel('Role').selectOption({ label: 'Technician' });
    await page.getByRole('button', { name: 'Send the invitation' }).click();
    await page.getByText('There is an account with this address already.').waitFor();
    expect(await page.getByLabel('Name').inputValue()).toBe('New technician');
    await page.getByLabel('E-mail address').fill('new@pennywort.example');
    await page.getByRole('button', { name: 'Send the invitation' }).click();
    await page.getByLabel('the invitation link', { exact: true }).waitFor();
    await page.getByRole('button', { name: 'Close' }).click();
    await page.getByLabel('Where the screen hangs').fill('Office wall');
    await page.getByRole('button', { name: 'Make a link' }).click();
    const link = (await page.getByLabel('the display link', { exact: true }).textContent())!.trim();
    const wall = await newPage(browser, server.url, { expected: /401|410/ });
    await wall.page.goto(link);
    await wall.page.getByRole('row', { name: lane('Alder') }).waitFor();
    expect(wall.page.url()).not.toContain('#');
    expect(await wall.page.getByRole('button').count()).toBe(0);
    await page.getByRole('button', { name: 'Take back Office wall' }).click();
    await wall.page.getByRole('heading', { name: 'Sign in' }).waitFor({ timeout: 20_000 });
    expect([...errors.filter((text) => !text.includes('409')), ...wall.errors]).toEqual([]);
    await wall.page.context().close();
    await page.context().close();
  });

  it('manager: reads the week, goes from a cell to the day, and from there to the lost fix', async () => {
    const { page, errors } = await newPage(browser, server.url);
    await signIn(page, 'manager');
    await page.getByRole('link', { name: 'Weekly' }).click();
    await page.getByRole('button', { name: 'Week before' }).click();
    await page.getByText(/% fix uptime, .* of paid time without a fix, \d+ % of it/).waitFor();
    await page.getByRole('button', { name: 'Compare' }).click();
    await page
      .getByRole('columnheader', { name: /^Week \d+$/ })
      .nth(1)
      .waitFor();
    const csv = page.waitForEvent('download');
    await page.getByRole('link', { name: 'Spreadsheet (CSV)' }).click();
    expect((await csv).suggestedFilename()).toMatch(/2026-W\d\d\.csv$/);
    await page
      .getByRole('link', { name: /^Dogwood, 2026-/ })
      .first()
      .click();
    await page.getByRole('heading', { name: 'Dogwood' }).waitFor();
    await page
      .getByText(/fix uptime over .* on shift/)
      .first()
      .waitFor();
    await page
      .getByRole('link', { name: /^Lost fix, / })
      .first()
      .click();
    await page.getByRole('heading', { name: 'History' }).waitFor();
    expect(errors).toEqual([]);
    await page.context().close();
  });

  it('crew chief: the own crew on a phone, and nothing else', async () => {
    const { page, errors } = await newPage(browser, server.url, { width: 390 });
    await signIn(page, 'chief.alder');
    await page.getByRole('heading', { name: 'Crew Alder' }).waitFor();
    await page.getByRole('link', { name: 'Board', exact: true }).click();
    await page.getByRole('row', { name: lane('Alder') }).waitFor();
    expect(await page.getByRole('row', { name: /R-0/ }).count()).toBe(1);
    expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(390);
    await page.goto('/users');
    await page.getByText('Your role may not do this.').first().waitFor();
    expect(errors.filter((text) => !text.includes('403'))).toEqual([]);
    await page.context().close();
  });

  it('signing out leads back to the sign-in, and the board is closed', async () => {
    const { page } = await newPage(browser, server.url);
    await signIn(page, 'dispatcher');
    await page.getByRole('button', { name: 'Dispatcher' }).click();
    await page.getByRole('button', { name: 'Sign out' }).click();
    await page.getByRole('heading', { name: 'Sign in' }).waitFor();
    await page.goto('/');
    await page.getByRole('heading', { name: 'Sign in' }).waitFor();
    await page.context().close();
  });
});

describe('axe finds nothing serious', () => {
  it.each(['light', 'dark'] as const)('on any page, %s', async (look) => {
    const { page } = await newPage(browser, server.url, { look });
    await page.goto('/sign-in');
    await page.getByRole('heading', { name: 'Sign in' }).waitFor();
    await expectAccessible(page);
    await signIn(page, 'manager');
    await page.getByRole('button', { name: 'Dogwood' }).waitFor();
    await expectAccessible(page);
    await page.getByRole('button', { name: 'Dogwood' }).click();
    await page.getByRole('complementary').getByText('Satellites').first().waitFor();
    await expectAccessible(page);
    for (const path of [
      '/crews',
      '/rovers',
      '/rovers/1',
      '/corrections',
      '/sites',
      '/control-points',
      '/imports/sites',
      '/users',
      '/settings',
      '/sentence-reader',
      '/wall',
      '/lost-fixes',
      '/lost-fixes/1',
      '/notices',
      '/weekly?week=2026-W47',
      '/crews/4/days/2026-11-20',
    ]) {
      await page.goto(path);
      await page.getByRole('heading', { level: 1 }).waitFor();
      await page.waitForLoadState('networkidle', { timeout: 400 }).catch(() => undefined);
      await expectAccessible(page);
    }
    await page.context().close();
    const phone = await newPage(browser, server.url, { look, width: 390 });
    await signIn(phone.page, 'chief.dogwood');
    await phone.page.getByRole('heading', { name: 'Crew Dogwood' }).waitFor();
    await expectAccessible(phone.page);
    await phone.page.context().close();
  });
});

describe('the stream in a real browser', () => {
  it('its own EventSource reads the events', async () => {
    const { page } = await newPage(browser, server.url);
    await signIn(page, 'dispatcher');
    const event = await page.evaluate(
      () =>
        new Promise<{ id: string; changes: number }>((resolve) => {
          const source = new EventSource('/api/board/stream');
          source.addEventListener('lanes', (message: MessageEvent<string>) => {
            source.close();
            resolve({
              id: message.lastEventId,
              changes: (JSON.parse(message.data) as { changes: unknown[] }).changes.length,
            });
          });
        }),
    );
    expect(event.id).toMatch(/\.\d+$/);
    expect(event.changes).toBeGreaterThan(0);
    await page.context().close();
  });

  it('a server that restarts: the page says that it is cut off, then is live again by itself', async () => {
    const { page } = await newPage(browser, server.url);
    await signIn(page, 'dispatcher');
    await page.getByText('live', { exact: true }).waitFor();
    await server.kill();
    await page.getByText(/cut off since \d\d:\d\d/).waitFor({ timeout: 30_000 });
    await server.start();
    await page.getByText('live', { exact: true }).waitFor({ timeout: 60_000 });
    await page
      .getByRole('row', { name: lane('Currawong') })
      .getByText('Fixed')
      .waitFor({ timeout: 60_000 });
    await page.context().close();
  });
});

it('a client of the tests and a person see the same lanes', async () => {
  const client = new Client(server.url);
  await client.signIn('dispatcher@pennywort.example', 'tack-in-the-hub');
  const { lanes } = await client.json<{ lanes: { crewName: string }[] }>('GET', '/api/board');
  const { page } = await newPage(browser, server.url);
  await signIn(page, 'dispatcher');
  await expect.poll(() => page.getByRole('row', { name: /R-0/ }).count()).toBe(lanes.length);
  await page.context().close();
});
