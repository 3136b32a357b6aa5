import { expect, it } from 'vitest';
import { nearestSpellings } from './spellings.js';

const names = ['TANF00', 'TANF01', 'MILR00', 'QUARB2', 'SALT00', 'TASNET', 'tanf00'];

it.each([
  ['TANF0O', 'TANF00'],
  ['tanf0o', 'tanf00'],
  ['TNAF00', 'TANF00'],
  ['TANF0', 'TANF00'],
  ['QUARRB2', 'QUARB2'],
  ['OUARB2', 'QUARB2'],
  ['SALTOO', 'SALT00'],
  ['M1LR00', 'MILR00'],
  ['TASN', 'TASNET'],
])('%s was meant for %s', (typed, meant) => {
  expect(nearestSpellings(typed, names).slice(0, 2)).toContain(meant);
});
it('of equally near ones the nearer in place comes first', () => {
  const distance = (name: string) => (name === 'BASE2' ? 1000 : 9000);
  expect(nearestSpellings('BASE', ['BASE1', 'BASE2', 'BASE3'], distance)[0]).toBe('BASE2');
});
it('what is nothing like it is not suggested', () => {
  expect(nearestSpellings('ZZZZZZ', names)).toEqual([]);
});
