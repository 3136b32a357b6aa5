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

it('what waited is joined in order, but never over a gap in which a day could hide', () => {
  const SECOND = 1000;
  const gaps = fc.array(fc.constantFrom(SECOND, 60 * SECOND, 3_600_000, 3_600_001, 13 * 3_600_000, -SECOND), {
    maxLength: 60,
  });
  fc.assert(
    fc.property(gaps, fc.integer({ min: 1, max: 20_000 }), (steps, size) => {
      const folder = mkdtempSync(join(tmpdir(), 'hubtack-spool-'));
      const spool = new Spool(folder);
      let time = Date.parse('2026-03-09T20:00:00Z');
      const kept = steps.map((step, index) => {
        const from = time;
        time += step;
        const date = new Date(from).toISOString().slice(0, 10);
        const post = { date, span: { from, to: from }, body: new Uint8Array(size).fill(index) };
        spool.keep(post);
        return post;
      });
      const sent: number[] = [];
      for (let oldest = spool.oldest(); oldest; oldest = new Spool(folder).oldest()) {
        const { post, number } = oldest;
        const parts = Array.from({ length: post.body.length / size }, (_, part) => post.body[part * size]!);
        expect(post.body.length).toBeLessThanOrEqual(Math.max(size, 50_000));
        expect(post.date).toBe(kept[parts[0]!]!.date);
        for (const part of parts.slice(1)) {
          expect(kept[part]!.span.from - kept[part - 1]!.span.to).toBeLessThanOrEqual(3_600_000);
          expect(kept[part]!.span.from).toBeGreaterThanOrEqual(kept[part - 1]!.span.to);
        }
        sent.push(...parts);
        new Spool(folder).done(number);
      }
      expect(sent).toEqual(kept.map((_, index) => index));
      rmSync(folder, { recursive: true });
    }),
    { numRuns: 40 },
  );
});

it('minutes of seconds that waited go out in a few posts', () => {
  const folder = mkdtempSync(join(tmpdir(), 'hubtack-spool-'));
  const spool = new Spool(folder);
  for (let second = 0; second < 200; second++) {
    const time = Date.parse('2026-03-09T10:00:00Z') + second * 1000;
    spool.keep({ date: '2026-03-09', span: { from: time, to: time }, body: new Uint8Array(300) });
  }
  let posts = 0;
  for (let oldest = spool.oldest(); oldest; oldest = spool.oldest()) {
    posts++;
    spool.done(oldest.number);
  }
  expect([posts, spool.length]).toEqual([2, 0]);
  rmSync(folder, { recursive: true });
});
