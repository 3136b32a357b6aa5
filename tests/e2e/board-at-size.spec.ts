import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { HttpConnection } from '../bench/load/http-connection.js';
import { Ours } from '../bench/ours.js';
import { gga } from '../harness/sentences.js';
import { launch, newPage } from './browser.js';

const ROVERS = 500;
const SECONDS = 20;
/** The main thread is busy for longer than this only in a long task (W3C Long Tasks). */
const LONGEST_TASK_MS = 50;
const MOST_JAVASCRIPT = 220_000;

let ours: Ours;
let browser: Browser;
beforeAll(async () => {
  ours = await Ours.start({ rovers: ROVERS });
  browser = await launch();
});
afterAll(async () => {
  await browser.close();
  await ours.stop();
});

it('500 lanes that change every second: first load small, no long task after it, memory flat', async () => {
  const { page } = await newPage(browser, ours.url);
  let javascript = 0;
  // What the browser fetched, as it would travel: the server in front compresses, so the size is reckoned with gzip.
  const { gzipSync } = await import('node:zlib');
  const measuring: Promise<void>[] = [];
  page.on('response', (response) => {
    if (!response.url().endsWith('.js')) return;
    measuring.push(
      response.body().then((body) => {
        javascript += gzipSync(body).length;
      }),
    );
  });
  for (const pair of ours.client.cookieHeader.split('; ')) {
    const [name, value] = pair.split('=') as [string, string];
    if (name === 'hubtack') await page.context().addCookies([{ name, value, url: ours.url }]);
  }
  await page.goto('/');
  await page.getByText(`of ${ROVERS} rovers on shift`).waitFor();
  await page.waitForLoadState('load');
  await Promise.all(measuring);
  expect(javascript).toBeLessThanOrEqual(MOST_JAVASCRIPT);

  const connections = await Promise.all(ours.keys.map((key) => HttpConnection.open(ours.port, key)));
  const oneSecond = async (second: number) => {
    const body = Buffer.from(
      gga(Math.floor(Date.now() / 1000) * 1000 + second, second % 7 === 0 ? 5 : 4),
      'latin1',
    );
    await Promise.all(connections.map((connection) => connection.post(body)));
  };
  const rest = () => page.waitForTimeout(700);
  for (let second = 0; second < 5; second++) {
    await oneSecond(second);
    await rest();
  }
  const heap = async () => {
    const session = await page.context().newCDPSession(page);
    await session.send('HeapProfiler.collectGarbage');
    const { usedSize } = await session.send('Runtime.getHeapUsage');
    await session.detach();
    return usedSize;
  };
  const before = await heap();
  await page.evaluate(() => {
    const seen: number[] = [];
    Object.assign(globalThis, { longTasks: seen });
    new PerformanceObserver((list) => {
      for (const entry of list.getEntries()) seen.push(entry.duration);
    }).observe({ type: 'longtask' });
  });
  for (let second = 0; second < SECONDS; second++) {
    await oneSecond(second + 5);
    await rest();
  }
  const longTasks = await page.evaluate(() => (globalThis as unknown as { longTasks: number[] }).longTasks);
  expect(Math.max(0, ...longTasks)).toBeLessThanOrEqual(LONGEST_TASK_MS * 2);
  expect(longTasks.filter((duration) => duration > LONGEST_TASK_MS).length).toBeLessThanOrEqual(2);
  expect((await heap()) / before).toBeLessThan(1.5);
  for (const connection of connections) connection.close();
});
