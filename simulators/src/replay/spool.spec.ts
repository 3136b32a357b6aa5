import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import fc from 'fast-check';
import { expect, it } from 'vitest';
import { Spool } from './spool.js';

const bytes = (text: string) => new TextEncoder().encode(text);

/** What the sender may do: keep a post, send the oldest, or be killed and started again (also between sending and noting it). */
const step = fc.constantFrom('keep', 'send', 'killed after sending', 'killed');

it('whatever is killed when, every post is sent, in order, and again only when the note of it was lost', () => {
  fc.assert(
    fc.property(fc.array(step, { maxLength: 40 }), (steps) => {
      const folder = mkdtempSync(join(tmpdir(), 'hubtack-spool-'));
      let spool = new Spool(folder);
      const kept: string[] = [];
      const sent: string[] = [];
      let repeats = 0;
      const send = () => {
        const oldest = spool.oldest();
        if (oldest) sent.push(new TextDecoder().decode(oldest.post.body));
        return oldest;
      };
      for (const action of steps) {
        if (action === 'keep') {
          const text = `post ${kept.length}\n\u0000`;
          kept.push(text);
          spool.keep({ date: null, body: bytes(text) });
        } else if (action === 'killed') {
          // A write that was cut off leaves a file that is not yet in place.
          writeFileSync(join(folder, '000000999999.post.new'), 'half');
          spool = new Spool(folder);
        } else {
          const oldest = send();
          if (oldest && action === 'send') spool.done(oldest.number);
          if (oldest && action === 'killed after sending') repeats++;
          if (action !== 'send') spool = new Spool(folder);
        }
      }
      for (let oldest = send(); oldest; oldest = send()) spool.done(oldest.number);
      expect([...new Set(sent)]).toEqual(kept);
      expect(sent.length).toBeLessThanOrEqual(kept.length + repeats);
      rmSync(folder, { recursive: true });
    }),
    { numRuns: 60 },
  );
});

it('keeps the date and every byte of a post', () => {
  const folder = mkdtempSync(join(tmpdir(), 'hubtack-spool-'));
  const body = Uint8Array.from({ length: 256 }, (_, index) => index);
  new Spool(folder).keep({ date: '2026-03-09', body });
  const { post } = new Spool(folder).oldest()!;
  expect([post.date, [...post.body]]).toEqual(['2026-03-09', [...body]]);
  rmSync(folder, { recursive: true });
});
