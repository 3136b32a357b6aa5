import { writeGga, writeRmc } from '@hubtack/contracts/nmea/sentence-writer.js';
import { describe, expect, it } from 'vitest';
import { firstDayOf } from './line-time.js';
import { LineSplitter } from './line-splitter.js';
import type { Post } from './post-builder.js';
import { replay } from './replay.js';

const at = (text: string) => Date.parse(text);
const absent = {
  satellites: null,
  hdop: null,
  altitudeM: null,
  geoidSeparationM: null,
  ageSeconds: null,
  stationId: null,
};
const gga = (time: string) => writeGga({ time: at(time), latitude: 1, longitude: 2, quality: 4, ...absent });
const rmc = (time: string) => writeRmc({ time: at(time), latitude: 1, longitude: 2 });
const bytes = (text: string) => Uint8Array.from(text, (character) => character.charCodeAt(0));

async function postsOf(
  text: string,
  options: { firstDay?: number | null; live?: boolean; size?: number } = {},
): Promise<Post[]> {
  const { firstDay = null, live = false, size = 37 } = options;
  const posts: Post[] = [];
  async function* pieces() {
    const all = bytes(text);
    for (let from = 0; from < all.length; from += size) yield all.subarray(from, from + size);
  }
  await replay({
    source: { live, bytes: pieces() },
    firstDay,
    speed: Infinity,
    keep: (post) => void posts.push(post),
  });
  return posts;
}
const joined = (posts: Post[]) => posts.map(({ body }) => String.fromCharCode(...body)).join('');
const DAY = 86_400_000;

describe('the sender', () => {
  it('passes every byte on, other protocols between sentences too', async () => {
    const text = `${gga('2026-03-09T10:00:00Z')}\u00b5b\u0001\u0007\u0000${gga('2026-03-09T10:00:01Z')}# half a line`;
    for (const size of [1, 7, 5000]) expect(joined(await postsOf(text, { size }))).toBe(text);
  });
  it('cuts long logs into posts, each dated by its own first sentence, over midnight too', async () => {
    const start = at('2026-03-09T23:50:00Z');
    const text = Array.from({ length: 1800 }, (_, second) =>
      gga(new Date(start + second * 1000).toISOString()),
    ).join('');
    const posts = await postsOf(text, { firstDay: at('2026-03-09') / DAY });
    expect(posts.length).toBeGreaterThan(3);
    expect(posts.map(({ date }) => date)).toEqual(['2026-03-09', '2026-03-09', '2026-03-10', '2026-03-10']);
    expect(joined(posts)).toBe(text);
  });
  it('finds the first date of a log in its RMC, also when that comes after midnight', () => {
    const lines = (text: string) => new LineSplitter().push(bytes(text));
    expect(firstDayOf(lines(gga('2020-03-18T13:00:00Z') + rmc('2020-03-18T13:00:00Z')))).toBe(
      at('2020-03-18') / DAY,
    );
    expect(firstDayOf(lines(gga('2020-03-18T23:59:59Z') + rmc('2020-03-19T00:00:00Z')))).toBe(
      at('2020-03-18') / DAY,
    );
    expect(firstDayOf(lines(gga('2020-03-18T13:00:00Z')))).toBeNull();
  });
  it('an RMC within a post dates it, though its first sentence came before and was read today', async () => {
    const text = gga('2020-03-18T13:00:00Z') + rmc('2020-03-18T13:00:00Z');
    expect((await postsOf(text, { live: true })).map(({ date }) => date)).toEqual(['2020-03-18']);
  });
});
