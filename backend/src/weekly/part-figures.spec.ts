import { defaultLimits } from '@hubtack/contracts/lost-fixes/limits.js';
import { wholeOf } from '@hubtack/contracts/fixes/totals.js';
import { percent } from '@hubtack/contracts/fixes/percent.js';
import { topographic } from '@hubtack/contracts/weekly/tolerance-profile.js';
import { describe, expect, it } from 'vitest';
import { subtract, type Interval } from '../common/interval.js';
import { localDayOf } from '../common/local-day.js';
import { spansOf, type HeardSpan } from '../fixes/timeline.js';
import { detectorLimitsOf } from '../lost-fixes/detector.js';
import { partFigures, type FiguresShift, type PartFigures } from './part-figures.js';
import { withinSpans, type ToleranceEpoch } from './tolerance.js';
import { weekFigures } from './week-figures.js';

const S = 1000;
const MIN = 60 * S;
const HOUR = 60 * MIN;
const limits = detectorLimitsOf(defaultLimits);
const forever: Interval = { start: 0, end: 1e12 };
const shift = (start: number, end: number, pauses: Interval[] = []): FiguresShift => ({
  start,
  end,
  onShift: subtract([{ start, end }], pauses),
});
const of = (spans: HeardSpan[], worked: FiguresShift, day = forever, now = 1e12): PartFigures =>
  partFigures(worked, day, spans, [], now, limits)!;
const row = (part: PartFigures, hourlyRate: number | null = null) =>
  ({ ...part.totals, ...part, hourlyRate }) as never;

describe('worked examples of the design', () => {
  const epochs = [
    [0, 4],
    [1, 4],
    [2, 5],
    [3, 5],
    [20, 4],
    [21, 4],
  ].map(([time, quality]) => ({ time: time! * S, quality: quality! }));

  it('A: fixed 13 s, float 11 s, silent 16 s; uptime 32.5 %, reporting 60.0 %, fixed while reporting 54.2 %', () => {
    const { totals } = of(spansOf(epochs), shift(0, 40 * S));
    expect(totals).toEqual({ fixedMs: 13 * S, floatMs: 11 * S, codeMs: 0, noneMs: 0, silentMs: 16 * S });
    const whole = wholeOf(totals);
    const reporting = whole - totals.silentMs;
    expect([
      percent(totals.fixedMs, whole),
      percent(reporting, whole),
      percent(totals.fixedMs, reporting),
    ]).toEqual(['32.5 %', '60.0 %', '54.2 %']);
  });
  it('B: with a pause from 10 to 22 s: 28 s on shift, fixed 11 s, float 8 s, silent 9 s; uptime 39.3 %', () => {
    const { totals } = of(spansOf(epochs), shift(0, 40 * S, [{ start: 10 * S, end: 22 * S }]));
    expect(totals).toMatchObject({ fixedMs: 11 * S, floatMs: 8 * S, silentMs: 9 * S });
    expect(percent(totals.fixedMs, wholeOf(totals))).toBe('39.3 %');
  });
  it('C: the day on which clocks change in Hobart has 23 h', () => {
    const day = localDayOf(Date.parse('2026-10-04T03:00:00Z'), 'Australia/Hobart');
    expect([new Date(day.start).toISOString(), new Date(day.end).toISOString(), day.end - day.start]).toEqual(
      ['2026-10-03T14:00:00.000Z', '2026-10-04T13:00:00.000Z', 82_800 * S],
    );
  });
  it('D: 6 h at 90 % and 2 h at 25 % are 73.8 % together, not 57.5 %', () => {
    const first = of([{ state: 'fixed', start: 0, end: 5.4 * HOUR }], shift(0, 6 * HOUR));
    const second = of([{ state: 'fixed', start: 0, end: 0.5 * HOUR }], shift(0, 2 * HOUR));
    const { totals } = weekFigures([row(first), row(second)], false);
    expect(percent(totals.fixedMs, wholeOf(totals))).toBe('73.8 %');
  });
});

it('availability by IEC 60050-192 (reference, section 2): 8 h, fixed 7 h 12, float 30 min, unknown 18 min: 90.0 and 93.5 %', () => {
  const spans: HeardSpan[] = [
    { state: 'fixed', start: 0, end: 432 * MIN },
    { state: 'float', start: 432 * MIN, end: 462 * MIN },
  ];
  const { totals } = of(spans, shift(0, 8 * HOUR));
  expect(percent(totals.fixedMs, wholeOf(totals))).toBe('90.0 %');
  expect(percent(totals.fixedMs, wholeOf(totals) - totals.silentMs)).toBe('93.5 %');
});

