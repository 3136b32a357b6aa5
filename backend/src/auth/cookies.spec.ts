import type { CookieOptions, Request, Response } from 'express';
import { describe, expect, it } from 'vitest';
import { SignInCookies } from './cookies.js';

/** The cookies that a response would set, and those it would clear, by name. */
function recorded(act: (response: Response) => void): {
  set: Map<string, CookieOptions>;
  cleared: Map<string, CookieOptions>;
} {
  const set = new Map<string, CookieOptions>();
  const cleared = new Map<string, CookieOptions>();
  act({
    cookie: (name: string, _value: string, options: CookieOptions) => set.set(name, options),
    clearCookie: (name: string, options: CookieOptions) => cleared.set(name, options),
  } as unknown as Response);
  return { set, cleared };
}

const tokens = { access: 'a', refresh: 'r', endsAt: 50_000, now: 20_000 };

describe.each([
  ['http://127.0.0.1:3000', false, 'hubtack', 'hubtack-refresh'],
  ['https://fixes.pennywort.example', true, '__Host-hubtack', '__Secure-hubtack-refresh'],
])('at %s', (PUBLIC_URL, secure, access, refresh) => {
  const cookies = new SignInCookies({ PUBLIC_URL });

  it('carries the names and attributes that browsers hold a cookie to', () => {
    const { set } = recorded((response) => cookies.set(response, tokens));
    const common = { httpOnly: true, sameSite: 'strict', secure };
    // A __Host- cookie must have Path=/ and no Domain, else a browser drops it.
    expect(set.get(access)).toEqual({ ...common, path: '/', maxAge: 600_000 });
    expect(set.get(refresh)).toEqual({ ...common, path: '/api/auth', maxAge: 30_000 });
  });

  it('clears what it has set: same names, same paths', () => {
    const { cleared } = recorded((response) => cookies.clear(response));
    expect(cleared.get(access)).toMatchObject({ path: '/', secure });
    expect(cleared.get(refresh)).toMatchObject({ path: '/api/auth', secure });
  });

  it('reads its own names only', () => {
    const request = { cookies: { [access]: 'a', [refresh]: '' } } as unknown as Request;
    expect([cookies.access(request), cookies.refresh(request)]).toEqual(['a', null]);
  });
});

it('a cookie planted without the prefix is not read behind https', () => {
  const request = { cookies: { hubtack: 'planted', 'hubtack-refresh': 'planted' } } as unknown as Request;
  const cookies = new SignInCookies({ PUBLIC_URL: 'https://fixes.pennywort.example' });
  expect([cookies.access(request), cookies.refresh(request)]).toEqual([null, null]);
});
