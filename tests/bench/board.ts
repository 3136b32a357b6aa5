import type { Browser } from 'playwright-core';
import { launch } from '../e2e/browser.js';
import { BusyBoard } from '../harness/busy-board.js';
import { Ours } from './ours.js';
import type { Row } from './report.js';
import { median } from './statistics.js';

const ROVERS = 500;
const MINUTES = 5;
const ROUNDS = 7;
/** Interactive within this (issue: the board on the demo, warm server). */
const INTERACTIVE_MS = 1500;
const LONG_TASK_MS = 50;
/** Ribbons keep an hour of runs and so grow for an hour: seldom enough that they do not hide what would go on growing. */
const LOSE_EVERY_SECONDS = 60;

/** Navigation to lanes on screen that can be used, with an empty browser cache, ms. */
async function interactive(browser: Browser, ours: Ours): Promise<number> {
  const context = await browser.newContext({ baseURL: ours.url, viewport: { width: 1440, height: 900 } });
  for (const pair of ours.client.cookieHeader.split('; ')) {
    const [name, value] = pair.split('=') as [string, string];
    if (name === 'hubtack') await context.addCookies([{ name, value, url: ours.url }]);
  }
  const page = await context.newPage();
  await page.addInitScript(() => {
    const look = (): void => {
      if (document.querySelector('[role=row] [aria-expanded], [role=row] button')) {
        requestAnimationFrame(() => {
          Object.assign(globalThis, { lanesAt: performance.now() });
        });
      } else requestAnimationFrame(look);
    };
    requestAnimationFrame(look);
  });
  await page.goto('/');
  await page.waitForFunction(() => 'lanesAt' in globalThis);
  const at = await page.evaluate(() => (globalThis as unknown as { lanesAt: number }).lanesAt);
  await context.close();
  return at;
}

/** The board in Chromium: how soon it can be used, and whether five minutes of 500 moving lanes wear it out. */
export async function board(): Promise<Row[]> {
  const browser = await launch();
  const demo = await Ours.start({ rovers: 6 });
  await interactive(browser, demo);
  const times = [];
  for (let round = 0; round < ROUNDS; round++) times.push(await interactive(browser, demo));
  await demo.stop();

  const ours = await Ours.start({ rovers: ROVERS });
  const busy = await BusyBoard.open(browser, ours);
  await busy.change(20, LOSE_EVERY_SECONDS);
  const before = await busy.heap();
  await busy.watchLongTasks();
  const until = performance.now() + MINUTES * 60_000;
  let seconds = 0;
  for (; performance.now() < until; seconds += 10) await busy.change(10, LOSE_EVERY_SECONDS);
  const after = await busy.heap();
  const longTasks = await busy.longTasks();
  busy.close();
  await browser.close();
  await ours.stop();
  const mb = (bytes: number) => bytes / 2 ** 20;
  return [
    {
      name: 'board/interactive',
      value: median(times),
      unit: 'ms',
      floor: INTERACTIVE_MS,
      ratio: median(times) / INTERACTIVE_MS,
      n: ROUNDS,
    },
    {
      name: 'board/heap after 5 min',
      value: mb(after),
      unit: 'MB',
      floor: mb(before),
      ratio: after / before,
      n: seconds,
    },
    {
      name: 'board/longest task',
      value: Math.max(0, ...longTasks),
      unit: 'ms',
      floor: LONG_TASK_MS,
      ratio: Math.max(0, ...longTasks) / LONG_TASK_MS,
      n: seconds,
    },
    {
      name: 'board/tasks over 50 ms',
      value: longTasks.length,
      unit: 'tasks',
      floor: null,
      ratio: null,
      n: seconds,
    },
  ];
}
