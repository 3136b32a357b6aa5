import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import { z } from 'zod';
import { readOptions } from './options.js';

const argv = process.argv;
let said: string;
beforeEach(() => {
  said = '';
  const note = (text: string) => void (said += text);
  vi.spyOn(console, 'error').mockImplementation(note);
  vi.spyOn(console, 'log').mockImplementation(note);
  vi.spyOn(process, 'exit').mockImplementation((status) => {
    throw new Error(`exit ${String(status)}`);
  });
});
afterEach(() => {
  process.argv = argv;
  vi.restoreAllMocks();
});

function read(...words: string[]) {
  process.argv = ['node', 'command', ...words];
  return readOptions(
    'How to call it',
    { crews: { type: 'string' } },
    z.object({ crews: z.coerce.number().int().min(1).default(6) }),
  );
}

it('reads options and fills defaults', () => {
  expect([read('--crews', '3'), read()]).toEqual([{ crews: 3 }, { crews: 6 }]);
});

it.each([
  [['--crews', 'many'], '--crews'],
  [['--crews', '0'], '--crews'],
  [['--crew', '3'], '--crew'],
  [['50'], '50'],
])('%j: says what is wrong and how to call it, and ends with status 2', (words, named) => {
  expect(() => read(...words)).toThrow('exit 2');
  expect(said).toContain(named);
  expect(said).toContain('How to call it');
});

it('--help shows how to call it and is no error', () => {
  expect(() => read('--help')).toThrow('exit 0');
  expect(said).toContain('How to call it');
});
