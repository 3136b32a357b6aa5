import { writeGga, writeGst, writeRmc } from '@hubtack/contracts/nmea/sentence-writer.js';
import { expect, it } from 'vitest';
import { sentencesIn } from './line-time.js';
import { PostBuilder, type Post } from './post-builder.js';

const absent = { hdop: null, altitudeM: null, geoidSeparationM: null, ageSeconds: null, stationId: null };
const place = { latitude: 1, longitude: 2 };
const bytes = (text: string) => new TextEncoder().encode(text);

it('a full post ends between two instants, whichever sentence a receiver writes first', () => {
  const builder = new PostBuilder();
  const posts: Post[] = [];
  for (let second = 0; second < 1000; second++) {
    const time = Date.parse('2026-03-09T23:55:00Z') + second * 1000;
    const group = [
      writeRmc({ time, ...place }),
      writeGst({ time, sigmaM: 0.01, sigmaAltitudeM: 0.02 }),
      writeGga({ time, ...place, quality: 4, satellites: 12, ...absent }),
    ];
    for (const text of group) {
      const finished = builder.add(bytes(text), sentencesIn(bytes(text)), time);
      if (finished) posts.push(finished);
    }
  }
  posts.push(builder.take()!);
  expect(builder.take()).toBeNull();
  expect(posts).toHaveLength(6);
  for (const { body } of posts) {
    const text = new TextDecoder().decode(body);
    expect(text.startsWith('$GNRMC')).toBe(true);
    expect(text.trimEnd().split('\n').at(-1)).toContain('$GNGGA');
  }
  expect(posts.map(({ date }) => date)).toEqual(['2026-03-09', '2026-03-09', ...Array(4).fill('2026-03-10')]);
});

it('a stretch without any time is cut all the same, so that posts stay bounded', () => {
  const builder = new PostBuilder();
  const posts: Post[] = [];
  for (let line = 0; line < 500; line++) {
    const finished = builder.add(new Uint8Array(4000), [], null);
    if (finished) posts.push(finished);
  }
  expect(Math.max(...posts.map(({ body }) => body.length))).toBeLessThan(410_000);
  expect(posts[0]!.date).toBeNull();
});
