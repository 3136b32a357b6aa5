import { describe, expect, it } from 'vitest';
import { typingFaults } from './typing-faults.js';

const good = { address: 'caster.network.example', port: 2101, mountPoint: 'TANF00' };
const fieldsOf = (change: Partial<typeof good>) =>
  typingFaults({ ...good, ...change }).map(({ field }) => field);

describe('typing faults in a correction login', () => {
  it('says nothing of a good one', () => {
    expect(typingFaults(good)).toEqual([]);
  });
  it.each([
    [{ address: 'http://caster.network.example' }, 'address'],
    [{ address: 'caster.network.example:2101' }, 'address'],
    [{ address: 'caster.network.example/TANF00' }, 'address'],
    [{ address: ' caster.network.example' }, 'address'],
    [{ mountPoint: '/TANF00' }, 'mountPoint'],
    [{ mountPoint: 'TANF\u200b00' }, 'mountPoint'],
    [{ mountPoint: 'TANF0O' }, 'mountPoint'],
    [{ mountPoint: 'QUARBl1' }, 'mountPoint'],
    [{ port: 2110 }, 'port'],
  ])('%o is noticed at its field', (change, field) => {
    expect(fieldsOf(change)).toEqual([field]);
  });
});
