import { spansOf, totalsOf, partition } from '@hubtack/backend/fixes/timeline.js';
import fc from 'fast-check';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { postSentences } from '../harness/client.js';
import { gga } from '../harness/sentences.js';
import { startServer, type TestServer } from '../harness/server.js';
import { timelineOf } from '../harness/timeline.js';

let server: TestServer;
beforeAll(async () => {
  server = await startServer();
});
afterAll(() => server.close());

const START = Math.floor(Date.now() / 1000) * 1000 - 3_600_000;
const WINDOW_MS = 400_000;
const iso = (time: number) => new Date(time).toISOString();

/** Epochs with runs, gaps and changes; some of them come twice, in any order, in posts of any size. */
const arrivals = fc
  .uniqueArray(
    fc.record({ second: fc.integer({ min: 0, max: 380 }), quality: fc.constantFrom(0, 1, 4, 4, 5) }),
    { selector: ({ second }) => second, minLength: 1, maxLength: 80 },
  )
  .chain((epochs) =>
    fc.record({
      epochs: fc.constant(epochs),
      order: fc.shuffledSubarray([...epochs, ...epochs], { minLength: epochs.length * 2 }),
      sizes: fc.array(fc.integer({ min: 1, max: 40 }), { minLength: 1, maxLength: 20 }),
    }),
  );

function cut<T>(list: readonly T[], sizes: readonly number[]): T[][] {
  const pieces: T[][] = [];
  for (let at = 0, piece = 0; at < list.length; piece++) {
    const size = sizes[piece % sizes.length]!;
    pieces.push(list.slice(at, at + size));
    at += size;
  }
  return pieces;
}

describe('any shuffle, duplication and split of the same epochs', () => {
  it('ends in the same spans and totals as the sorted epochs, and counts each once', async () => {
    await fc.assert(
      fc.asyncProperty(arrivals, async ({ epochs, order, sizes }) => {
        const rover = await server.makeRover();
        let accepted = 0;
        for (const piece of cut(order, sizes)) {
          const text = piece.map(({ second, quality }) => gga(START + second * 1000, quality)).join('');
          accepted += (await postSentences(server.url, rover.key, text)).body.accepted;
        }
        expect(accepted).toBe(epochs.length);
        const sorted = epochs
          .map(({ second, quality }) => ({ time: START + second * 1000, quality }))
          .sort((a, b) => a.time - b.time);
        const wanted = partition(spansOf(sorted), START, START + WINDOW_MS, server.clock.now());
        const answer = await timelineOf(
          await server.as('manager'),
          rover.id,
          iso(START),
          iso(START + WINDOW_MS),
        );
        expect(answer.spans).toEqual(
          wanted.map(({ state, start, end }) => ({ state, start: iso(start), end: iso(end) })),
        );
        expect(answer.totals).toEqual(totalsOf(wanted));
      }),
      { numRuns: 60 },
    );
  });
});
