import { users } from '@hubtack/drizzle/schema/users.js';
import { makeTestDatabase } from '@hubtack/drizzle/testing/test-database.js';
import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import { parseEnvironment } from '../config/environment.js';
import { FirstStartService } from './first-start.service.js';
import { PasswordLinksService } from './password-links.service.js';

let store: ReturnType<typeof makeTestDatabase>;
const print = vi.spyOn(console, 'log').mockImplementation(() => undefined);
beforeEach(() => {
  store = makeTestDatabase();
});
afterEach(() => {
  store.remove();
  print.mockClear();
});

/** What a start prints: the tokens of the links in it. */
function start(environment: Record<string, string> = {}): { tokens: string[]; links: PasswordLinksService } {
  const parsed = parseEnvironment(environment);
  const links = new PasswordLinksService(store.database, parsed, { now: () => 0 });
  print.mockClear();
  new FirstStartService(store.database, parsed, links).onApplicationBootstrap();
  const text = print.mock.calls.flat().join('\n');
  return { links, tokens: [...text.matchAll(/\/link\/(\S+)/g)].map(([, token]) => token!) };
}

it('a start without anybody prints a link for the first manager; the next start another, instead of it', () => {
  const first = start();
  expect(first.tokens).toHaveLength(1);
  expect(first.links.find(first.tokens[0]!)).toMatchObject({ purpose: 'firstManager', userId: null });
  const second = start();
  expect(() => second.links.find(first.tokens[0]!)).toThrow(/used or is too old/);
  expect(second.links.find(second.tokens[0]!).purpose).toBe('firstManager');
});

it('once there is somebody, and in the demo, nothing is printed', () => {
  expect(start({ DEMO: 'on' }).tokens).toEqual([]);
  store.database
    .insert(users)
    .values({ name: 'Manager', email: 'manager@pennywort.example', role: 'manager', createdAt: 0 })
    .run();
  expect(start().tokens).toEqual([]);
});
