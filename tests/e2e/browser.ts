import { AxeBuilder } from '@axe-core/playwright';
import { chromium, type Browser, type Page } from 'playwright-core';
import { expect } from 'vitest';

const FLAGS = [
  '--headless',
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];

/** Debian's Chromium. */
export const launch = (): Promise<Browser> =>
  chromium.launch({ executablePath: '/usr/bin/chromium', args: FLAGS });

export interface WatchedPage {
  page: Page;
  /** Errors that the page wrote to its console, or threw. */
  errors: string[];
}

interface PageOptions {
  width?: number;
  look?: 'light' | 'dark';
  /** Kept away unless a test is about it: what it answers is not what the server answers. */
  withServiceWorker?: boolean;
  /** Console errors that a test brings about itself. */
  expected?: RegExp;
}

export async function newPage(
  browser: Browser,
  url: string,
  options: PageOptions = {},
): Promise<WatchedPage> {
  const { width = 1440, look = 'light', withServiceWorker = false, expected } = options;
  const context = await browser.newContext({
    baseURL: url,
    viewport: { width, height: 900 },
    colorScheme: look,
    serviceWorkers: withServiceWorker ? 'allow' : 'block',
  });
  const page = await context.newPage();
  const errors: string[] = [];
  const note = (text: string) => {
    if (!expected?.test(text)) errors.push(text);
  };
  page.on('console', (message) => {
    // Asking who is signed in before anybody is: the browser reports every 401.
    if (message.type() === 'error' && !message.location().url.includes('/api/auth/')) note(message.text());
  });
  page.on('pageerror', (error) => note(error.message));
  return { page, errors };
}

export async function signIn(page: Page, name: string): Promise<void> {
  await page.goto('/sign-in');
  await page.getByRole('button', { name: `${name}@pennywort.example` }).click();
  await page.getByRole('button', { name: 'Sign in', exact: true }).click();
  await page.getByRole('navigation', { name: 'Pages' }).waitFor();
}

/** axe finds nothing serious. */
export async function expectAccessible(page: Page): Promise<void> {
  const { violations } = await new AxeBuilder({ page }).analyze();
  const serious = violations
    .filter(({ impact }) => impact === 'serious' || impact === 'critical')
    .map(({ id, nodes }) => `${id}: ${nodes[0]?.html} ${nodes[0]?.failureSummary}`);
  expect(serious, page.url()).toEqual([]);
}