describe('a rover-shift cut at midnight', () => {
  const midnight = 24 * HOUR;
  const night = shift(22 * HOUR, 30 * HOUR);
  const days = [
    { start: 0, end: midnight },
    { start: midnight, end: 48 * HOUR },
  ];
  // First fix at 22:10; lost from 23:59:50 to 00:10, and from 02:00 to 02:05.
  const spans: HeardSpan[] = [
    { state: 'float', start: 22 * HOUR, end: 22 * HOUR + 10 * MIN },
    { state: 'fixed', start: 22 * HOUR + 10 * MIN, end: midnight - 10 * S },
    { state: 'float', start: midnight - 10 * S, end: midnight + 10 * MIN },
    { state: 'fixed', start: midnight + 10 * MIN, end: 26 * HOUR },
    { state: 'code', start: 26 * HOUR, end: 26 * HOUR + 5 * MIN },
    { state: 'fixed', start: 26 * HOUR + 5 * MIN, end: 31 * HOUR },
  ];
  const parts = days.map((day) => of(spans, night, day));

  it('parts add up to the whole', () => {
    expect(parts.map(({ totals }) => wholeOf(totals))).toEqual([2 * HOUR, 6 * HOUR]);
    expect(parts.map(({ startAt, endAt }) => [startAt, endAt])).toEqual([
      [22 * HOUR, midnight],
      [midnight, 30 * HOUR],
    ]);
  });
  it('a lost fix counts where it starts, with all of its length; the first fix where the first report is', () => {
    expect(parts.map(({ lostFixes, regains }) => [lostFixes, regains])).toEqual([
      [1, [10 * MIN + 10 * S]],
      [1, [5 * MIN]],
    ]);
    expect(parts.map(({ firstFixMs }) => firstFixMs)).toEqual([10 * MIN, null]);
  });
});

describe('a shift that runs', () => {
  it('counts to now, and has no end', () => {
    const running = { start: 0, end: null, onShift: [{ start: 0, end: 1e15 }] };
    const part = of([{ state: 'fixed', start: 0, end: 50 * MIN }], running, forever, HOUR);
    expect(part.endAt).toBeNull();
    expect(part.totals).toMatchObject({ fixedMs: 50 * MIN, silentMs: 10 * MIN });
    expect(part.lostFixes).toBe(1);
    expect(part.regains).toEqual([]);
  });
  it('that has not begun is no row', () => {
    expect(partFigures(shift(2 * HOUR, 3 * HOUR), forever, [], [], HOUR, limits)).toBeNull();
  });
});

describe('within tolerance', () => {
  const good = { quality: 4, ageMs: 1000, hdop: 0.8, satellites: 20 };
  const epoch = (second: number, change: Partial<ToleranceEpoch> = {}): ToleranceEpoch => ({
    time: second * S,
    ...good,
    ...change,
  });
  const seconds = (...epochs: ToleranceEpoch[]) =>
    withinSpans(epochs, topographic, { start: 0, end: 100 * S }).map(({ start, end }) => [
      start / S,
      end / S,
    ]);
  it.each([
    ['age at the limit', { ageMs: 10_000 }, [[0, 20]]],
    [
      'age over it',
      { ageMs: 10_001 },
      [
        [0, 10],
        [11, 20],
      ],
    ],
    ['HDOP at the limit', { hdop: 2 }, [[0, 20]]],
    [
      'HDOP over it',
      { hdop: 2.1 },
      [
        [0, 10],
        [11, 20],
      ],
    ],
    [
      'few satellites',
      { satellites: 5 },
      [
        [0, 10],
        [11, 20],
      ],
    ],
    [
      'float',
      { quality: 5 },
      [
        [0, 10],
        [11, 20],
      ],
    ],
    [
      'an age that is not said',
      { ageMs: null },
      [
        [0, 10],
        [11, 20],
      ],
    ],
  ])('%s', (_what, change, expected) => {
    const list = Array.from({ length: 11 }, (_, second) => epoch(second, second === 10 ? change : {}));
    expect(
      seconds(
        ...list,
        ...(list.length > 0 ? [epoch(11)] : []),
        epoch(15, { quality: 4 }),
        epoch(20, { quality: 5 }),
      ),
    ).toEqual(expected);
  });
  it('an epoch speaks for ten seconds at most', () => {
    expect(seconds(epoch(0), epoch(50))).toEqual([
      [0, 10],
      [50, 60],
    ]);
  });
});

describe('money', () => {
  const part = of([{ state: 'fixed', start: 0, end: 30 * MIN }], shift(0, 2 * HOUR));
  it('is paid time without a fix at the crew’s rate', () => {
    expect(weekFigures([row(part, 180), row(part, 100)], true)).toMatchObject({
      paidWithoutFixMs: 3 * HOUR,
      cost: 1.5 * 180 + 1.5 * 100,
    });
  });
  it('is not known when a crew has no rate, and not told to who may not see it', () => {
    expect(weekFigures([row(part, 180), row(part)], true).cost).toBeNull();
    expect(weekFigures([row(part, 180)], false).cost).toBeNull();
    expect(weekFigures([], true).cost).toBeNull();
  });
});
