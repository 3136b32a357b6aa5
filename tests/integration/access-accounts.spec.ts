import { createHmac } from 'node:crypto';
import { PasswordLinksService } from '@hubtack/backend/auth/password-links.service.js';
import type { AuditList } from '@hubtack/contracts/audit/audit-entry.js';
import type { Me } from '@hubtack/contracts/auth/sign-in.js';
import type { InvitedUser, User } from '@hubtack/contracts/users/user.js';
import { auditEntries } from '@hubtack/drizzle/schema/audit-entries.js';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Client } from '../harness/client.js';
import { PASSWORD, startServer, type TestServer } from '../harness/server.js';

const SESSION_SECRET = 'a secret that this test knows, and only this one';
const EMAIL = 'first@pennywort.example';
let server: TestServer;
let manager: Client;
let firstLink: string;

beforeAll(async () => {
  server = await startServer({ SESSION_SECRET });
  firstLink = tokenIn(server.app.get(PasswordLinksService).make('firstManager', null));
  manager = new Client(server.url);
});
afterAll(() => server.close());

const tokenIn = (link: string): string => link.split('/link/')[1]!;
const refusal = async (response: Response) => [
  response.status,
  ((await response.json()) as { code: string }).code,
];
const invite = (body: Partial<User>) =>
  manager.json<InvitedUser>('POST', '/api/users', {
    name: 'Somebody',
    role: 'technician',
    crewId: null,
    ...body,
  });
const me = async () =>
  (await manager.json<User[]>('GET', '/api/users')).find(({ email }) => email === EMAIL)!;
const change = (id: number, body: Record<string, unknown>) =>
  manager.call('PUT', `/api/users/${id}`, {
    name: 'Somebody',
    role: 'manager',
    crewId: null,
    active: true,
    ...body,
  });

describe('the first manager', () => {
  it('is made by the link that the first start prints, once', async () => {
    const body = { token: firstLink, name: 'Manager', email: EMAIL, password: PASSWORD };
    const guest = new Client(server.url);
    expect(await guest.json('GET', `/api/auth/link/${firstLink}`)).toEqual({
      purpose: 'firstManager',
      email: null,
    });
    expect(await refusal(await guest.call('POST', '/api/auth/password', body))).toEqual([410, 'linkInvalid']);
    const made = await manager.json<Me>('POST', '/api/auth/first-manager', body);
    expect(made).toMatchObject({ name: 'Manager', email: EMAIL, role: 'manager' });
    expect(await refusal(await guest.call('POST', '/api/auth/first-manager', body))).toEqual([
      410,
      'linkInvalid',
    ]);
  });

  it('a second link does not make a second one', async () => {
    const token = tokenIn(server.app.get(PasswordLinksService).make('firstManager', null));
    const body = { token, name: 'Another', email: 'another@pennywort.example', password: PASSWORD };
    const answer = await new Client(server.url).call('POST', '/api/auth/first-manager', body);
    expect(await refusal(answer)).toEqual([409, 'conflict']);
  });
});

describe('a firm is never without a manager who can sign in', () => {
  it('somebody who was only invited does not count; once the invitation is taken, they do', async () => {
    const { user, link } = await invite({ email: 'next@pennywort.example', role: 'manager' });
    const { id } = await me();
    for (const step of [{ role: 'dispatcher' }, { active: false }])
      expect(await refusal(await change(id, step))).toEqual([409, 'conflict']);
    const next = new Client(server.url);
    await next.json('POST', '/api/auth/password', { token: tokenIn(link!), password: PASSWORD });
    expect((await change(id, { role: 'dispatcher' })).status).toBe(200);
    // The change counts at once, so only the other one can take it back.
    expect((await manager.call('GET', '/api/users')).status).toBe(403);
    const back = { name: 'Manager', role: 'manager', crewId: null, active: true };
    expect((await next.call('PUT', `/api/users/${id}`, back)).status).toBe(200);
    expect((await change(user.id, { role: 'manager', active: false })).status).toBe(200);
    expect((await next.call('GET', '/api/auth/me')).status).toBe(401);
  });
});

describe('an invitation', () => {
  it('goes again to somebody without a password; the earlier link stops', async () => {
    const { user, link } = await invite({ email: 'again@pennywort.example' });
    const again = await manager.json<InvitedUser>('POST', `/api/users/${user.id}/invite`);
    const guest = new Client(server.url);
    const use = (from: string) =>
      guest.call('POST', '/api/auth/password', { token: tokenIn(from), password: PASSWORD });
    expect(await refusal(await use(link!))).toEqual([410, 'linkInvalid']);
    expect((await use(again.link!)).status).toBe(200);
    const answer = await manager.call('POST', `/api/users/${user.id}/invite`);
    expect(await refusal(answer)).toEqual([409, 'conflict']);
  });

  it('is worth nothing once the account is switched off, and is not sent again', async () => {
    const { user, link } = await invite({ email: 'off@pennywort.example' });
    expect((await change(user.id, { role: 'technician', active: false })).status).toBe(200);
    const body = { token: tokenIn(link!), password: PASSWORD };
    const taken = await new Client(server.url).call('POST', '/api/auth/password', body);
    expect(await refusal(taken)).toEqual([410, 'linkInvalid']);
    expect(await refusal(await manager.call('POST', `/api/users/${user.id}/invite`))).toEqual([
      409,
      'conflict',
    ]);
  });

  it('two people cannot have one address, however it is written', async () => {
    await invite({ email: 'twice@pennywort.example' });
    const answer = await manager.call('POST', '/api/users', {
      name: 'B',
      email: 'Twice@Pennywort.example',
      role: 'technician',
      crewId: null,
    });
    expect(await refusal(answer)).toEqual([409, 'conflict']);
  });
});

