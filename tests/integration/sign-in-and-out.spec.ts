import { startMailbox, type Mailbox } from '@hubtack/simulators/mailbox/mailbox.js';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Client } from '../harness/client.js';
import { PASSWORD, startServer, type TestServer } from '../harness/server.js';

let server: TestServer;
let mailbox: Mailbox;
beforeAll(async () => {
  mailbox = await startMailbox({});
  server = await startServer({ SMTP_URL: mailbox.smtpUrl, PUBLIC_URL: 'http://hubtack.pennywort.example' });
});
afterAll(async () => {
  await server.close();
  await mailbox.close();
});

const status = async (client: Client, path = '/api/auth/me') => (await client.call('GET', path)).status;
const codeOf = async (response: Response) => ((await response.json()) as { code?: string }).code;
async function signedIn(email: string): Promise<Client> {
  const client = new Client(server.url);
  expect((await client.signIn(email, PASSWORD)).status).toBe(200);
  return client;
}
const linkIn = (text: string): string => /https?:\/\/\S+\/link\/(\S+)/.exec(text)![1]!;

describe('signing in', () => {
  it('sets cookies that scripts cannot read and other sites cannot use', async () => {
    await server.as('dispatcher');
    const response = await new Client(server.url).signIn('dispatcher@pennywort.example', PASSWORD);
    const [access, refresh] = response.headers.getSetCookie();
    for (const cookie of [access, refresh]) expect(cookie).toMatch(/HttpOnly; SameSite=Strict/);
    expect(access).toMatch(/^hubtack=.*Path=\//);
    expect(refresh).toMatch(/^hubtack-refresh=.*Path=\/api\/auth/);
  });
  it('says the same for a wrong password and an unknown address', async () => {
    await server.as('dispatcher');
    const answers = await Promise.all(
      [
        ['dispatcher@pennywort.example', 'wrong'],
        ['nobody@pennywort.example', PASSWORD],
      ].map(async ([email, password]) => {
        const response = await new Client(server.url).signIn(email!, password!);
        const { detail, code } = (await response.json()) as { detail: string; code: string };
        return { status: response.status, detail, code };
      }),
    );
    expect(answers[0]).toEqual(answers[1]);
    expect(answers[0]).toMatchObject({ status: 401, code: 'wrongSignIn' });
  });
  it('guessing is slowed down by address and account; the right password elsewhere still works', async () => {
    const tries = [];
    for (let attempt = 0; attempt < 12; attempt++)
      tries.push(await new Client(server.url).signIn('guessed@pennywort.example', `guess ${attempt}`));
    expect(tries.slice(0, 10).map((response) => response.status)).toEqual(
      Array.from({ length: 10 }, () => 401),
    );
    expect(tries[11]!.status).toBe(429);
    expect(Number(tries[11]!.headers.get('retry-after'))).toBeGreaterThan(0);
    expect(await codeOf(tries[11]!)).toBe('tooManyRequests');
    await signedIn('dispatcher@pennywort.example');
  });
});

describe('a sign-in', () => {
  it('ends on the server at signing out: a copy of the cookies is worth nothing', async () => {
    await server.as('technician');
    const client = await signedIn('technician@pennywort.example');
    const copy = new Client(server.url);
    for (const name of ['hubtack', 'hubtack-refresh']) copy.setCookie(name, client.cookie(name)!);
    expect((await client.call('POST', '/api/auth/sign-out')).status).toBe(204);
    const me = await copy.call('GET', '/api/auth/me');
    expect([me.status, await codeOf(me)]).toEqual([401, 'signInEnded']);
    expect((await copy.call('POST', '/api/auth/refresh')).status).toBe(401);
  });
  it('rotates its refresh token, and ends when an old one is used again: somebody has stolen it', async () => {
    const client = await signedIn('technician@pennywort.example');
    const thief = new Client(server.url);
    thief.setCookie('hubtack-refresh', client.cookie('hubtack-refresh')!);
    const before = client.cookie('hubtack-refresh');
    expect((await client.call('POST', '/api/auth/refresh')).status).toBe(200);
    expect(client.cookie('hubtack-refresh')).not.toBe(before);
    server.clock.advance(60_000);
    const stolen = await thief.call('POST', '/api/auth/refresh');
    expect([stolen.status, await codeOf(stolen)]).toEqual([401, 'tokenReused']);
    expect(await status(client)).toBe(401);
    expect((await client.call('POST', '/api/auth/refresh')).status).toBe(401);
  });
  it('two tabs that refresh at the same moment both stay signed in', async () => {
    const first = await signedIn('technician@pennywort.example');
    const second = new Client(server.url);
    second.setCookie('hubtack-refresh', first.cookie('hubtack-refresh')!);
    const answers = await Promise.all([first, second].map((tab) => tab.call('POST', '/api/auth/refresh')));
    expect(answers.map((answer) => answer.status)).toEqual([200, 200]);
    expect([await status(first), await status(second)]).toEqual([200, 200]);
  });
  it('ends by itself after twelve hours without use', async () => {
    const client = await signedIn('technician@pennywort.example');
    server.clock.advance(12 * 3_600_000 + 1000);
    expect(await status(client)).toBe(401);
    expect((await client.call('POST', '/api/auth/refresh')).status).toBe(401);
  });
  it('counts with a changed role at once, and not at all once switched off', async () => {
    // The clock has moved on: earlier sign-ins are over.
    const manager = await signedIn('manager@pennywort.example').catch(async () => server.as('manager'));
    const users = await manager.json<{ id: number; email: string }[]>('GET', '/api/users');
    const { id } = users.find(({ email }) => email.startsWith('technician'))!;
    const client = await signedIn('technician@pennywort.example');
    const change = { name: 'technician', crewId: null, active: true };
    expect((await client.call('POST', '/api/rovers', { label: 'R-x' })).status).toBe(201);
    await manager.json('PUT', `/api/users/${id}`, { ...change, role: 'dispatcher' });
    expect((await client.call('POST', '/api/rovers', { label: 'R-y' })).status).toBe(403);
    await manager.json('PUT', `/api/users/${id}`, { ...change, role: 'dispatcher', active: false });
    expect(await status(client)).toBe(401);
  });
});

describe('writes from elsewhere', () => {
  it.each([
    [{ 'sec-fetch-site': 'cross-site' }, 403],
    [{ 'sec-fetch-site': 'same-site' }, 403],
    [{ origin: 'http://elsewhere.example' }, 403],
    [{ origin: 'null' }, 403],
    [{ 'sec-fetch-site': 'same-origin' }, 400],
    [{ origin: 'http://hubtack.pennywort.example' }, 400],
    [{}, 400],
  ])('%o is answered %d', async (headers, expected) => {
    const client = await signedIn('manager@pennywort.example');
    const response = await client.call('POST', '/api/crews', {}, headers);
    expect(response.status).toBe(expected);
    if (expected === 403) expect(await codeOf(response)).toBe('badOrigin');
  });
});

describe('links by mail', () => {
  it('an invitation leads to a password and a sign-in, once', async () => {
    const manager = await signedIn('manager@pennywort.example');
    const body = { name: 'New dispatcher', email: 'new@pennywort.example', role: 'dispatcher', crewId: null };
    const invited = await manager.json<{ link: string | null }>('POST', '/api/users', body);
    expect(invited.link).toBeNull();
    const mail = await mailbox.waitFor(({ to }) => to === body.email);
    expect(mail.text).toContain('http://hubtack.pennywort.example/link/');
    const token = linkIn(mail.text);
    const guest = new Client(server.url);
    expect(await guest.json('GET', `/api/auth/link/${token}`)).toEqual({
      purpose: 'invite',
      email: body.email,
    });
    expect((await guest.call('POST', '/api/auth/password', { token, password: 'short' })).status).toBe(400);
    expect((await guest.call('POST', '/api/auth/password', { token, password: PASSWORD })).status).toBe(200);
    expect(await status(guest)).toBe(200);
    const again = await new Client(server.url).call('POST', '/api/auth/password', {
      token,
      password: PASSWORD,
    });
    expect([again.status, await codeOf(again)]).toEqual([410, 'linkInvalid']);
  });
  it('a reset ends every other sign-in; nobody learns whether an account exists', async () => {
    const client = await signedIn('new@pennywort.example');
    const guest = new Client(server.url);
    for (const email of ['new@pennywort.example', 'nobody@pennywort.example'])
      expect((await guest.call('POST', '/api/auth/forgot', { email })).status).toBe(204);
    const mail = await mailbox.waitFor(({ subject }) => subject.includes('new Hubtack password'));
    expect(mailbox.mails.filter(({ to }) => to.startsWith('nobody'))).toEqual([]);
    const token = linkIn(mail.text);
    expect(
      (await guest.call('POST', '/api/auth/password', { token, password: 'another few words' })).status,
    ).toBe(200);
    expect(await status(client)).toBe(401);
  });
  it('the last manager cannot be taken away', async () => {
    const manager = await signedIn('manager@pennywort.example');
    const users = await manager.json<{ id: number; role: string }[]>('GET', '/api/users');
    const { id } = users.find(({ role }) => role === 'manager')!;
    const answer = await manager.call('PUT', `/api/users/${id}`, {
      name: 'M',
      role: 'technician',
      crewId: null,
      active: true,
    });
    expect([answer.status, await codeOf(answer)]).toEqual([409, 'conflict']);
  });
});
