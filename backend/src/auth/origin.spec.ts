import type { Request } from 'express';
import { expect, it } from 'vitest';
import { mayWriteFrom } from './origin.js';

const may = (method: string, headers: Record<string, string>, publicOrigin: string | null = null) =>
  mayWriteFrom({ method, headers } as unknown as Request, publicOrigin);
const host = 'board.pennywort.example:8080';

it.each([
  ['reading is always let through', 'GET', { 'sec-fetch-site': 'cross-site' }, true],
  ['the page itself', 'POST', { 'sec-fetch-site': 'same-origin' }, true],
  ['an address typed in', 'POST', { 'sec-fetch-site': 'none' }, true],
  ['another site', 'POST', { 'sec-fetch-site': 'cross-site' }, false],
  ['a sister of this site', 'DELETE', { 'sec-fetch-site': 'same-site' }, false],
  [
    'Fetch Metadata counts before Origin',
    'PUT',
    { 'sec-fetch-site': 'cross-site', origin: `http://${host}`, host },
    false,
  ],
  ['an old browser on the page itself', 'POST', { origin: `http://${host}`, host }, true],
  ['the same name on another port', 'POST', { origin: 'http://board.pennywort.example', host }, false],
  ['a sandboxed frame', 'POST', { origin: 'null', host }, false],
  ['an origin that is none', 'POST', { origin: 'http://[', host }, false],
  ['a script, which has nobody else\u2019s cookies', 'POST', { host }, true],
])('%s', (_, method, headers, expected) => {
  expect(may(method, headers)).toBe(expected);
});

it('behind a proxy that changes Host, the public address counts', () => {
  const headers = { origin: 'https://fixes.pennywort.example', host: '127.0.0.1:3000' };
  expect(may('POST', headers)).toBe(false);
  expect(may('POST', headers, 'https://fixes.pennywort.example')).toBe(true);
});
