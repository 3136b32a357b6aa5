import { describe, expect, it } from 'vitest';
import { isPrivate, resolveOnce, type Resolved } from './addresses.js';

const of = (address: string): Resolved => ({ address, family: address.includes(':') ? 6 : 4 });

// IANA special-purpose address registries (RFC 6890, RFC 4291, RFC 4193, RFC 6598).
describe('addresses of private networks', () => {
  it.each([
    '127.0.0.1',
    '10.1.2.3',
    '172.16.0.1',
    '172.31.255.255',
    '192.168.1.1',
    '169.254.169.254',
    '100.64.0.1',
    '0.0.0.0',
    '224.0.0.1',
    '255.255.255.255',
    '::1',
    '::',
    'fe80::1%eth0',
    'fd00::1',
    'ff02::1',
    '::ffff:127.0.0.1',
    '::ffff:10.0.0.1',
    '::ffff:7f00:1',
    '64:ff9b::a00:1',
  ])('%s is one', (address) => {
    expect(isPrivate(of(address))).toBe(true);
  });
  it.each(['8.8.8.8', '172.32.0.1', '100.128.0.1', '2001:db8::1', '::ffff:8.8.8.8'])(
    '%s is none',
    (address) => {
      expect(isPrivate(of(address))).toBe(false);
    },
  );
});

describe('a name is resolved once', () => {
  const lookup =
    (...addresses: string[]) =>
    () =>
      Promise.resolve(addresses.map(of));
  it('to the first address that may be connected to', async () => {
    expect(await resolveOnce('a.example', false, lookup('127.0.0.1', '8.8.8.8'))).toEqual(of('8.8.8.8'));
    expect(await resolveOnce('a.example', true, lookup('127.0.0.1', '8.8.8.8'))).toEqual(of('127.0.0.1'));
  });
  it('and refused when all are private, a typed address like a name', async () => {
    await expect(resolveOnce('a.example', false, lookup('10.0.0.1', '::1'))).rejects.toThrow(
      'private network',
    );
    await expect(resolveOnce('192.168.1.7', false, lookup())).rejects.toThrow('private network');
    await expect(resolveOnce('0x7f.1', false, () => Promise.resolve([of('127.0.0.1')]))).rejects.toThrow(
      'private',
    );
  });
});
