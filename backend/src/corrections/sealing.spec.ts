import { describe, expect, it } from 'vitest';
import { seal, SealBroken, sealingKey, unseal } from './sealing.js';

const key = sealingKey('a secret of the server that is long enough');
describe('a sealed password', () => {
  it('is opened by its key and row, and says nothing of itself', () => {
    const sealed = seal('naïve ŝtono 42', key, 'source 7');
    expect(sealed).not.toContain('42');
    expect(unseal(sealed, key, 'source 7')).toBe('naïve ŝtono 42');
    expect(seal('naïve ŝtono 42', key, 'source 7')).not.toBe(sealed);
  });
  it('is not opened by another key, in another row, or with a bit changed', () => {
    const sealed = seal('words', key, 'source 7');
    const bytes = Buffer.from(sealed.slice(3), 'base64url');
    bytes[14]! ^= 1;
    for (const open of [
      () => unseal(sealed, sealingKey('another secret'), 'source 7'),
      () => unseal(sealed, key, 'source 8'),
      () => unseal(`v1.${bytes.toString('base64url')}`, key, 'source 7'),
      () => unseal('v1.AAAA', key, 'source 7'),
      () => unseal('words', key, 'source 7'),
    ])
      expect(open).toThrow(SealBroken);
  });
});
