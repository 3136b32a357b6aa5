import { expect, it } from 'vitest';
import { publicUrlOf } from './public-url.js';

it.each([
  [{ HOST: '127.0.0.1', PORT: 3000 }, 'http://127.0.0.1:3000/'],
  [{ HOST: '0.0.0.0', PORT: 3000 }, 'http://localhost:3000/'],
  [{ HOST: '::', PORT: 3000 }, 'http://localhost:3000/'],
  [{ HOST: '::1', PORT: 3000 }, 'http://[::1]:3000/'],
  [
    { HOST: '::1', PORT: 3000, PUBLIC_URL: 'https://fixes.pennywort.example' },
    'https://fixes.pennywort.example/',
  ],
])('%o is reached at %s', (environment, expected) => {
  expect(new URL(publicUrlOf({ PUBLIC_URL: undefined, ...environment })).href).toBe(expected);
});
