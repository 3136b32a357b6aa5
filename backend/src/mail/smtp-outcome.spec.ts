import { expect, it } from 'vitest';
import { failureOf, retryDelayMs } from './smtp-outcome.js';

it.each([
  ['connection refused', { code: 'ESOCKET', originalCode: 'ECONNREFUSED', command: 'CONN' }, 'unreachable'],
  ['no answer in time', { code: 'ETIMEDOUT', command: 'CONN' }, 'unreachable'],
  ['no such host', { code: 'EDNS' }, 'unreachable'],
  ['cut off in the middle', { code: 'ECONNECTION', command: 'CONN' }, 'unreachable'],
  ['not now, at the greeting', { code: 'EPROTOCOL', responseCode: 554, command: 'CONN' }, 'unreachable'],
  ['login refused', { code: 'EAUTH', responseCode: 535, command: 'AUTH PLAIN' }, 'unreachable'],
  ['sender refused', { code: 'EENVELOPE', responseCode: 550, command: 'MAIL FROM' }, 'unreachable'],
  ['closing', { code: 'EENVELOPE', responseCode: 421, command: 'RCPT TO' }, 'unreachable'],
  ['mailbox busy', { code: 'EENVELOPE', responseCode: 450, command: 'RCPT TO' }, 'later'],
  ['out of space', { code: 'EMESSAGE', responseCode: 452, command: 'DATA' }, 'later'],
  ['no such mailbox', { code: 'EENVELOPE', responseCode: 550, command: 'RCPT TO' }, 'refused'],
  ['content refused', { code: 'EMESSAGE', responseCode: 554, command: 'DATA' }, 'refused'],
  ['no address at all', { code: 'EENVELOPE', command: 'API' }, 'refused'],
  ['over the size taken', { code: 'EMESSAGE', command: 'MAIL FROM' }, 'refused'],
  ['something of our own', new TypeError('x'), 'unreachable'],
  ['nothing', undefined, 'unreachable'],
])('%s', (_name, error, expected) => {
  expect(failureOf(error)).toBe(expected);
});

it('waits 30 s, 1, 2, 4, 8, then 15 min, a little less by chance, never more', () => {
  const attempts = [1, 2, 3, 4, 5, 6, 7, 300];
  const most = [30, 60, 120, 240, 480, 900, 900, 900];
  expect(attempts.map((n) => retryDelayMs(n, 0) / 1000)).toEqual(most);
  for (const [index, n] of attempts.entries()) {
    expect(retryDelayMs(n, 0.999) / 1000).toBeGreaterThanOrEqual(most[index]! * 0.8);
    expect(retryDelayMs(n, 0.5) / 1000).toBeLessThan(most[index]!);
  }
});
