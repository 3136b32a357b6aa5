import { passwordLinks } from '@hubtack/drizzle/schema/password-links.js';
import { users } from '@hubtack/drizzle/schema/users.js';
import { makeTestDatabase } from '@hubtack/drizzle/testing/test-database.js';
import { afterEach, beforeEach, expect, it } from 'vitest';
import { parseEnvironment } from '../config/environment.js';
import { PasswordLinksService } from './password-links.service.js';

const HOUR = 3_600_000;
let now = 0;
let store: ReturnType<typeof makeTestDatabase>;
let links: PasswordLinksService;
let userId: number;
beforeEach(() => {
  now = 0;
  store = makeTestDatabase();
  links = new PasswordLinksService(store.database, parseEnvironment({}), { now: () => now });
  userId = store.database
    .insert(users)
    .values({ name: 'Chief', email: 'chief@pennywort.example', role: 'crewChief', createdAt: 0 })
    .returning()
    .get().id;
});
afterEach(() => store.remove());

const make = (purpose: 'invite' | 'reset') => links.make(purpose, userId).split('/link/')[1]!;
const works = (token: string) => {
  try {
    return links.find(token).userId === userId;
  } catch {
    return false;
  }
};

it.each([
  ['invite', 7 * 24 * HOUR],
  ['reset', HOUR],
] as const)('a link to %s works for %d ms', (purpose, lifetimeMs) => {
  const token = make(purpose);
  now = lifetimeMs - 1;
  expect(works(token)).toBe(true);
  now = lifetimeMs;
  expect(works(token)).toBe(false);
});

it('a new link takes the place of the earlier one', () => {
  const first = make('reset');
  const second = make('reset');
  expect([works(first), works(second)]).toEqual([false, true]);
});

it('"forgot password", asked for by anybody, leaves an invitation alone', () => {
  const invitation = make('invite');
  make('reset');
  expect(works(invitation)).toBe(true);
});

it('a used link has used up every open one of the person', () => {
  const invitation = make('invite');
  const reset = make('reset');
  links.markUsed(links.find(reset));
  expect([works(invitation), works(reset)]).toEqual([false, false]);
});

it('is stored as a hash only', () => {
  const token = make('invite');
  expect(JSON.stringify(store.database.select().from(passwordLinks).all())).not.toContain(token);
});
