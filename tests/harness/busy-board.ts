import type { Browser, Page } from 'playwright-core';
import { HttpConnection } from '../bench/load/http-connection.js';
import type { Ours } from '../bench/ours.js';
import { gga } from './sentences.js';

/** A board in Chromium with hundreds of lanes, and the rovers that make all of them change. */
export class BusyBoard {
  private second = 0;

  private constructor(
    readonly page: Page,
    private readonly connections: HttpConnection[],
  ) {}

  static async open(
    browser: Browser,
    ours: Ours,
    watch: (page: Page) => void = () => {},
  ): Promise<BusyBoard> {
    const context = await browser.newContext({ baseURL: ours.url, viewport: { width: 1440, height: 900 } });
    for (const pair of ours.client.cookieHeader.split('; ')) {
      const [name, value] = pair.split('=') as [string, string];
      if (name === 'hubtack') await context.addCookies([{ name, value, url: ours.url }]);
    }
    const page = await context.newPage();
    watch(page);
    await page.goto('/');
    await page.getByText(`of ${ours.keys.length} rovers on shift`).waitFor();
    await page.waitForLoadState('load');
    const connections = await Promise.all(ours.keys.map((key) => HttpConnection.open(ours.port, key)));
    return new BusyBoard(page, connections);
  }

  /** All rovers post once a second; every so many seconds all lose their fix for one, which makes each ribbon longer. */
  async change(seconds: number, loseEvery = 7): Promise<void> {
    for (let count = 0; count < seconds; count++) {
      const fullSecond = Math.floor(Date.now() / 1000) * 1000;
      const quality = this.second % loseEvery === 0 ? 5 : 4;
      const body = Buffer.from(gga(fullSecond + (this.second % 100), quality), 'latin1');
      this.second++;
      await Promise.all(this.connections.map((connection) => connection.post(body)));
      await this.page.waitForTimeout(700);
    }
  }

  /** From here on `longTasks` knows each task of more than 50 ms (W3C Long Tasks), ms. */
  async watchLongTasks(): Promise<void> {
    await this.page.evaluate(() => {
      const seen: number[] = [];
      Object.assign(globalThis, { longTasks: seen });
      new PerformanceObserver((list) => {
        for (const entry of list.getEntries()) seen.push(entry.duration);
      }).observe({ type: 'longtask' });
    });
  }

  longTasks(): Promise<number[]> {
    return this.page.evaluate(() => (globalThis as unknown as { longTasks: number[] }).longTasks);
  }

  /** Bytes of live JavaScript objects, after a collection. */
  async heap(): Promise<number> {
    const session = await this.page.context().newCDPSession(this.page);
    await session.send('HeapProfiler.collectGarbage');
    const { usedSize } = await session.send('Runtime.getHeapUsage');
    await session.detach();
    return usedSize;
  }

  close(): void {
    for (const connection of this.connections) connection.close();
  }
}
