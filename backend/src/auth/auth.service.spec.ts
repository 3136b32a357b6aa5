import { users } from '@hubtack/drizzle/schema/users.js';
import { makeTestDatabase } from '@hubtack/drizzle/testing/test-database.js';
import { afterEach, beforeEach, expect, it } from 'vitest';
import { AuthService } from './auth.service.js';
import type { PasswordService } from './password.service.js';

let store: ReturnType<typeof makeTestDatabase>;
beforeEach(() => {
  store = makeTestDatabase();
  store.database
    .insert(users)
    .values({
      name: 'Technician',
      email: 'technician@pennywort.example',
      role: 'technician',
      passwordHash: 'old',
      createdAt: 0,
    })
    .run();
});
afterEach(() => store.remove());

/** Signs in while `meanwhile` happens during the check of the password, which takes some tens of milliseconds. */
function signIn(meanwhile: Partial<typeof users.$inferInsert> | null): Promise<unknown> {
  const passwords: Pick<PasswordService, 'verify'> = {
    verify: (passwordHash) => {
      if (meanwhile) store.database.update(users).set(meanwhile).run();
      return Promise.resolve(passwordHash === 'old');
    },
  };
  const auth = new AuthService(
    store.database,
    { sign: () => 'access' } as never,
    passwords as never,
    { start: () => ({ sessionId: 's', refreshToken: 'r', endsAt: 1 }) } as never,
    null as never,
    null as never,
    null as never,
    null as never,
    { now: () => 0 },
  );
  return auth.signIn({ email: 'technician@pennywort.example', password: 'whatever' });
}

it('signs in', async () => {
  expect(await signIn(null)).toMatchObject({ sessionId: 's', accessToken: 'access' });
});
it.each([
  ['reset', { passwordHash: 'new' }],
  ['taken away with the account', { active: false }],
])('a password that is %s while it is checked does not count', async (_, meanwhile) => {
  await expect(signIn(meanwhile)).rejects.toMatchObject({ code: 'wrongSignIn' });
});
