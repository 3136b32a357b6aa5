import { spansOf } from '@hubtack/backend/fixes/timeline.js';
import BetterSqlite3 from 'better-sqlite3';
import { Ours } from './ours.js';
import type { Row } from './report.js';
import { median } from './statistics.js';

const WEEK_S = 7 * 86_400;
const ROUNDS = 200;

/** A week at 1 Hz with a loss every ten minutes or so. */
function weekOfSpans(start: number) {
  const epochs = [];
  for (let second = 0; second < WEEK_S; second++) {
    const inTen = second % 617;
    epochs.push({ time: start + second * 1000, quality: inTen < 40 ? 5 : inTen < 55 ? 2 : 4 });
  }
  return spansOf(epochs);
}

/** The timeline of a rover-week over HTTP against the bare SQL read of its spans. */
export async function timelineQuery(): Promise<Row[]> {
  const start = Math.floor(Date.now() / 1000) * 1000 - (WEEK_S + 3600) * 1000;
  const end = start + WEEK_S * 1000;
  const ours = await Ours.start({ rovers: 1, spansOfFirst: weekOfSpans(start) });
  const bare = new BetterSqlite3(ours.databaseFile, { readonly: true });
  const read = bare.prepare(
    'SELECT state, start_at, end_at FROM spans WHERE rover_id = 1 AND start_at < ? AND end_at > ?',
  );
  const path = `/api/rovers/1/timeline?from=${new Date(start).toISOString()}&to=${new Date(end).toISOString()}`;
  const results: number[][] = [[], []];
  const time = async (into: number[], work: () => unknown) => {
    const began = performance.now();
    await work();
    into.push(performance.now() - began);
  };
  let spans = 0;
  for (let round = -20; round < ROUNDS; round++) {
    await time(results[0]!, async () => (await ours.client.call('GET', path)).arrayBuffer());
    await time(results[1]!, () => {
      spans = read.all(end, start).length;
    });
    if (round < 0) for (const list of results) list.length = 0;
  }
  bare.close();
  await ours.stop();
  const [value, floor] = results.map(median) as [number, number];
  return [
    { name: `timeline/query (${spans} spans)`, value, unit: 'ms', floor, ratio: value / floor, n: ROUNDS },
  ];
}
