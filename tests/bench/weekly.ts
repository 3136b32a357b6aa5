import { isoWeekInterval, isoWeekOf } from '@hubtack/backend/common/local-day.js';
import { FiguresKeeper } from '@hubtack/backend/weekly/figures.keeper.js';
import { LostFixWatch } from '@hubtack/backend/lost-fixes/lost-fix.watch.js';
import { WeeklyService } from '@hubtack/backend/weekly/weekly.service.js';
import { between, chance, randomOf } from '@hubtack/simulators/scenarios/random.js';
import type { Row } from './report.js';
import { SimulatedFirm } from './simulated-firm.js';
import { median } from './statistics.js';

const CREWS = 200;
const DAY_MS = 86_400_000;
const HOUR_MS = 3_600_000;
const ROUNDS = 21;
const NOW = Date.parse('2026-12-06T20:00:00Z');
const WEEK = '2026-W49';

interface FakeSpan {
  state: 'fixed' | 'float' | 'code' | 'none';
  start: number;
  end: number;
}

/** Spans of a working day, from seven to half past three, as the timeline would have left them: some twenty of them. */
function spansOfDay(start: number, random: ReturnType<typeof randomOf>): FakeSpan[] {
  const spans: FakeSpan[] = [];
  const end = start + 15.5 * HOUR_MS;
  for (let at = start + 7 * HOUR_MS; at < end;) {
    const isFixed = spans.length % 2 === 1;
    const state = isFixed ? 'fixed' : (['float', 'float', 'code', 'none'] as const)[between(random, 0, 3)]!;
    const until = Math.min(end, at + between(random, 60_000, isFixed ? 90 * 60_000 : 8 * 60_000));
    // Now and then the rover says nothing for a while.
    if (isFixed || chance(random) < 0.9) spans.push({ state, start: at, end: until });
    at = until;
  }
  return spans;
}

/** A firm with so many weeks of history in spans, and none of it in raw epochs. */
async function firmWith(weeks: number): Promise<SimulatedFirm> {
  const last = isoWeekInterval(WEEK, 'UTC').start;
  const first = last - (weeks - 1) * 7 * DAY_MS;
  const firm = await SimulatedFirm.start(first);
  firm.server.clock.set(NOW);
  firm.server.app.get(LostFixWatch).beforeApplicationShutdown();
  firm.server.app.get(FiguresKeeper).beforeApplicationShutdown();
  const sourceId = firm.addSource('BENCH', { latitude: -41.4, longitude: 147.1 });
  const pattern = [1, 2, 3, 4, 5].map((weekday) => ({ weekday, start: '07:00', end: '15:30' }));
  const random = randomOf(weeks);
  const client = firm.server.database.$client;
  const insert = client.prepare('INSERT INTO spans (rover_id, start_at, end_at, state) VALUES (?, ?, ?, ?)');
  client.exec('BEGIN');
  for (let crew = 0; crew < CREWS; crew++) {
    const { roverId } = firm.addCrew(`Crew ${crew}`, sourceId, pattern);
    for (let day = first; day < last + 5 * DAY_MS; day += DAY_MS) {
      if (new Date(day).getUTCDay() % 6 === 0) continue;
      for (const { state, start, end } of spansOfDay(day, random)) insert.run(roverId, start, end, state);
    }
  }
  client.exec('COMMIT');
  return firm;
}

/** Works all figures out; answers rover-shifts a second. */
function rebuild(firm: SimulatedFirm): number {
  const keeper = firm.server.app.get(FiguresKeeper);
  const began = performance.now();
  keeper.addAll(0);
  while (keeper.tick(Infinity));
  const seconds = (performance.now() - began) / 1000;
  const { count } = firm.server.database.$client
    .prepare('SELECT count(*) AS count FROM shift_figures')
    .get() as { count: number };
  return count / seconds;
}

const timed = (work: () => unknown): number => {
  const began = performance.now();
  work();
  return performance.now() - began;
};

/** The week with a year of history against the same week with no other, and against the bare sum of its rows. */
export async function weekly(): Promise<Row[]> {
  const week = await firmWith(1);
  const perSecond = rebuild(week);
  const year = await firmWith(52);
  const yearPerSecond = rebuild(year);
  const sum = year.server.database.$client.prepare(
    `SELECT crew_id, day, sum(fixed_ms), sum(float_ms), sum(code_ms), sum(none_ms), sum(silent_ms), sum(within_tolerance_ms)
     FROM shift_figures WHERE week = ? GROUP BY crew_id, day`,
  );
  const times = { week: [] as number[], year: [] as number[], bare: [] as number[] };
  const answer = (firm: SimulatedFirm) => firm.server.app.get(WeeklyService).week(WEEK, true);
  for (let round = -3; round < ROUNDS; round++) {
    const measured = {
      week: timed(() => answer(week)),
      year: timed(() => answer(year)),
      bare: timed(() => sum.all(WEEK)),
    };
    if (round < 0) continue;
    for (const name of ['week', 'year', 'bare'] as const) times[name].push(measured[name]);
  }
  const shifts = answer(year).shifts.length;
  const before = isoWeekOf(NOW - 7 * DAY_MS, 'UTC');
  const otherShifts = year.server.app.get(WeeklyService).week(before, true).shifts.length;
  await week.server.close();
  await year.server.close();
  if (shifts !== otherShifts) throw new Error('the weeks are not alike');
  const [ofWeek, ofYear, bare] = [median(times.week), median(times.year), median(times.bare)];
  return [
    {
      name: 'weekly/year of history',
      value: ofYear,
      unit: 'ms',
      floor: ofWeek,
      ratio: ofYear / ofWeek,
      n: ROUNDS,
    },
    {
      name: 'weekly/against the bare sum',
      value: ofYear,
      unit: 'ms',
      floor: bare,
      ratio: ofYear / bare,
      n: shifts,
    },
    {
      name: 'weekly/rebuild of a week',
      value: perSecond,
      unit: 'rover-shifts/s',
      floor: null,
      ratio: null,
      n: shifts,
    },
    {
      name: 'weekly/rebuild of a year',
      value: yearPerSecond,
      unit: 'rover-shifts/s',
      floor: null,
      ratio: null,
      n: 52 * shifts,
    },
  ];
}
