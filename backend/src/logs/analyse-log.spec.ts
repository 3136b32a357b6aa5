import { writeGga, writeRmc } from '@hubtack/contracts/nmea/sentence-writer.js';
import { defaultLimits } from '@hubtack/contracts/lost-fixes/limits.js';
import { DAY_MS } from '@hubtack/contracts/nmea/sentence.js';
import fc from 'fast-check';
import { expect, it } from 'vitest';
import { partition, spansOf, totalsOf } from '../fixes/timeline.js';
import { LogAnalysis, type LogAnswer } from './analyse-log.js';

const start = Date.UTC(2026, 9, 7, 12);
const sentencesAt = (time: number, quality: number): string =>
  writeGga({
    time,
    latitude: -41,
    longitude: 147,
    quality,
    satellites: 10 + quality,
    hdop: 0.7,
    altitudeM: 40,
    geoidSeparationM: -3,
    ageSeconds: quality,
    stationId: 1,
  }) + writeRmc({ time, latitude: -41, longitude: 147 });

function analysed(text: string, chunk: number): Extract<LogAnswer, { kind: 'done' }> {
  const analysis = new LogAnalysis({
    firstDay: { day: Math.floor(start / DAY_MS), from: 'sentences' },
    hasDates: true,
    receivedAt: start + DAY_MS,
    limits: defaultLimits,
    base: null,
    history: null,
  });
  const bytes = new TextEncoder().encode(text);
  for (let at = 0; at < bytes.length; at += chunk) {
    const piece = bytes.slice(at, at + chunk);
    analysis.push(piece);
    // Whoever reads a file fills the same bytes again.
    piece.fill(0);
  }
  analysis.finish();
  const answer = analysis.answer();
  if (answer.kind === 'failed') throw new Error(answer.problem);
  return answer;
}

it('in any order, twice, and cut into any pieces: the figures of the sorted epochs', () => {
  const epoch = fc.record({ second: fc.nat(120), quality: fc.constantFrom(0, 1, 2, 4, 5, 8, 9) });
  fc.assert(
    fc.property(
      fc.array(epoch, { minLength: 1, maxLength: 60 }),
      fc.integer({ min: 1, max: 500 }),
      (list, chunk) => {
        const text = list.map(({ second, quality }) => sentencesAt(start + second * 1000, quality)).join('');
        const { summary, detail } = analysed(text, chunk);
        // The obvious way: the first for each instant, sorted.
        const first = new Map<number, number>();
        for (const { second, quality } of list) if (!first.has(second)) first.set(second, quality);
        const sorted = [...first]
          .toSorted(([a], [b]) => a - b)
          .map(([second, quality]) => ({ time: start + second * 1000, quality }));
        const [from, to] = [sorted[0]!.time, sorted.at(-1)!.time];
        const parts = partition(spansOf(sorted), from, to, to);
        expect(summary).toMatchObject({
          epochs: sorted.length,
          duplicates: list.length - sorted.length,
          firstTime: new Date(from).toISOString(),
          lastTime: new Date(to).toISOString(),
          totals: totalsOf(parts),
          maxAgeSeconds: Math.max(...sorted.map(({ quality }) => quality)),
        });
        expect(summary.transitions).toEqual(
          parts.slice(1).map((part, index) => ({
            time: new Date(part.start).toISOString(),
            from: parts[index]!.state,
            to: part.state,
          })),
        );
        expect(detail.spans).toEqual(parts);
        expect(detail.points.map(({ at }) => at)).toEqual(sorted.map(({ time }) => time));
        const satellites = sorted.map(({ quality }) => 10 + quality).toSorted((a, b) => a - b);
        const middle = (satellites.length - 1) / 2;
        expect(summary.medianSatellites).toBe(
          (satellites[Math.floor(middle)]! + satellites[Math.ceil(middle)]!) / 2,
        );
      },
    ),
  );
});

it('what is drawn of too many spans keeps the share of each state', () => {
  // Five seconds of float in each minute, for four days.
  const text = Array.from({ length: 5760 * 2 }, (_, index) =>
    sentencesAt(start + Math.floor(index / 2) * 60_000 + (index % 2) * 5000, index % 2 === 0 ? 5 : 4),
  );
  const { summary, detail } = analysed(text.join(''), 100_000);
  expect(summary.moreTransitions).toBeGreaterThan(2000);
  expect(detail.spans.length).toBeLessThanOrEqual(2000);
  const { floatMs, fixedMs, silentMs } = summary.totals;
  const drawn = totalsOf(detail.spans);
  for (const [whole, shown] of [
    [floatMs, drawn.floatMs],
    [fixedMs, drawn.fixedMs],
    [silentMs, drawn.silentMs],
  ] as const)
    expect(Math.abs(shown - whole)).toBeLessThan(0.002 * 4 * DAY_MS);
});