describe('signing out', () => {
  it('ends the sign-in after the short-lived cookie has run out too', async () => {
    const client = new Client(server.url);
    await client.signIn(EMAIL, PASSWORD);
    const copy = new Client(server.url);
    copy.setCookie('hubtack-refresh', client.cookie('hubtack-refresh')!);
    client.setCookie('hubtack', '');
    expect((await client.call('POST', '/api/auth/sign-out')).status).toBe(204);
    expect(client.cookie('hubtack-refresh')).toBeUndefined();
    expect(await refusal(await copy.call('POST', '/api/auth/refresh'))).toEqual([401, 'signInEnded']);
  });

  it('is no error for somebody who is not signed in, and another site cannot do it', async () => {
    expect((await new Client(server.url).call('POST', '/api/auth/sign-out')).status).toBe(204);
    const answer = await manager.call('POST', '/api/auth/sign-out', undefined, {
      'sec-fetch-site': 'cross-site',
    });
    expect(await refusal(answer)).toEqual([403, 'badOrigin']);
    expect((await manager.call('GET', '/api/auth/me')).status).toBe(200);
  });
});

describe('an access token', () => {
  const encode = (value: unknown) => Buffer.from(JSON.stringify(value)).toString('base64url');
  const token = (header: object, claims: object, secret = SESSION_SECRET, hash = 'sha256') => {
    const signed = `${encode(header)}.${encode(claims)}`;
    return `${signed}.${createHmac(hash, secret).update(signed).digest('base64url')}`;
  };
  const good = () => {
    const [, body] = manager.cookie('hubtack')!.split('.');
    return JSON.parse(Buffer.from(body!, 'base64url').toString()) as Record<string, unknown>;
  };
  const header = { alg: 'HS256', typ: 'JWT' };
  const forged: [string, () => string, number][] = [
    ['as the server makes it', () => token(header, good()), 200],
    ['without a signature', () => `${encode({ alg: 'none' })}.${encode(good())}.`, 401],
    ['signed with another secret', () => token(header, good(), 'x'.repeat(48)), 401],
    ['signed in another way', () => token({ alg: 'HS512' }, good(), SESSION_SECRET, 'sha512'), 401],
    ['of another issuer', () => token(header, { ...good(), iss: 'elsewhere' }), 401],
    ['for another audience', () => token(header, { ...good(), aud: 'elsewhere' }), 401],
    ['that has run out', () => token(header, { ...good(), exp: Math.floor(Date.now() / 1000) - 1 }), 401],
    ['of a sign-in that never was', () => token(header, { ...good(), sid: 'none' }), 401],
  ];
  it.each(forged)('%s', async (_, make, expected) => {
    const client = new Client(server.url);
    client.setCookie('hubtack', make());
    expect((await client.call('GET', '/api/auth/me')).status).toBe(expected);
  });
});

describe('guessing', () => {
  it('behind a proxy on this machine is counted by the address that the proxy names', async () => {
    const guess = (from: string) =>
      new Client(server.url).call(
        'POST',
        '/api/auth/sign-in',
        { email: 'guessed@pennywort.example', password: 'wrong' },
        { 'x-forwarded-for': from },
      );
    for (let attempt = 0; attempt < 10; attempt++) expect((await guess('203.0.113.1')).status).toBe(401);
    const tooMany = await guess('203.0.113.1');
    expect(await refusal(tooMany)).toEqual([429, 'tooManyRequests']);
    const wait = Number(tooMany.headers.get('retry-after'));
    expect(wait).toBeGreaterThan(0);
    expect(wait).toBeLessThanOrEqual(600);
    expect((await guess('203.0.113.2')).status).toBe(401);
  });

  it('nobody\u2019s mailbox is filled from many addresses', async () => {
    const forgot = (from: string) =>
      new Client(server.url).call(
        'POST',
        '/api/auth/forgot',
        { email: 'filled@pennywort.example' },
        { 'x-forwarded-for': from },
      );
    for (let attempt = 0; attempt < 5; attempt++)
      expect((await forgot(`203.0.113.${10 + attempt}`)).status).toBe(204);
    expect(await refusal(await forgot('203.0.113.20'))).toEqual([429, 'tooManyRequests']);
  });
});

describe('the audit', () => {
  it('says who changed whom, with before and after, and never a secret', async () => {
    const text = await (await manager.call('GET', '/api/audit')).text();
    const { entries } = JSON.parse(text) as AuditList;
    expect(entries.map(({ action }) => action)).toEqual(
      expect.arrayContaining([
        'user.firstManager',
        'user.invited',
        'user.invitedAgain',
        'user.passwordSet',
        'user.changed',
      ]),
    );
    expect(
      entries.find(({ action, subject }) => action === 'user.changed' && subject === EMAIL),
    ).toMatchObject({ before: { role: 'dispatcher' }, after: { role: 'manager' } });
    expect(text).not.toMatch(/argon2|passwordHash/);
  });

  it('is read page by page, the newest first, each entry once', async () => {
    const at = server.clock.now();
    const made = Array.from({ length: 250 }, (_, index) => ({
      at,
      actorName: 'Hubtack',
      action: 'test.made',
      subject: `entry ${index}`,
    }));
    server.database.insert(auditEntries).values(made).run();
    const ids: number[] = [];
    let before = '';
    for (;;) {
      const page = await manager.json<AuditList>('GET', `/api/audit${before}`);
      ids.push(...page.entries.map(({ id }) => id));
      if (page.nextBefore === null) break;
      before = `?before=${page.nextBefore}`;
    }
    const all = server.database.select({ id: auditEntries.id }).from(auditEntries).all();
    expect(ids).toEqual(all.map(({ id }) => id).toSorted((a, b) => b - a));
  });
});
