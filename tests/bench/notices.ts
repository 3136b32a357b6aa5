import { NoticesService } from '@hubtack/backend/notices/notices.service.js';
import { ShiftMarksService } from '@hubtack/backend/shifts/shift-marks.service.js';
import { LostFixWatch } from '@hubtack/backend/lost-fixes/lost-fix.watch.js';
import { notices as noticeTable } from '@hubtack/drizzle/schema/notices.js';
import { users } from '@hubtack/drizzle/schema/users.js';
import type { DayCrew } from '@hubtack/simulators/scenarios/day.js';
import { badDay } from '@hubtack/simulators/scenarios/days.js';
import { randomOf } from '@hubtack/simulators/scenarios/random.js';
import { epochAt } from '@hubtack/simulators/scenarios/simulated-epoch.js';
import { eq } from 'drizzle-orm';
import type { Row } from './report.js';
import { SimulatedFirm } from './simulated-firm.js';

/**
 * HSE Chemicals Sheet 6, "Better alarm handling", citing EEMUA 191: on average not more than one alarm in ten minutes,
 * and not more than ten in the ten minutes after a major upset, for one operator.
 */
const MEAN_IN_TEN_MINUTES = 1;
const AFTER_UPSET = 10;
const TEN_MINUTES = 600;
/** Losses of this length and more are to be raised, within so many seconds of being due. */
const LEAST_SECONDS = 35;
const WITHIN_SECONDS = 5;
const LOST_AFTER_SECONDS = 30;
const START = Date.parse('2026-12-01T20:00:00Z');

interface Unit {
  crew: DayCrew;
  crewId: number;
  roverId: number;
}

/** What is due of the marks at a second, made as the chief makes them. */
function stepsAt(crew: DayCrew, second: number): { step: 'start' | 'pause' | 'resume' | 'finish' }[] {
  const { startSecond, finishSecond, pauses } = crew.marks;
  const steps: { step: 'start' | 'pause' | 'resume' | 'finish' }[] = [];
  if (second === startSecond) steps.push({ step: 'start' });
  if (pauses.some(({ fromSecond }) => fromSecond === second)) steps.push({ step: 'pause' });
  if (pauses.some(({ toSecond }) => toSecond === second)) steps.push({ step: 'resume' });
  if (second === finishSecond) steps.push({ step: 'finish' });
  return steps;
}

/** A bad day of fifty crews through the whole application, second by second: what is raised, and what one dispatcher is told. */
export async function notices(seed: number): Promise<Row[]> {
  const day = badDay(seed);
  const firm = await SimulatedFirm.start(START);
  const { app, database } = firm.server;
  await firm.server.as('dispatcher');
  const dispatcher = database.select().from(users).where(eq(users.role, 'dispatcher')).get()!;
  const sources = new Map<string, number>();
  const units = day.crews.map((crew): Unit => {
    const sourceId = sources.get(crew.mountPoint) ?? firm.addSource(crew.mountPoint, crew.base);
    sources.set(crew.mountPoint, sourceId);
    return { crew, ...firm.addCrew(crew.name, sourceId, []) };
  });
  firm.announce();
  const chief = { userId: dispatcher.id, name: 'chief', role: 'dispatcher' } as never;
  const randoms = units.map((_, index) => randomOf(seed * 1000 + index));
  /** When each lost fix was first there, in seconds of the day. */
  const seenAt = new Map<number, number>();
  for (let second = 0; second < day.seconds; second++) {
    firm.server.clock.set(START + second * 1000);
    for (const { crew, crewId } of units)
      for (const { step } of stepsAt(crew, second))
        app.get(ShiftMarksService).step(chief, crewId, step, step === 'pause' ? { reason: 'lunch' } : {});
    const heard = units.flatMap(({ crew, roverId }, index) => {
      const epoch = epochAt(crew.behaviours, crew.site, START, second, randoms[index]!);
      return epoch ? [{ roverId, epoch }] : [];
    });
    await firm.pass(second, heard);
    app.get(NoticesService).run();
    for (const id of app.get(LostFixWatch).openIds()) if (!seenAt.has(id)) seenAt.set(id, second);
  }
  const found = firm.lostFixes().filter(({ ending }) => ending !== 'withdrawn');
  const told = database.select().from(noticeTable).where(eq(noticeTable.userId, dispatcher.id)).all();
  await firm.server.close();

  const second = (at: number) => (at - START) / 1000;
  const raised = found.filter(({ roverId }) => roverId !== null);
  const truth = units.flatMap(({ crew, roverId }) => crew.losses.map((loss) => ({ ...loss, roverId })));
  const rowOf = (loss: (typeof truth)[number]) =>
    raised.find(
      (row) =>
        row.roverId === loss.roverId &&
        second(row.startAt) < loss.toSecond &&
        second(row.endAt ?? Infinity) > loss.fromSecond,
    );
  const dueAfter = (cause: string) => (cause === 'neverCorrected' ? 300 : LOST_AFTER_SECONDS);
  const due = truth.filter(({ fromSecond, toSecond }) => toSecond - fromSecond >= LEAST_SECONDS);
  const late = due.map((loss) => {
    const row = rowOf(loss);
    const dueAt = loss.fromSecond + dueAfter(loss.cause);
    return row ? (seenAt.get(row.id) ?? Infinity) - dueAt : Infinity;
  });
  const without = raised.filter((row) => !truth.some((loss) => rowOf(loss)?.id === row.id));
  const onBoard = told.filter(({ ways }) => ways.includes('board'));
  const times = onBoard.map(({ at }) => second(at)).toSorted((a, b) => a - b);
  const [failure] = day.mountPointFailures;
  const afterFailure = onBoard.filter(
    ({ at }) => second(at) >= failure!.fromSecond && second(at) < failure!.fromSecond + TEN_MINUTES,
  );
  const ofBase = onBoard.filter(({ subject }) => subject === 'mountPoint');
  const ofMembers = onBoard.filter(({ lostFixId }) =>
    found.some(({ id, sharedId }) => id === lostFixId && sharedId !== null),
  );
  const mean = times.length / (day.seconds / TEN_MINUTES);
  const most = Math.max(
    ...times.map((from) => times.filter((at) => at >= from && at < from + TEN_MINUTES).length),
  );
  const row = (name: string, value: number, unit: string, floor: number | null, n: number): Row => ({
    name: `notices/${name}`,
    value,
    unit,
    floor,
    ratio: floor === null || floor === 0 ? null : value / floor,
    n,
  });
  return [
    row(
      'losses raised',
      due.length - late.filter((wait) => wait === Infinity).length,
      'losses',
      due.length,
      due.length,
    ),
    row('slowest raised after it was due', Math.max(...late), 's', WITHIN_SECONDS, due.length),
    row('raised without a loss', without.length, 'lost fixes', 0, raised.length),
    row('mean in ten minutes', mean, 'notices', MEAN_IN_TEN_MINUTES, times.length),
    row('most in ten minutes', most, 'notices', AFTER_UPSET, times.length),
    row('after the base failed, ten minutes', afterFailure.length, 'notices', AFTER_UPSET, times.length),
    row('for the base itself', ofBase.length, 'notices', 1, times.length),
    row('for those under it', ofMembers.length, 'notices', 0, times.length),
  ];
}
